import { ROW_TYPES, type RowChange, type RowType } from '#shared/sync/rows'
import { overlay } from '#shared/sync/overlay'
import { groupRows, type ObjectRows } from '#shared/sync/read-rows'
import type { StampedOperation } from '#shared/sync/operations'
import { EMPTY_CURSOR, readMeta, type AcknowledgedEntry, type Cursor, type OutboxEntry, type RowsRevision } from './db'
import type { FieldStore } from './field-store'

/** A change that a person should look at: received by the server and not applied, or kept here. */
export interface Refusal { n: number, id: string, sheet: string | null, op: OutboxEntry['op'], reason: string, outcome: string }

/** What the screens see: the rows as last pulled with this phone's own operations laid over them. */
export interface FieldView {
  /** Rows of each record. A record that did not change keeps its object from one view to the next. */
  groups: ReadonlyMap<string, ObjectRows>
  /** Raised when any record changed. */
  revision: number
  outbox: readonly OutboxEntry[]
  refusals: readonly Refusal[]
  cursor: Cursor
  /** The name under which this phone writes. */
  dev: string
}

interface LaidOver { base: ObjectBase | undefined, operations: string, group: ObjectRows | undefined, notApplied: readonly { id: string, reason: string }[] }
interface ObjectBase { rows: Map<string, RowChange>, group: ObjectRows | undefined }

/**
 * Reads the view again and again and keeps what did not change, so that one more reading on one sheet of a busy day
 * costs that one sheet. `read` is made for Dexie's `liveQuery`.
 */
