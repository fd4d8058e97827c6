import { eq, sql } from 'drizzle-orm'
import { held, merge } from '#shared/sync/merge'
import type { StampedOperation } from '#shared/sync/operations'
import type { HeldReason } from '#shared/sync/outcomes'
import type { Row, RowChange, RowType } from '#shared/sync/rows'
import { sameValue } from '#shared/sync/same-value'
import type { Transaction } from '#server/database/client'
import { grantScope } from '#server/database/tables/grant-scope'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'
import { surveys } from '#server/database/tables/surveys'
import { grantsOf, storeRows } from './apply-operations'
import { heldScope } from './held-scope'
import { projectionsOf, storeProjections } from './project/project-rows'
import { advanceCounter, lockCounter } from './stamp-version'
import { unreadRow } from './unread-row'
import type { LedgerEntry } from './write-ledger'

type LedgerRow = LedgerEntry & { ver: number }

/** Answers to an operation that was never merged, because it could not be read. */
const NEVER_READ: readonly string[] = ['malformed', 'id-reused', 'newer-schema']

export interface Rebuilt {
  operations: number
  rows: number
  /** Rows that were missing or differed from what the ledger says; they were written anew, with a new version. */
  mended: string[]
  /** Rows that no operation of the ledger explains. They stay, for a person to look at. */
  unexplained: string[]
}

/**
 * Makes rows, grants and the tables of the office's lists again from the ledger, in one transaction. What was answered when an
 * operation was received still counts: rights and findings of that day are not judged anew.
 */
export async function rebuildFromLedger(tx: Transaction, organisation: string): Promise<Rebuilt> {
  const stamp = await lockCounter(tx, organisation)
  const rows = new Map<string, Row>()
  let operations = 0
  for await (const version of versionsOf(tx)) {
    operations += version.length
    replay(version, rows, organisation)
  }

  const stored = new Map((await tx.select().from(rowState).where(eq(rowState.organisation, organisation))).map(row => [`${row.t} ${row.id}`, row]))
  const mended = [...rows].filter(([key, row]) => {
    const { organisation: _organisation, ...known } = stored.get(key) ?? { organisation }
    return !sameValue(known, row)
  }).map(([key]) => key)
  if (mended.length > 0) {
    await storeRows(tx, organisation, mended.map(key => rows.get(key)!), stamp.ver)
    await advanceCounter(tx, organisation, stamp.ver)
    for (const key of mended) rows.set(key, { ...rows.get(key)!, ver: stamp.ver })
  }

  for (const { person, scope, gone, row } of grantsOf([...rows.values()])) {
    await tx.insert(grantScope).values({ organisation, person, scope, ver: row.ver, gone })
      .onConflictDoUpdate({ target: [grantScope.organisation, grantScope.person, grantScope.scope], set: { ver: row.ver, gone } })
  }
  await tx.delete(sheets).where(eq(sheets.organisation, organisation))
  await tx.delete(surveys).where(eq(surveys.organisation, organisation))
  await storeProjections(tx, projectionsOf(organisation, [...rows.values()]))
  return { operations, rows: rows.size, mended, unexplained: [...stored.keys()].filter(key => !rows.has(key)) }
}

/** The ledger in order, one version at a time: what was received together is replayed together. Read by a cursor, because it may be large. */
async function* versionsOf(tx: Transaction): AsyncGenerator<LedgerRow[]> {
  await tx.execute(sql`declare ledger no scroll cursor for
    select id, dev, phone, n::float8 as n, author, sv, kind, object, sheet, hlc_claimed as "hlcClaimed", hlc_effective as "hlcEffective", body, '' as "bodyHash",
      personal, claimed_id as "claimedId", to_char(received_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as "receivedAt", outcome, reason, detail, ver::float8 as ver
    from op where organisation = current_organisation() order by ver, n, id`)
  let version: LedgerRow[] = []
  for (;;) {
    const { rows } = await tx.execute<LedgerRow & Record<string, unknown>>(sql`fetch 1000 from ledger`)
    for (const row of rows) {
      if (version.length > 0 && version[0]!.ver !== row.ver) {
        yield version
        version = []
      }
      version.push(row)
    }
    if (rows.length === 0) break
  }
  if (version.length > 0) yield version
  await tx.execute(sql`close ledger`)
}

function replay(version: readonly LedgerRow[], rows: Map<string, Row>, organisation: string): void {
  const read = (t: RowType, id: string) => rows.get(`${t} ${id}`)
  const write = (changed: readonly RowChange[], ver: number) => {
    for (const row of changed) rows.set(`${row.t} ${row.id}`, { ...row, ver })
  }
  const isUnread = (entry: LedgerRow) => NEVER_READ.includes(entry.reason ?? '') || 'text' in entry.body
  for (const entry of version.filter(entry => !isUnread(entry))) {
    if (entry.outcome === 'refused') continue
    const operation = stampedOf(entry)
    const result = entry.outcome === 'held'
      ? held(operation, entry.reason as HeldReason, entry.detail, heldScope(operation, read, organisation))
      : merge(operation, read, organisation)
    write(result.rows, entry.ver)
  }
  for (const entry of version.filter(isUnread)) write([unreadRow(entry, read, organisation)], entry.ver)
}

function stampedOf(entry: LedgerRow): StampedOperation {
  return { ...entry.body, personal: entry.personal, hlcEffective: entry.hlcEffective, dev: entry.dev, author: entry.author, isWaiting: false } as unknown as StampedOperation
}
