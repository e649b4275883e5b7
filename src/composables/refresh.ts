import { useQueryClient } from '@tanstack/vue-query'
import { queryKeys } from './queryKeys.js'

/** Marks what a change has made old; screens that show it read it again. */
export function useRefresh() {
  const client = useQueryClient()
  return {
    async project(projectId: string): Promise<void> {
      await Promise.all([
        client.invalidateQueries({ queryKey: queryKeys.project(projectId) }),
        client.invalidateQueries({ queryKey: queryKeys.projects }),
      ])
    },
    /** What is known of a device that is gone; its page must not ask for it again. */
    forgetDevice(projectId: string, deviceId: string): void {
      for (const kind of ['device', 'matching', 'curves']) {
        client.removeQueries({ queryKey: [...queryKeys.project(projectId), kind, deviceId] })
      }
    },
    async spectra(projectId: string): Promise<void> {
      await client.invalidateQueries({ queryKey: queryKeys.spectra(projectId) })
    },
    async projects(): Promise<void> {
      await client.invalidateQueries({ queryKey: queryKeys.projects })
    },
    async administration(): Promise<void> {
      await client.invalidateQueries({ queryKey: queryKeys.administration })
    },
    async sessions(): Promise<void> {
      await client.invalidateQueries({ queryKey: queryKeys.sessions })
    },
  }
}
