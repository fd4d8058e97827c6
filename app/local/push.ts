import { MAX_OPERATIONS, PROTOCOL_VERSION, pushResponseSchema } from '#shared/sync/protocol'
import { SCHEMA_VERSION } from '#shared/sync/operations'
import { deviceName, EMPTY_CURSOR, readMeta, type OutboxEntry } from './db'
import { dropRows } from './pull'
import { keepAside, nextBatch, settle, whatWaits } from './outbox'
import { readAnswer } from './read-answer'
import { noteContact } from './contact'
import { NoAnswer } from './transport'
import { instantOf } from './surroundings'
import type { RoundOutcome, SyncContext } from './sync-round'

/**
 * Sends the outbox, batch after batch, oldest first, until it is empty or something stands in the way.
 * A batch that is too large or too slow is halved, down to one operation; one that cannot be read is halved until the
 * operation that spoils it is alone, which is then kept aside.
 */
export async function pushOutbox(context: SyncContext): Promise<RoundOutcome> {
  let size = context.batchSize ?? MAX_OPERATIONS
  for (;;) {
    const batch = await nextBatch(context.store, size)
    if (batch.length === 0) return { kind: 'done' }
    const outcome = await pushBatch(context, batch)
    if (outcome.kind === 'done') {
      size = Math.min(MAX_OPERATIONS, size * 2)
      context.batchSize = size
      continue
    }
    if (outcome.kind === 'other-epoch') {
      await dropRows(context.store, outcome.epoch)
      continue
    }
    if (outcome.kind === 'halve') {
      if (batch.length > 1) {
        size = context.batchSize = Math.floor(batch.length / 2)
        continue
      }
      if (outcome.why === 'timeout') return { kind: 'no-answer', why: 'timeout' }
      await keepAside(context.store, batch[0]!, outcome.why)
      size = context.batchSize = MAX_OPERATIONS
      continue
    }
    return outcome
  }
}

type BatchOutcome = RoundOutcome | { kind: 'halve', why: 'timeout' | 'too-large' | 'not-understood' } | { kind: 'other-epoch', epoch: string }

async function pushBatch(context: SyncContext, batch: OutboxEntry[]): Promise<BatchOutcome> {
  const { store, transport, signal, phone, label } = context
  const { db, surroundings } = store
  const dev = await db.transaction('rw', db.meta, () => deviceName(db, surroundings.newId))
  const cursor = await readMeta(db, 'cursor') ?? EMPTY_CURSOR
  const { pending, oldest } = await whatWaits(store)
  const sentAt = surroundings.now()
  const started = surroundings.monotonic()
  try {
    const answer = await transport.push({
      v: PROTOCOL_VERSION, dev, phone, label, epoch: cursor.epoch, sv: SCHEMA_VERSION,
      pending, oldest, blobs: 0, cursor: cursor.ver, now: instantOf(sentAt), ops: batch.map(entry => entry.op),
    }, signal)
    const roundTripMilliseconds = surroundings.monotonic() - started
    const meaning = readAnswer(answer, pushResponseSchema)
    switch (meaning.kind) {
      case 'ok':
        await settle(store, dev, batch, meaning.data)
        await noteContact(store, { serverTime: meaning.data.time, sentAt, roundTripMilliseconds })
        return { kind: 'done' }
      case 'too-large': return { kind: 'halve', why: 'too-large' }
      case 'not-understood': return { kind: 'halve', why: 'not-understood' }
      default: return meaning
    }
  }
  catch (error) {
    if (!(error instanceof NoAnswer)) throw error
    return error.why === 'timeout' ? { kind: 'halve', why: 'timeout' } : { kind: 'no-answer', why: error.why }
  }
}
