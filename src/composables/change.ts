import { useMutation } from '@tanstack/vue-query'
import type { Ref } from 'vue'

/** A change on the server that a view can start: its progress and its error are refs, the last run counts. */
export interface Change<Input, Result> {
  /** Starts it; the error stands in `error`. */
  mutate: (input: Input) => void
  /** Starts it and waits; rejects with the error. */
  mutateAsync: (input: Input) => Promise<Result>
  reset: () => void
  isPending: Readonly<Ref<boolean>>
  isSuccess: Readonly<Ref<boolean>>
  error: Readonly<Ref<Error | null>>
}

/** `after` runs before the change counts as done, so that the screens already read again. */
export function useChange<Input, Result>(
  run: (input: Input) => Promise<Result>,
  after?: (result: Result, input: Input) => unknown,
): Change<Input, Result> {
  const mutation = useMutation<Result, Error, Input>({
    mutationFn: run,
    onSuccess: (result, input) => after?.(result, input),
  })
  return {
    mutate: (input) => mutation.mutate(input),
    mutateAsync: (input) => mutation.mutateAsync(input),
    reset: mutation.reset,
    isPending: mutation.isPending,
    isSuccess: mutation.isSuccess,
    error: mutation.error,
  }
}
