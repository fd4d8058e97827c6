import type { SaidBy } from '#shared/records/sheet-event'
import { HLC_ZERO, tick } from '#shared/sync/hlc'
import { operationSchema, SCHEMA_VERSION, type Operation, type OperationKind, type OperationOf } from '#shared/sync/operations'
import { validateOperation } from '#shared/sync/validate'
import { deviceName, readMeta, writeMeta } from './db'
import type { FieldStore } from './field-store'
import { instantOf } from './surroundings'

/** A change before it has a number, a stamp and an id of its own. */
export type OperationDraft = {
  [K in OperationKind]: {
    kind: K
    object: string
    sheet: string | null
    body: OperationOf<K>['body']
    /** When it happened, where that is not now. */
    at?: string
    by?: SaidBy | null
    /** Names and contacts only. */
    personal?: Record<string, string> | null
    /** Given where another draft of the same commit names this one. */
    id?: string
  }
}[OperationKind]

export interface CommitOptions {
  /** Typed text that has become an operation with this commit. */
  clearsDrafts?: readonly string[]
  /** Refused or held operations that this commit answers: they ask for nobody any more, and stay kept. */
  answers?: readonly string[]
}

/** The change cannot be right; nothing was written and the text stays where it was typed. */
export class InvalidChange extends Error {
  override readonly name = 'InvalidChange'
}

/** The phone did not keep the change: nothing was written, and nothing may be called saved. */
export class NotSaved extends Error {
  override readonly name = 'NotSaved'
}

/**
 * The only way anything is written down on a phone: one strict transaction over the numbers, the outbox and the drafts.
 * Resolves when that transaction has completed, which is when "saved on this phone" may be shown (OP2).
 * When it fails the database is opened anew and the same operations are tried once more.
 *
 * @returns the operations as they were written, in order
 * @throws InvalidChange when the content is impossible
 * @throws NotSaved when the phone could not keep it
 */
export async function commit(store: FieldStore, drafts: readonly OperationDraft[], options: CommitOptions = {}): Promise<Operation[]> {
  if (drafts.length === 0) return []
  // Ids and instants belong to the moment of the tap, so a second try writes the same operations and not similar ones.
  const taken = momentOf(store)
  const prepared = drafts.map(draft => ({ ...plain(draft), id: draft.id ?? store.surroundings.newId() }))
  let written: Operation[]
  try {
    written = await write(store, prepared, taken, options)
  }
  catch (error) {
    if (error instanceof InvalidChange) throw error
    written = await tryOnceMore(store, prepared, taken, options, error)
  }
  for (const tell of store.committed) tell()
  return written
}

type Prepared = OperationDraft & { id: string }
interface Moment { wallMilliseconds: number, zone: string, mono: { page: string, milliseconds: number } }

function momentOf({ surroundings }: FieldStore): Moment {
  return { wallMilliseconds: surroundings.now(), zone: surroundings.zone(), mono: { page: surroundings.page, milliseconds: surroundings.monotonic() } }
}

async function tryOnceMore(store: FieldStore, prepared: Prepared[], taken: Moment, options: CommitOptions, first: unknown): Promise<Operation[]> {
  try {
    // A phone's storage process may die in the background; the connection is then lost for good and a new one works.
    store.db.close({ disableAutoOpen: false })
    await store.db.open()
    return await write(store, prepared, taken, options)
  }
  catch (second) {
    throw new NotSaved('The phone did not keep this change.', { cause: second ?? first })
  }
}

async function write(store: FieldStore, prepared: Prepared[], taken: Moment, options: CommitOptions): Promise<Operation[]> {
  const { db, surroundings } = store
  return db.transaction('rw', db.meta, db.outbox, db.acked, db.drafts, async () => {
    // The first try may have completed without the page hearing of it.
    const ids = prepared.map(item => item.id)
    const already = [...await db.outbox.where('id').anyOf(ids).toArray(), ...await db.acked.where('id').anyOf(ids).toArray()]
    if (already.length === prepared.length) return already.map(entry => entry.op).sort((a, b) => a.n - b.n)

    await deviceName(db, surroundings.newId)
    const offset = await readMeta(db, 'offset') ?? null
    let n = await readMeta(db, 'n') ?? 0
    let hlc = await readMeta(db, 'hlc') ?? HLC_ZERO
    const operations: Operation[] = []
    for (const draft of prepared) {
      n += 1
      hlc = tick(hlc, taken.wallMilliseconds)
      operations.push(operationOf(draft, { n, hlc, offset, taken }))
    }
    await db.outbox.bulkAdd(operations.map(op => ({ n: op.n, id: op.id, sheet: op.sheet, state: 'new', reason: null, op })))
    await writeMeta(db, 'n', n)
    await writeMeta(db, 'hlc', hlc)
    if (options.clearsDrafts?.length) await db.drafts.bulkDelete([...options.clearsDrafts])
    if (options.answers?.length) await db.acked.where('id').anyOf([...options.answers]).modify({ needsYou: 0 })
    return operations
  })
}

function operationOf(draft: Prepared, numbers: { n: number, hlc: string, offset: number | null, taken: Moment }): Operation {
  const enteredAt = instantOf(numbers.taken.wallMilliseconds)
  const parsed = operationSchema.safeParse({
    id: draft.id,
    n: numbers.n,
    hlc: numbers.hlc,
    sv: SCHEMA_VERSION,
    object: draft.object,
    sheet: draft.sheet,
    at: draft.at ?? enteredAt,
    enteredAt,
    zone: numbers.taken.zone,
    mono: numbers.taken.mono,
    offset: numbers.offset,
    by: draft.by ?? null,
    personal: draft.personal ?? null,
    kind: draft.kind,
    body: draft.body,
  })
  if (!parsed.success) throw new InvalidChange(parsed.error.issues.map(issue => issue.message).join('; '))
  const operation = parsed.data
  const kind = operation.kind === 'obj.new' ? operation.body.type : operation.sheet === operation.object ? 'sheet' : null
  const validation = kind ? validateOperation(operation, kind) : { ok: true as const }
  if (!validation.ok) throw new InvalidChange(validation.message)
  return operation
}

/** Only plain JSON goes into the database: a screen's reactive objects cannot be cloned into it. */
function plain<T>(value: T): T {
  return JSON.parse(JSON.stringify(value)) as T
}
