import { sql } from 'drizzle-orm'
import type { HistoryEntry } from '#shared/records/office-views'
import type { Transaction } from '#server/database/client'

interface Entry extends Record<string, unknown> {
  id: string
  kind: string
  body: Record<string, unknown>
  receivedAt: string | Date
  author: string
  dev: string
  outcome: string
  reason: string | null
  detail: string | null
}

/** Every operation that was received for a sheet, also one that could not be read, in the order of receipt. */
export async function sheetHistory(tx: Transaction, organisation: string, sheetId: string): Promise<HistoryEntry[]> {
  const found = await tx.execute<Entry>(sql`
    select id, kind, body, received_at as "receivedAt", author, dev, outcome, reason, detail from op
    where organisation = ${organisation} and (
      sheet = ${sheetId}
      or id in (select r.id::uuid from row_state r where r.organisation = ${organisation} and r.object = ${sheetId} and r.t = 'late'))
    order by ver, dev, n, id`)
  return found.rows.map(entryOf)
}

function entryOf({ id, kind, body: operation, receivedAt, author, dev, outcome, reason, detail }: Entry): HistoryEntry {
  const received = new Date(receivedAt).toISOString()
  return {
    opId: id, kind,
    at: typeof operation.at === 'string' && !Number.isNaN(Date.parse(operation.at)) ? operation.at : received,
    receivedAt: received, author, dev, outcome,
    reason: reason !== null && detail !== null ? `${reason}: ${detail}` : reason,
    what: whatOf(kind, operation.body),
    body: operation.body ?? null,
    clockOffsetMilliseconds: typeof operation.offset === 'number' ? operation.offset : null,
  }
}

/** Which part of the body says what the change was about. */
const WHAT: Readonly<Record<string, string>> = { 'reg.set': 'key', 'ev.add': 'type', 'ev.void': 'target', 'set.add': 'set', 'set.drop': 'set', 'obj.new': 'type', 'st.req': 'transition' }

function whatOf(kind: string, body: unknown): string {
  const name = WHAT[kind]
  const part = name !== undefined && body !== null && typeof body === 'object' ? (body as Record<string, unknown>)[name] : undefined
  return typeof part === 'string' ? part : kind
}
