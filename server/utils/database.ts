import type { H3Event } from 'h3'
import { openDatabase, type Database } from '#server/database/client'

let database: Database | undefined

/** The server's one pool; opened by the plugin `database.ts`. */
export function useDatabase(): Database {
  if (!database) throw new Error('useDatabase: the database is not open yet')
  return database
}

export function connectDatabase(url: string): Database {
  return database ??= openDatabase(url)
}

export async function disconnectDatabase(): Promise<void> {
  const open = database
  database = undefined
  await open?.$client.end()
}

/** Address of whoever asks, for counting attempts: the connection's own, never a header that anybody can write. */
export function remoteAddress(event: H3Event): string {
  return event.node.req.socket.remoteAddress ?? 'unknown'
}
