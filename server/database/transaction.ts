import type { DataSource, EntityManager } from 'typeorm'
import { isRetriable } from './databaseErrors.js'

/** What repository functions work through: a connection of its own, or the transaction of a use case. */
export type Work = EntityManager

/** The database as services see it. */
export interface Database {
  /** For reading, outside any transaction. */
  readonly work: Work
  /**
   * Runs all of `run` or nothing of it; a deadlock is tried again up to three times. What is read after a lock was waited
   * for is what the other transaction left (READ COMMITTED), not what stood there before.
   */
  transaction<Result>(run: (work: Work) => Promise<Result>): Promise<Result>
}

const ATTEMPTS = 3

export function databaseOf(dataSource: DataSource): Database {
  return {
    work: dataSource.manager,
    async transaction(run) {
      for (let attempt = 1; ; attempt++) {
        try {
          return await dataSource.transaction('READ COMMITTED', run)
        } catch (error) {
          if (attempt >= ATTEMPTS || !isRetriable(error)) throw error
        }
      }
    },
  }
}
