import { HLC_PATTERN, HLC_ZERO, witness } from '#shared/sync/hlc'
import { phonePageSchema, type PhonePage } from '#shared/sync/phone-page'
import { MAX_PAGE } from '#shared/sync/protocol'
import type { Row } from '#shared/sync/rows'
import { noteContact } from './contact'
import { EMPTY_CURSOR, readMeta, writeMeta, type Cursor, type FieldDatabase } from './db'
import type { FieldStore } from './field-store'
import { readAnswer } from './read-answer'
import { NoAnswer, type PullRequest } from './transport'
import type { RoundOutcome, SyncContext } from './sync-round'

/** Pulls page after page until the phone has everything that the server had when the first page was asked for. */
export async function pullRows(context: SyncContext): Promise<RoundOutcome> {
  const { store, transport, signal } = context
  const { db, surroundings } = store
  for (;;) {
    const cursor = await readMeta(db, 'cursor') ?? EMPTY_CURSOR
    const sentAt = surroundings.now()
    const started = surroundings.monotonic()
    try {
      const answer = await transport.pull({ ...queryOf(cursor), dev: await readMeta(db, 'dev') }, signal)
      const roundTripMilliseconds = surroundings.monotonic() - started
      const meaning = readAnswer(answer, phonePageSchema)
      if (meaning.kind === 'other-epoch') {
        await dropRows(store, meaning.epoch)
        continue
      }
      if (meaning.kind === 'too-large' || meaning.kind === 'not-understood') return { kind: 'busy', retryAfterSeconds: null }
      if (meaning.kind !== 'ok') return meaning
      const kept = await keepPage(store, cursor, meaning.data)
      await noteContact(store, { serverTime: meaning.data.time, sentAt, roundTripMilliseconds })
      context.onPage?.(meaning.data)
      if (kept && !meaning.data.more) return { kind: 'done' }
    }
    catch (error) {
      if (!(error instanceof NoAnswer)) throw error
      return { kind: 'no-answer', why: error.why }
    }
  }
}

/** What to ask for next. While a pull is under way `have` stays what it was, so that the pages fit together. */
export function queryOf(cursor: Cursor): PullRequest {
  const { paging } = cursor
  return {
    ...(cursor.epoch === null ? {} : { epoch: cursor.epoch }),
    ver: paging?.ver ?? cursor.ver,
    ...(paging ? { to: paging.to } : {}),
    ...(paging?.after ? { after: paging.after } : {}),
    limit: MAX_PAGE,
    have: cursor.scopes.join(','),
  }
}

/**
 * Keeps a page and the cursor in one transaction: both are there or neither is (PULL3).
 *
 * @param asked the cursor that the page was asked with; when another tab has moved it meanwhile the page is not taken
 * @returns whether the page was taken
 */
export async function keepPage(store: FieldStore, asked: Cursor, page: PhonePage): Promise<boolean> {
  const { db } = store
  return db.transaction('rw', db.rows, db.meta, async () => {
    const cursor = await readMeta(db, 'cursor') ?? EMPTY_CURSOR
    if (JSON.stringify(cursor) !== JSON.stringify(asked)) return false

    const lost = page.scopes['-']
    for (const scope of lost) await db.rows.where('scope').equals(scope).delete()
    if (page.rows.length > 0) await db.rows.bulkPut(page.rows as Row[])
    await witnessStamps(db, page.rows)

    const plus = [...new Set([...cursor.paging?.plus ?? [], ...page.scopes['+']])]
    const scopes = cursor.scopes.filter(scope => !lost.includes(scope))
    await writeMeta(db, 'cursor', page.more
      ? { epoch: page.epoch, ver: cursor.ver, scopes, paging: { ver: page.next.ver, to: page.to, after: page.next.after, plus }, isComplete: cursor.isComplete }
      : { epoch: page.epoch, ver: Math.max(cursor.ver, page.next.ver), scopes: [...new Set([...scopes, ...plus])], paging: null, isComplete: true })
    // Rows that went, or old rows of a scope that is new here, are not found by their version: all are read anew.
    await raiseRevision(db, { anew: lost.length > 0 || plus.length > 0, isChanged: page.rows.length > 0 })
    return true
  })
}

/**
 * Another epoch: the server was restored or rebuilt. Its rows are pulled anew from the beginning; the outbox and what was
 * acknowledged stay as they are (PULL5).
 */
export async function dropRows({ db }: FieldStore, epoch: string): Promise<void> {
  await db.transaction('rw', db.rows, db.meta, async () => {
    await db.rows.clear()
    await writeMeta(db, 'cursor', { ...EMPTY_CURSOR, epoch })
    await raiseRevision(db, { anew: true, isChanged: true })
  })
}

async function raiseRevision(db: FieldDatabase, { anew, isChanged }: { anew: boolean, isChanged: boolean }): Promise<void> {
  if (!anew && !isChanged) return
  const { generation, counter } = await readMeta(db, 'rowsRevision') ?? { generation: 0, counter: 0 }
  await writeMeta(db, 'rowsRevision', { generation: generation + (anew ? 1 : 0), counter: counter + 1 })
}

/** The phone's clock takes note of the stamps it sees; those of the rows are effective ones, so one bad clock does not spread. */
async function witnessStamps(db: FieldDatabase, rows: PhonePage['rows']): Promise<void> {
  const before = await readMeta(db, 'hlc') ?? HLC_ZERO
  let seen = before
  for (const row of rows) {
    const { hlc } = row.data as { hlc?: unknown }
    if (typeof hlc === 'string' && HLC_PATTERN.test(hlc)) seen = witness(seen, hlc)
  }
  if (seen !== before) await writeMeta(db, 'hlc', seen)
}
