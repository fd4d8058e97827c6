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

/** Hashes under which the ledger already holds these ids, also where another operation had the id first (PUSH3). */
export async function knownHashes(tx: Transaction, organisation: string, ids: readonly string[]): Promise<Map<string, Set<string>>> {
  const hashes = new Map<string, Set<string>>()
  if (ids.length === 0) return hashes
  const found = await tx.execute<{ id: string, hash: string }>(sql`
    select id, encode(body_hash, 'hex') as hash from op where organisation = ${organisation} and id = any(${sql.param(ids)}::uuid[])
    union all
    select claimed_id, encode(body_hash, 'hex') from op where organisation = ${organisation} and claimed_id = any(${sql.param(ids)}::uuid[])`)
  for (const { id, hash } of found.rows) hashes.set(id, (hashes.get(id) ?? new Set()).add(hash))
  return hashes
}

/** Numbers of one phone that the ledger already holds, with the operation's id. */
export async function knownNumbers(tx: Transaction, organisation: string, dev: string, numbers: readonly number[]): Promise<Map<number, string>> {
  if (numbers.length === 0) return new Map()
  const found = await tx.execute<{ n: number, id: string }>(sql`
    select n::int as n, id from op where organisation = ${organisation} and dev = ${dev} and n = any(${sql.param(numbers)}::bigint[])`)
  return new Map(found.rows.map(row => [row.n, row.id]))
}
