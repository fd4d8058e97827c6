import { MAX_BODY_BYTES, MAX_OPERATIONS, type PushResponse } from '#shared/sync/protocol'
import { OUTCOMES } from '#shared/sync/outcomes'
import { EMPTY_CURSOR, readMeta, writeMeta, type AcknowledgedEntry, type OutboxEntry } from './db'
import type { FieldStore } from './field-store'
import { instantOf } from './surroundings'

/** What surrounds the operations in a request, generously. */
const ENVELOPE_BYTES = 4096
const KEPT_DAYS = 30
const DAY_MILLISECONDS = 86_400_000

/**
 * The next operations to send, oldest first: at most as many as the server takes in number and in bytes.
 * A single operation above the limit of bytes is still given, alone.
 */
export async function nextBatch(store: FieldStore, maxOperations: number): Promise<OutboxEntry[]> {
  const waiting = await store.db.outbox.where('state').equals('new').sortBy('n')
  const batch: OutboxEntry[] = []
  let bytes = ENVELOPE_BYTES
  for (const entry of waiting) {
    if (batch.length >= Math.min(maxOperations, MAX_OPERATIONS)) break
    bytes += new TextEncoder().encode(JSON.stringify(entry.op)).length + 1
    if (batch.length > 0 && bytes > MAX_BODY_BYTES) break
    batch.push(entry)
  }
  return batch
}

/** What the phone still owes: how many operations, and when the oldest was written. */
export async function whatWaits(store: FieldStore): Promise<{ pending: number, oldest: string | null, oldestNumber: number | null }> {
  const { outbox } = store.db
  const oldest = await outbox.orderBy('n').first()
  return { pending: await outbox.count(), oldest: oldest?.op.enteredAt ?? null, oldestNumber: oldest?.n ?? null }
}

/**
 * Takes the answers to a batch in. Every known answer says "durably received", so the operation goes from the outbox to
 * the acknowledged ones and stays kept there (PUSH4). An unknown answer leaves it in the outbox, to be seen (PUSH7).
 * An operation without an answer stays as it is and is sent again.
 *
 * @param dev the name under which the batch was sent
 */
export async function settle(store: FieldStore, dev: string, sent: readonly OutboxEntry[], response: Pick<PushResponse, 'res' | 'ver' | 'stable' | 'fork'>): Promise<void> {
  const { db, surroundings } = store
  const acknowledgedAt = instantOf(surroundings.now())
  const sentByNumber = new Map(sent.map(entry => [entry.n, entry]))
  await db.transaction('rw', db.outbox, db.acked, db.meta, async () => {
    for (const [n, outcome, reason] of response.res) {
      const entry = sentByNumber.get(n)
      const waiting = entry && await db.outbox.get(n)
      // Another tab may have sent and settled it already, or storage went back in time and n means another operation now.
      if (!entry || !waiting || waiting.id !== entry.id) continue
      if (!(OUTCOMES as readonly string[]).includes(outcome)) {
        await db.outbox.update(n, { state: 'kept', reason: outcome })
        continue
      }
      const acknowledged: AcknowledgedEntry = {
        n, id: entry.id, sheet: entry.sheet, dev, ver: response.ver, ...meaningOf(outcome, reason), acknowledgedAt, op: entry.op,
      }
      await db.acked.put(acknowledged)
      await db.outbox.delete(n)
    }
    await writeMeta(db, 'stable', response.stable)
    // Storage of this phone went back in time and a number was given twice: both operations are received, and from
    // here on this person's phone has another name, under which no number was ever used.
    if (response.fork) await writeMeta(db, 'dev', `d_${surroundings.newId()}`)
  })
}

function meaningOf(outcome: string, reason: string | null): Pick<AcknowledgedEntry, 'outcome' | 'reason' | 'needsYou'> {
  const asksForSomebody = outcome === 'held' || outcome === 'parked' || outcome === 'refused'
  return { outcome, reason, needsYou: asksForSomebody ? 1 : 0 }
}

/** An operation that the server cannot even read, sent alone: it stays in the outbox, is shown, and stops nothing. */
export async function keepAside(store: FieldStore, entry: OutboxEntry, reason: string): Promise<void> {
  await store.db.outbox.update(entry.n, { state: 'kept', reason })
}

/** Offers what was kept aside once more, because somebody asked for it or a new version of the app is here. */
export async function offerAgain(store: FieldStore): Promise<void> {
  await store.db.outbox.where('state').equals('kept').modify({ state: 'new' })
}

/** A person has seen why a change was not taken; it stays kept. */
export async function markSeen(store: FieldStore, id: string): Promise<void> {
  await store.db.acked.where('id').equals(id).modify({ needsYou: 0 })
}

/**
 * Lets go of acknowledged operations that are backed up at the server or older than thirty days, and are in the rows
 * already. Never touches the outbox.
 */
export async function pruneAcknowledged(store: FieldStore): Promise<void> {
  const { db, surroundings } = store
  const old = instantOf(surroundings.now() - KEPT_DAYS * DAY_MILLISECONDS)
  await db.transaction('rw', db.acked, db.meta, async () => {
    const stable = await readMeta(db, 'stable') ?? 0
    const dev = await readMeta(db, 'dev')
    const cursor = await readMeta(db, 'cursor') ?? EMPTY_CURSOR
    await db.acked
      .filter(entry => entry.needsYou === 0 && entry.ver <= cursor.ver
        && ((entry.dev === dev && entry.n <= stable) || entry.acknowledgedAt < old))
      .delete()
  })
}
