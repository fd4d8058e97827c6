import { randomUUID } from 'node:crypto'
import { and, eq, inArray } from 'drizzle-orm'
import type { Actor } from '#shared/access/policy'
import { idSchema } from '#shared/records/base'
import { effectiveStamp, HLC_ZERO } from '#shared/sync/hlc'
import type { StampedOperation } from '#shared/sync/operations'
import { PROTOCOL_VERSION, type PushRequest, type PushResponse } from '#shared/sync/protocol'
import type { Transaction } from '#server/database/client'
import { device } from '#server/database/tables/device'
import { applyOperations } from './apply-operations'
import { holdUnreadable } from './hold-unreadable'
import { readOperation, type Received } from './read-operation'
import { advanceCounter, lockCounter } from './stamp-version'
import { earlierAnswers, knownNumbers, writeLedger, type LedgerEntry } from './write-ledger'

/** What a phone says of itself beside its operations. */
export type PushEnvelope = Omit<PushRequest, 'ops'>

/** Answers that a phone must see again when the first one was lost on the way; everything else that came before is a `dup`. */
const ANSWERED_AGAIN = ['held', 'parked', 'refused']

/** Columns of the database hold no greater whole number than this. */
const INTEGER_LIMIT = 2_147_483_647

/** Receives a push in one transaction; see `receivePush` for the door that phones come through. */
export function applyPush(tx: Transaction, actor: Actor, request: PushRequest, now: Date): Promise<PushResponse> {
  const { ops, ...envelope } = request
  return applyReceived(tx, actor, envelope, ops.map(readOperation), now)
}

/**
 * Receives a batch from a phone: everything enters the ledger, then each operation is applied for itself, in order of its
 * number. The answer says of each that it is durably received, and what became of it.
 *
 * @param now server's clock, for effective stamps and the time of receipt
 * @returns the answer; the caller's transaction must commit before it is sent
 */
export async function applyReceived(tx: Transaction, actor: Actor, envelope: PushEnvelope, batch: readonly Received[], now: Date): Promise<PushResponse> {
  const organisation = actor.organisationId
  const inOrder = [...batch].sort((a, b) => a.loose.n - b.loose.n || (a.loose.id < b.loose.id ? -1 : 1))

  // From here on nobody else in this organisation writes; all that could be computed before was.
  const stamp = await lockCounter(tx, organisation)
  const receivedAt = now.toISOString()
  const { dev, row: deviceRow } = await findDevice(tx, actor, envelope.dev)
  const earlier = await earlierAnswers(tx, organisation, inOrder.map(item => item.loose.id))
  const numbers = await knownNumbers(tx, organisation, dev, inOrder.map(item => item.loose.n))

  let lastHlc = deviceRow?.lastHlc ?? HLC_ZERO
  let fork = false
  const entries: LedgerEntry[] = []
  const answers: PushResponse['res'] = []
  const toApply: { index: number, entry: LedgerEntry, stamped: StampedOperation }[] = []
  const unread: LedgerEntry[] = []

  for (const received of inOrder) {
    const { loose, hash, operation } = received
    const underThisId = earlier.get(loose.id)
    const before = underThisId?.get(hash)
    if (before) {
      answers.push(ANSWERED_AGAIN.includes(before.outcome) ? [loose.n, before.outcome, before.reason] : [loose.n, 'dup', null])
      continue
    }
    const underThisNumber = numbers.get(loose.n)
    if (underThisNumber && !underThisNumber.has(loose.id)) fork = true
    numbers.set(loose.n, (underThisNumber ?? new Set()).add(loose.id))
    earlier.set(loose.id, (underThisId ?? new Map()).set(hash, { outcome: 'ok', reason: null }))

    const hlcEffective = effectiveStamp(loose.hlc, now.getTime(), lastHlc)
    lastHlc = hlcEffective
    const entry: LedgerEntry = {
      id: underThisId ? randomUUID() : loose.id, claimedId: underThisId ? loose.id : null,
      dev, phone: envelope.phone, n: loose.n, author: actor.id, sv: Math.min(loose.sv, INTEGER_LIMIT), kind: loose.kind,
      object: idOf(loose.object), sheet: idOf(loose.sheet),
      hlcClaimed: loose.hlc, hlcEffective, body: received.body, bodyHash: hash, personal: received.personal,
      receivedAt, outcome: 'held', reason: null, detail: null,
    }
    entries.push(entry)
    if (operation && !underThisId) {
      toApply.push({ index: answers.length, entry, stamped: { ...operation, hlcEffective, dev, author: actor.id, isWaiting: false } })
      answers.push([loose.n, 'held', null])
      continue
    }
    Object.assign(entry, underThisId ? { outcome: 'held', reason: 'id-reused' } : received.unread)
    answers.push([loose.n, entry.outcome, entry.reason])
    unread.push(entry)
  }

  const applied = await applyOperations(tx, { actor, ver: stamp.ver, receivedAt }, toApply.map(item => item.stamped))
  toApply.forEach(({ index, entry }, position) => {
    const answer = applied[position]!
    Object.assign(entry, answer)
    answers[index] = [entry.n, answer.outcome, answer.reason]
  })
  await writeLedger(tx, organisation, stamp.ver, entries)
  await holdUnreadable(tx, organisation, unread, stamp.ver)
  await noteDevice(tx, actor, { ...envelope, dev }, deviceRow, entries, inOrder.length, lastHlc, now)
  const moved = entries.length > 0
  if (moved) await advanceCounter(tx, organisation, stamp.ver)

  return {
    v: PROTOCOL_VERSION, time: receivedAt, epoch: stamp.epoch, ver: moved ? stamp.ver : stamp.ver - 1,
    // Nothing is declared backed up before there is a backup to point at: phones keep what was acknowledged.
    stable: 0, fork, res: answers,
  }
}

