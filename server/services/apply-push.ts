import { randomUUID } from 'node:crypto'
import { and, eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/policy'
import { effectiveStamp, HLC_ZERO } from '#shared/sync/hlc'
import { operationSchema, SCHEMA_VERSION, type LooseOperation, type StampedOperation } from '#shared/sync/operations'
import { PROTOCOL_VERSION, type PushRequest, type PushResponse } from '#shared/sync/protocol'
import type { LateData, RowChange } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { device } from '#server/database/tables/device'
import { applyOperations, type Applied } from './apply-operations'
import { holdUnreadable } from './hold-unreadable'
import { storable } from './storable'
import { advanceCounter, lockCounter } from './stamp-version'
import { knownHashes, knownNumbers, operationHash, writeLedger, type LedgerEntry } from './write-ledger'

type Verdict = { kind: 'new', stamped: StampedOperation } | { kind: 'unread', reason: string, detail: string | null, parked: boolean }

/**
 * Receives a batch from a phone: everything readable enters the ledger first, then each is applied for itself, in order of
 * its number. The answer says of each that it is durably received, and what became of it.
 *
 * @param now server's clock, for effective stamps and the time of receipt
 * @returns the answer; the caller's transaction must commit before it is sent
 */
export async function applyPush(tx: Transaction, actor: Actor, request: PushRequest, now: Date): Promise<PushResponse> {
  const organisation = actor.organisationId
  const parsed = request.ops.map(storable).map(loose => ({ loose, hash: operationHash(loose), operation: operationSchema.safeParse(loose) }))
    .sort((a, b) => a.loose.n - b.loose.n)

  // From here on nobody else in this organisation writes; all that could be computed before was.
  const stamp = await lockCounter(tx, organisation)
  const receivedAt = now.toISOString()
  const [known, numbers, deviceRow] = [
    await knownHashes(tx, organisation, parsed.map(item => item.loose.id)),
    await knownNumbers(tx, organisation, request.dev, parsed.map(item => item.loose.n)),
    (await tx.select().from(device).where(and(eq(device.organisation, organisation), eq(device.dev, request.dev))))[0],
  ]
  // A phone's name belongs to the person it was given to; somebody else's name in the request is received under a name of its own.
  const dev = deviceRow && deviceRow.person !== actor.id ? `${request.dev}~${actor.id.slice(0, 8)}` : request.dev

  let lastHlc = deviceRow?.lastHlc ?? HLC_ZERO
  let fork = false
  const entries: LedgerEntry[] = []
  const answers: PushResponse['res'] = []
  const toApply: { index: number, entry: LedgerEntry, stamped: StampedOperation }[] = []
  const unread: RowChange[] = []

  for (const { loose, hash, operation } of parsed) {
    const earlier = known.get(loose.id)
    if (earlier?.has(hash)) {
      answers.push([loose.n, 'dup', null])
      continue
    }
    const claimed = numbers.get(loose.n)
    if (claimed !== undefined && claimed !== loose.id) fork = true
    const hlcEffective = effectiveStamp(loose.hlc, now.getTime(), lastHlc)
    lastHlc = hlcEffective
    const verdict = judge(loose, operation.success ? operation.data : null, operation.success ? null : messageOf(operation.error.issues), earlier !== undefined, { hlcEffective, dev, author: actor.id })
    const id = earlier === undefined ? loose.id : randomUUID()
    known.set(loose.id, (earlier ?? new Set()).add(hash))
    const entry: LedgerEntry = {
      id, dev, phone: request.phone, n: loose.n, author: actor.id, sv: loose.sv, kind: loose.kind,
      object: operation.success ? operation.data.object : null, sheet: operation.success ? operation.data.sheet : null,
      hlcClaimed: loose.hlc, hlcEffective, ...bodyOf(loose), bodyHash: hash, claimedId: id === loose.id ? null : loose.id,
      receivedAt, outcome: 'held', reason: null, detail: null,
    }
    entries.push(entry)
    if (verdict.kind === 'new') {
      toApply.push({ index: answers.length, entry, stamped: verdict.stamped })
      answers.push([loose.n, 'held', null])
    }
    else {
      Object.assign(entry, { outcome: verdict.parked ? 'parked' : 'held', reason: verdict.reason, detail: verdict.detail })
      answers.push([loose.n, entry.outcome, verdict.reason])
      unread.push(lateRow(entry, loose, organisation))
    }
  }

  const applied = await applyOperations(tx, { actor, ver: stamp.ver, receivedAt }, toApply.map(item => item.stamped))
  toApply.forEach(({ index, entry }, position) => {
    const answer: Applied = applied[position]!
    Object.assign(entry, answer)
    answers[index] = [entry.n, answer.outcome, answer.reason]
  })
  await writeLedger(tx, organisation, stamp.ver, entries)
  await holdUnreadable(tx, organisation, unread, stamp.ver)
  await noteDevice(tx, actor, { ...request, dev }, deviceRow, entries, lastHlc, now)
  const moved = entries.length > 0
  if (moved) await advanceCounter(tx, organisation, stamp.ver)

  return {
    v: PROTOCOL_VERSION, time: receivedAt, epoch: stamp.epoch, ver: moved ? stamp.ver : stamp.ver - 1,
    // Nothing is declared backed up before there is a backup to point at: phones keep what was acknowledged.
    stable: 0, fork, res: answers,
  }
}

/** Whether an operation can be applied at all; what cannot is kept as it came. */
function judge(loose: LooseOperation, operation: Parameters<typeof stampOf>[0] | null, message: string | null, isReused: boolean, who: { hlcEffective: string, dev: string, author: string }): Verdict {
  if (isReused) return { kind: 'unread', reason: 'id-reused', detail: null, parked: false }
  if (loose.sv > SCHEMA_VERSION) return { kind: 'unread', reason: 'newer-schema', detail: null, parked: true }
  if (!operation) return { kind: 'unread', reason: 'malformed', detail: message, parked: false }
  return { kind: 'new', stamped: stampOf(operation, who) }
}

function stampOf(operation: Omit<StampedOperation, 'hlcEffective' | 'dev' | 'author' | 'isWaiting'>, who: { hlcEffective: string, dev: string, author: string }): StampedOperation {
  return { ...operation, ...who, isWaiting: false } as StampedOperation
}

function bodyOf(loose: LooseOperation): { body: Record<string, unknown>, personal: Record<string, string> | null } {
  const { personal, ...body } = loose as Record<string, unknown>
  const isPlain = personal !== null && typeof personal === 'object' && !Array.isArray(personal)
  return { body, personal: isPlain ? personal as Record<string, string> : null }
}

function lateRow(entry: LedgerEntry, loose: LooseOperation, organisation: string): RowChange {
  const object = typeof loose.object === 'string' ? loose.object : organisation
  const data: LateData = { op: entry.id, kind: loose.kind, body: loose.body ?? null, reason: entry.detail ? `${entry.reason}: ${entry.detail}` : entry.reason!, author: entry.author, dev: entry.dev, at: typeof loose.at === 'string' ? loose.at : entry.receivedAt }
  return { t: 'late', id: entry.id, scope: organisation, object, gone: false, data: data as unknown as Record<string, unknown> }
}

function messageOf(issues: readonly { path: PropertyKey[], message: string }[]): string {
  return issues.slice(0, 5).map(issue => `${issue.path.map(String).join('.')}: ${issue.message}`).join('; ').slice(0, 1000)
}

/** What the office sees of the phone: what it still owes, since when, and how far its clock is off. */
async function noteDevice(tx: Transaction, actor: Actor, request: PushRequest, row: typeof device.$inferSelect | undefined, entries: readonly LedgerEntry[], lastHlc: string, now: Date): Promise<void> {
  const received = entries.filter(entry => entry.claimedId === null).length
  const acknowledged = request.ops.length
  const values = {
    organisation: actor.organisationId, dev: request.dev, phone: request.phone, label: request.label, person: actor.id,
    lastSeenAt: now.toISOString(),
    maxN: Math.max(row?.maxN ?? 0, ...entries.map(entry => entry.n)),
    received: (row?.received ?? 0) + received,
    lastHlc,
    pending: Math.max(0, request.pending - acknowledged),
    oldestAt: request.pending > acknowledged ? request.oldest : null,
    blobs: request.blobs, sv: request.sv,
    clockOffsetMilliseconds: now.getTime() - Date.parse(request.now),
  }
  await tx.insert(device).values(values).onConflictDoUpdate({ target: [device.organisation, device.dev], set: values })
}
