import { and, eq, inArray, sql } from 'drizzle-orm'
import type { RowChange } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'

/**
 * Shows operations that could not be read beside the record they name: a person must see them, whatever is wrong with
 * them. One that names nothing known stands with the organisation.
 */
export async function holdUnreadable(tx: Transaction, organisation: string, rows: readonly RowChange[], ver: number): Promise<void> {
  if (rows.length === 0) return
  const isId = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i
  const named = [...new Set(rows.map(row => row.object).filter(object => isId.test(object)))]
  const owners = await tx.select({ object: rowState.object, scope: rowState.scope }).from(rowState)
    .where(and(eq(rowState.organisation, organisation), eq(rowState.t, 'obj'), inArray(rowState.object, named)))
  const scopes = new Map(owners.map(owner => [owner.object, owner.scope]))
  const placed = rows.map(row => scopes.has(row.object) ? { ...row, scope: scopes.get(row.object)! } : { ...row, object: organisation })
  await tx.insert(rowState).values(placed.map(row => ({ organisation, ...row, ver }))).onConflictDoNothing()
  for (const object of scopes.keys()) {
    await tx.update(sheets).set({ lateChanges: sql`${sheets.lateChanges} + ${placed.filter(row => row.object === object).length}`, ver })
      .where(and(eq(sheets.organisation, organisation), eq(sheets.id, object)))
  }
}