export function createViewReader(store: FieldStore): { read: () => Promise<FieldView> } {
  const { db, person } = store
  const base = new Map<string, ObjectBase>()
  const laidOver = new Map<string, LaidOver>()
  let known: RowsRevision & { maxVer: number } = { generation: -1, counter: -1, maxVer: 0 }
  let last: FieldView | undefined

  async function read(): Promise<FieldView> {
    const snapshot = await db.transaction('r', db.meta, db.rows, db.outbox, db.acked, async () => {
      const revision = await readMeta(db, 'rowsRevision') ?? { generation: 0, counter: 0 }
      const cursor = await readMeta(db, 'cursor') ?? EMPTY_CURSOR
      const dev = await readMeta(db, 'dev') ?? ''
      const outbox = await db.outbox.orderBy('n').toArray()
      const acked = await db.acked.where('ver').above(cursor.ver).toArray()
      const needing = await db.acked.where('needsYou').equals(1).toArray()
      const isWhole = revision.generation !== known.generation
      const rows = isWhole
        ? await db.rows.toArray()
        : revision.counter > known.counter ? await db.rows.where('ver').aboveOrEqual(known.maxVer).toArray() : []
      return { revision, cursor, dev, outbox, acked, needing, isWhole, rows }
    })
    takeRows(snapshot)
    return last = layOver(snapshot)
  }

  function takeRows({ revision, isWhole, rows }: { revision: RowsRevision, isWhole: boolean, rows: RowChange[] & { ver: number }[] }) {
    // A slower read that began before a faster one must not put older rows over newer ones.
    if (!isWhole && (revision.generation !== known.generation || revision.counter <= known.counter)) return
    if (isWhole && revision.generation < known.generation) return
    if (isWhole) base.clear()
    const touched = new Set<string>()
    let maxVer = isWhole ? 0 : known.maxVer
    for (const row of rows) {
      if (row.ver > maxVer) maxVer = row.ver
      // A row of a kind that this version does not know stays in the database for the next one.
      if (!(ROW_TYPES as readonly string[]).includes(row.t)) continue
      const rowsOf = touched.has(row.object) ? base.get(row.object)!.rows : new Map(base.get(row.object)?.rows)
      rowsOf.set(keyOf(row), row)
      base.set(row.object, { rows: rowsOf, group: undefined })
      touched.add(row.object)
    }
    for (const object of touched) {
      const entry = base.get(object)!
      entry.group = groupRows(entry.rows.values()).get(object)
    }
    known = { ...revision, maxVer }
  }

  function layOver({ cursor, dev, outbox, acked, needing }: { cursor: Cursor, dev: string, outbox: OutboxEntry[], acked: AcknowledgedEntry[], needing: AcknowledgedEntry[] }): FieldView {
    const operations: StampedOperation[] = [
      // Received, and on its way back in the pull: until then it would be missing from the screen.
      ...acked.filter(entry => isApplied(entry.outcome)).map(entry => stamp(entry.op, entry.dev, false)),
      ...outbox.map(entry => stamp(entry.op, dev, true)),
    ].sort((a, b) => a.n - b.n)
    const byObject = new Map<string, StampedOperation[]>()
    for (const operation of operations) {
      const list = byObject.get(operation.object)
      if (list) list.push(operation)
      else byObject.set(operation.object, [operation])
    }

    const groups = new Map<string, ObjectRows>()
    for (const [object, entry] of base) if (entry.group) groups.set(object, entry.group)
    const notApplied: { id: string, reason: string }[] = []
    for (const object of laidOver.keys()) if (!byObject.has(object)) laidOver.delete(object)
    for (const [object, list] of byObject) {
      const result = laidOverObject(object, list)
      if (result.group) groups.set(object, result.group)
      notApplied.push(...result.notApplied)
    }
    return {
      groups,
      revision: last && isSame(last.groups, groups) ? last.revision : (last?.revision ?? 0) + 1,
      outbox,
      refusals: refusalsOf(outbox, needing, notApplied),
      cursor,
      dev,
    }
  }

  function laidOverObject(object: string, list: StampedOperation[]): LaidOver {
    const entry = base.get(object)
    const key = list.map(operation => `${operation.id}${operation.isWaiting ? '' : '+'}`).join(' ')
    const cached = laidOver.get(object)
    if (cached && cached.base === entry && cached.operations === key) return cached
    const result = overlay([...entry?.rows.values() ?? []], list, person.organisationId)
    const made: LaidOver = { base: entry, operations: key, group: groupRows(result.rows).get(object), notApplied: result.notApplied }
    laidOver.set(object, made)
    return made
  }

  function stamp(op: OutboxEntry['op'], dev: string, isWaiting: boolean): StampedOperation {
    return { ...op, hlcEffective: op.hlc, dev, author: person.id, isWaiting }
  }

  return { read }
}

function keyOf(row: { t: RowType, id: string }): string {
  return `${row.t} ${row.id}`
}

/** Whether the answer means that the change is in the record; every other one is received and stands beside it. */
export function isApplied(outcome: string): boolean {
  return outcome === 'ok' || outcome === 'dup' || outcome === 'conflict'
}

function isSame(a: ReadonlyMap<string, ObjectRows>, b: ReadonlyMap<string, ObjectRows>): boolean {
  if (a.size !== b.size) return false
  for (const [object, group] of b) if (a.get(object) !== group) return false
  return true
}

function refusalsOf(outbox: OutboxEntry[], needing: AcknowledgedEntry[], notApplied: { id: string, reason: string }[]): Refusal[] {
  const known = new Map(notApplied.map(item => [item.id, item.reason]))
  return [
    ...needing.map(entry => ({ n: entry.n, id: entry.id, sheet: entry.sheet, op: entry.op, reason: entry.reason ?? entry.outcome, outcome: entry.outcome })),
    ...outbox.flatMap((entry) => {
      const common = { n: entry.n, id: entry.id, sheet: entry.sheet, op: entry.op }
      if (entry.state === 'kept') return [{ ...common, reason: entry.reason ?? 'unknown-outcome', outcome: 'kept' }]
      const reason = known.get(entry.id)
      return reason === undefined ? [] : [{ ...common, reason, outcome: entry.op.kind === 'st.req' ? 'refused' : 'held' }]
    }),
  ].sort((a, b) => a.n - b.n)
}
