import 'reflect-metadata'
import { DataSource } from 'typeorm'
import { ENTITIES } from './entities/index.js'
import { MIGRATIONS } from './migrations/index.js'

/** Connection to MariaDB. The schema changes by migrations only. */
export function makeDataSource(databaseUrl: string): DataSource {
  const url = new URL(databaseUrl)
  return new DataSource({
    type: 'mariadb',
    host: url.hostname,
    port: Number(url.port || 3306),
    username: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    database: url.pathname.slice(1),
    charset: 'utf8mb4',
    timezone: 'Z',
    synchronize: false,
    entities: ENTITIES,
    migrations: MIGRATIONS,
    poolSize: 12,
  })
}
