import { createHash } from 'node:crypto'
import { sql } from 'drizzle-orm'
import { canonicalJson } from '#shared/sync/same-value'
import type { Transaction } from '#server/database/client'

/** An operation as it enters the ledger. */
export interface LedgerEntry {
  id: string
  dev: string
  phone: string
  n: number
  author: string
  sv: number
  kind: string
  object: string | null
  sheet: string | null
  hlcClaimed: string
  hlcEffective: string
  body: Record<string, unknown>
  bodyHash: string
  personal: Record<string, string> | null
  claimedId: string | null
  receivedAt: string
  outcome: string
  reason: string | null
  detail: string | null
}

/** SHA-256 of an operation without its names and contacts, hexadecimal. */
export function operationHash(operation: Record<string, unknown>): string {
  const { personal: _personal, ...rest } = operation
  return createHash('sha256').update(canonicalJson(rest)).digest('hex')
}

/** Writes all entries with one statement. */
export async function writeLedger(tx: Transaction, organisation: string, ver: number, entries: readonly LedgerEntry[]): Promise<void> {
  if (entries.length === 0) return
  await tx.execute(sql`
    insert into op (organisation, id, dev, phone, n, author, sv, kind, object, sheet, hlc_claimed, hlc_effective, body, body_hash, personal, claimed_id, received_at, ver, outcome, reason, detail)
    select ${organisation}::uuid, x.id, x.dev, x.phone, x.n, x.author, x.sv, x.kind, x.object, x.sheet, x."hlcClaimed", x."hlcEffective", x.body,
      decode(x."bodyHash", 'hex'), x.personal, x."claimedId", x."receivedAt", ${ver}::bigint, x.outcome, x.reason, x.detail
    from jsonb_to_recordset(${JSON.stringify(entries)}::jsonb) as x(id uuid, dev text, phone text, n bigint, author uuid, sv int, kind text, object uuid, sheet uuid,
      "hlcClaimed" text, "hlcEffective" text, body jsonb, "bodyHash" text, personal jsonb, "claimedId" uuid, "receivedAt" timestamptz, outcome text, reason text, detail text)`)
}

/** What the ledger says of an operation that it already holds. */
export interface EarlierAnswer { outcome: string, reason: string | null }

/** The answers that were given under these ids, by id and hash, also where another operation had the id first (PUSH3). */
export async function earlierAnswers(tx: Transaction, organisation: string, ids: readonly string[]): Promise<Map<string, Map<string, EarlierAnswer>>> {
  const answers = new Map<string, Map<string, EarlierAnswer>>()
  if (ids.length === 0) return answers
  const found = await tx.execute<{ id: string, hash: string, outcome: string, reason: string | null }>(sql`
    select id, encode(body_hash, 'hex') as hash, outcome, reason from op where organisation = ${organisation} and id = any(${sql.param(ids)}::uuid[])
    union all
    select claimed_id, encode(body_hash, 'hex'), outcome, reason from op where organisation = ${organisation} and claimed_id = any(${sql.param(ids)}::uuid[])`)
  for (const { id, hash, outcome, reason } of found.rows) answers.set(id, (answers.get(id) ?? new Map()).set(hash, { outcome, reason }))
  return answers
}

/** Numbers of one phone that the ledger already holds, with the ids under which they came. */
export async function knownNumbers(tx: Transaction, organisation: string, dev: string, numbers: readonly number[]): Promise<Map<number, Set<string>>> {
  const known = new Map<number, Set<string>>()
  if (numbers.length === 0) return known
  const found = await tx.execute<{ n: string, id: string }>(sql`
    select n, coalesce(claimed_id, id) as id from op where organisation = ${organisation} and dev = ${dev} and n = any(${sql.param(numbers)}::bigint[])`)
  for (const { n, id } of found.rows) known.set(Number(n), (known.get(Number(n)) ?? new Set()).add(id))
  return known
}
