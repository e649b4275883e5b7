/** A database server for one run of tests; `stop` removes it with its data. */
export function startThrowawayMariadb(): Promise<{
  url: string
  urlOf(database: string): string
  stop(): Promise<void>
}>
