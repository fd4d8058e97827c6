import { and, eq, inArray, sql } from 'drizzle-orm'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'
import { unreadRow } from './unread-row'
import type { LedgerEntry } from './write-ledger'

/**
 * Stores the late rows of operations that could not be read. Counts them on their sheets without making the projection
 * anew: an operation that spoiled the projection comes through here too, and must be kept all the same.
 */
export async function holdUnreadable(tx: Transaction, organisation: string, entries: readonly LedgerEntry[], ver: number): Promise<void> {
  if (entries.length === 0) return
  const named = [...new Set(entries.flatMap(entry => [entry.object, entry.sheet]).filter(id => id !== null))]
  const owners = await tx.select().from(rowState).where(and(eq(rowState.organisation, organisation), eq(rowState.t, 'obj'), inArray(rowState.id, named)))
  const known = new Map(owners.map(owner => [owner.id, owner]))
  const rows = entries.map(entry => unreadRow(entry, (_t, id) => known.get(id), organisation))
  await tx.insert(rowState).values(rows.map(row => ({ organisation, ...row, ver }))).onConflictDoNothing()
  await tx.execute(sql`
    update ${sheets} set late_changes = late_changes + held.count, ver = ${ver}::bigint
    from (select object, count(*)::int as count from unnest(${sql.param(rows.map(row => row.object))}::uuid[]) as each(object) group by object) held
    where organisation = ${organisation} and id = held.object`)
}
