export interface MariadbHandle {
  /** URL of the database for the application's user. */
  url: string
  urlOf(database: string): string
  createDatabase(name: string): void
  dropDatabase(name: string): void
  /** Stops the server unless another process uses it as well. */
  stop(): Promise<void>
}
export function startMariadb(name: string, database?: string): Promise<MariadbHandle>
export function stopLeftBehind(name: string): Promise<void>
export function lives(pid: number): boolean
