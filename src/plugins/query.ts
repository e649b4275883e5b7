import { MutationCache, QueryCache, QueryClient } from '@tanstack/vue-query'
import { isApiError } from '../../shared/contract/errors.js'
import { isWorthRepeating } from '../errors/sentences.js'

/** The cache of server state. `onSignedOut` runs when any call finds that the session has ended. */
export function createQueryClient(onSignedOut: () => void): QueryClient {
  const watchSession = (error: unknown) => {
    if (isApiError(error, 'SIGN_IN_NEEDED')) onSignedOut()
  }
  return new QueryClient({
    queryCache: new QueryCache({ onError: watchSession }),
    mutationCache: new MutationCache({ onError: watchSession }),
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        retry: (failures, error) => failures < 1 && isWorthRepeating(error),
        refetchOnWindowFocus: true,
      },
      mutations: { retry: false },
    },
  })
}
