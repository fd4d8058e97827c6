import { AsyncLocalStorage } from 'node:async_hooks'
import { sql } from 'drizzle-orm'
import type { Database, Transaction } from './client'

const inside = new AsyncLocalStorage<string>()

/**
 * The only way to an organisation's tables: one transaction, with the organisation set for row-level security.
 *
 * @throws Error when called inside itself: a transaction over two organisations could dead-lock and is never needed
 */
export async function inOrganisation<T>(database: Database, organisationId: string, work: (tx: Transaction) => Promise<T>, options: { readOnly?: boolean } = {}): Promise<T> {
  if (inside.getStore() !== undefined) throw new Error('inOrganisation does not nest')
  return inside.run(organisationId, () => database.transaction(async (tx) => {
    await tx.execute(sql`select set_config('app.organisation', ${organisationId}, true)`)
    return work(tx)
  }, options.readOnly ? { isolationLevel: 'repeatable read', accessMode: 'read only' } : undefined))
}

/** For sign-in and the look-up of a session, which come before an organisation is known. Opens users, sessions and attempts only. */
export async function outsideOrganisation<T>(database: Database, work: (tx: Transaction) => Promise<T>): Promise<T> {
  if (inside.getStore() !== undefined) throw new Error('outsideOrganisation does not nest')
  return database.transaction(async (tx) => {
    await tx.execute(sql`select set_config('app.outside', 'on', true)`)
    return work(tx)
  })
}
