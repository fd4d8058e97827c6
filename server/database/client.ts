import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres'
import pg from 'pg'
import * as schema from './schema'

export type Database = NodePgDatabase<typeof schema> & { $client: pg.Pool }
/** A transaction inside one organisation; the only handle that services and queries take. */
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0]

/** Opens the database; plain, so that scripts and tests can call it. Close it with `database.$client.end()`. */
export function openDatabase(url: string, connections = 8): Database {
  const pool = new pg.Pool({ connectionString: url, max: connections, connectionTimeoutMillis: 5_000, application_name: 'lapel', options: '-c role=lapel_app -c synchronous_commit=on' })
  // A connection that breaks while idle is thrown away by the pool; without a listener it would end the process.
  pool.on('error', error => console.error(`The database closed a connection: ${error.message}`))
  return drizzle(pool, { schema, casing: 'snake_case' })
}