/**
 * The device under its name. A name belongs to the person who first sent under it; when somebody else's name comes in, what it
 * brings is received under a name of its own.
 */
async function findDevice(tx: Transaction, actor: Actor, claimed: string): Promise<{ dev: string, row: typeof device.$inferSelect | undefined }> {
  const own = `${claimed}~${actor.id.slice(0, 8)}`
  const rows = await tx.select().from(device).where(and(eq(device.organisation, actor.organisationId), inArray(device.dev, [claimed, own])))
  const first = rows.find(row => row.dev === claimed)
  if (!first || first.person === actor.id) return { dev: claimed, row: first }
  return { dev: own, row: rows.find(row => row.dev === own) }
}

/** The id that an operation names, where it is one; also of an operation that cannot be read otherwise. */
function idOf(named: unknown): string | null {
  const id = idSchema.safeParse(named)
  return id.success ? id.data : null
}

/** What the office sees of the phone: what it still owes, since when, and how far its clock is off. */
async function noteDevice(tx: Transaction, actor: Actor, envelope: PushEnvelope, row: typeof device.$inferSelect | undefined, entries: readonly LedgerEntry[], acknowledged: number, lastHlc: string, now: Date): Promise<void> {
  const values = {
    organisation: actor.organisationId, dev: envelope.dev, phone: envelope.phone, label: envelope.label, person: actor.id,
    lastSeenAt: now.toISOString(),
    maxN: Math.max(row?.maxN ?? 0, ...entries.map(entry => entry.n)),
    received: (row?.received ?? 0) + entries.filter(entry => entry.claimedId === null).length,
    lastHlc,
    pending: Math.min(Math.max(0, envelope.pending - acknowledged), INTEGER_LIMIT),
    oldestAt: envelope.pending > acknowledged ? envelope.oldest : null,
    blobs: Math.min(envelope.blobs, INTEGER_LIMIT), sv: Math.min(envelope.sv, INTEGER_LIMIT),
    clockOffsetMilliseconds: now.getTime() - Date.parse(envelope.now),
  }
  await tx.insert(device).values(values).onConflictDoUpdate({ target: [device.organisation, device.dev], set: values })
}
