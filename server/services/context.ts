import type { Config } from '../config.js'
import type { Database } from '../database/transaction.js'

/** What use cases need that also write mail or depend on how the server is set up. */
export interface Context {
  database: Database
  config: Config
}
