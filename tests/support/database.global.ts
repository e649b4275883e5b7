import type { TestProject } from 'vitest/node'
import { startThrowawayMariadb } from '../../server/setup/throwaway.mjs'

/** One MariaDB for all server tests of a run; every test file makes a database of its own in it. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = await startThrowawayMariadb()
  project.provide('databaseUrl', server.urlOf('mysql'))
  return () => server.stop()
}

declare module 'vitest' {
  interface ProvidedContext {
    /** URL of a database that exists, with the right to make others. */
    databaseUrl: string
  }
}
