import { RECORD_SCHEMAS, type RecordKind, type RecordOf } from '#shared/records/kinds'
import type { FieldConflict, Identified, LateChange, SheetDocument, SheetStanding } from '#shared/records/sheet-bundle'
import type { Sheet } from '#shared/records/sheet'
import type { SheetEvent } from '#shared/records/sheet-event'
import type { SheetState } from '#shared/records/sheet-state'
import { OPEN_STATE } from './merge'
import type { ConflictData, EventData, LateData, ObjectData, RegisterData, RowChange, SetData, StateData } from './rows'

/** The rows of one record, by type. */
export interface ObjectRows { obj: RowChange | null, reg: RowChange[], ev: RowChange[], set: RowChange[], state: RowChange | null, conflict: RowChange[], late: RowChange[] }

/** Puts rows together by the record they belong to. */
export function groupRows(rows: Iterable<RowChange>): Map<string, ObjectRows> {
  const groups = new Map<string, ObjectRows>()
  for (const row of rows) {
    if (row.gone) continue
    let group = groups.get(row.object)
    if (!group) groups.set(row.object, group = { obj: null, reg: [], ev: [], set: [], state: null, conflict: [], late: [] })
    if (row.t === 'obj' || row.t === 'state') group[row.t] = row
    else group[row.t].push(row)
  }
  return groups
}

/** What kind of record the rows make, or null when its creation has not arrived. */
export function kindOf(rows: ObjectRows): RecordKind | null {
  const type = (rows.obj?.data as unknown as ObjectData | undefined)?.type
  return type !== undefined && Object.hasOwn(RECORD_SCHEMAS, type) ? type as RecordKind : null
}

/**
 * The record as it stands: first values with its registers laid over.
 * A register that the schema no longer takes is left out, never the whole record.
 *
 * @returns null when the rows are of another kind
 */
export function recordOf<K extends RecordKind>(kind: K, rows: ObjectRows): Identified<RecordOf<K>> | null {
  if (kindOf(rows) !== kind) return null
  const { initial } = rows.obj!.data as unknown as ObjectData
  const schema = RECORD_SCHEMAS[kind]
  const shape = schema.shape as Record<string, { safeParse: (value: unknown) => { success: boolean, data?: unknown } }>
  const record: Record<string, unknown> = { ...initial }
  for (const row of rows.reg) {
    const { key, value } = row.data as unknown as RegisterData
    const parsed = Object.hasOwn(shape, key) ? shape[key]!.safeParse(value) : undefined
    if (parsed?.success) record[key] = parsed.data
  }
  return { ...record, id: rows.obj!.object } as Identified<RecordOf<K>>
}

/** Elements of a set that are in it. */
export function setElements(rows: ObjectRows, set: string): string[] {
  return rows.set.map(row => row.data as unknown as SetData).filter(data => data.set === set && data.isPresent).map(data => data.element)
}

/** A sheet with all that was written on it, from its rows; null when they are not a sheet's. */
export function sheetDocumentOf(rows: ObjectRows): SheetDocument | null {
  const sheet = recordOf('sheet', rows)
  if (!sheet) return null
  const created = rows.obj!.data as unknown as ObjectData
  const { id, ...fields } = sheet
  return {
    id,
    surveyId: rows.obj!.scope,
    sheet: fields as Sheet,
    origins: originsOf(rows),
    events: rows.ev.map(eventOf).sort(byInstant),
    standing: standingOf(rows),
    conflicts: rows.conflict.map(row => conflictOf(row, rows)),
    late: rows.late.map(lateOf).sort((a, b) => (a.at < b.at ? -1 : a.at > b.at ? 1 : 0)),
    createdAt: created.at,
    createdBy: created.author,
  }
}

/** TIMER1: by instant, then by id. Instants are compared as numbers, because text may or may not carry milliseconds. */
function byInstant(a: SheetEvent, b: SheetEvent): number {
  return Date.parse(a.at) - Date.parse(b.at) || (a.id < b.id ? -1 : 1)
}

function eventOf(row: RowChange): SheetEvent {
  const data = row.data as unknown as EventData
  return {
    id: row.id, type: data.type, data: data.data, at: data.at, zone: data.zone, enteredAt: data.enteredAt,
    author: data.author, by: data.by, dev: data.dev, corrects: data.corrects, reason: data.reason, void: data.void,
    clockOffsetMilliseconds: data.offset, isWaiting: data.isWaiting ?? false,
  } as SheetEvent
}

function originsOf(rows: ObjectRows): SheetDocument['origins'] {
  const origins: SheetDocument['origins'] = {}
  for (const row of rows.reg) {
    const data = row.data as unknown as RegisterData
    origins[data.key as keyof Sheet] = { opId: data.op, author: data.author, at: data.at, dev: data.dev, isWaiting: data.isWaiting ?? false }
  }
  return origins
}

function standingOf(rows: ObjectRows): SheetStanding {
  const data = rows.state ? rows.state.data as unknown as StateData : OPEN_STATE
  return {
    state: data.state as SheetState, revision: data.revision, isFit: data.isFit, reason: data.reason,
    author: data.author || null, at: data.at || null, isWaiting: data.isWaiting ?? false,
  }
}

function conflictOf(row: RowChange, rows: ObjectRows): FieldConflict {
  const data = row.data as unknown as ConflictData
  const register = rows.reg.find(candidate => candidate.id === row.id)?.data as unknown as RegisterData | undefined
  return { field: data.key, isOpen: data.isOpen, values: data.values.map(value => ({ ...value, isCurrent: value.opId === register?.op })) }
}

function lateOf(row: RowChange): LateChange {
  const data = row.data as unknown as LateData
  return { opId: data.op, reason: data.reason, author: data.author, dev: data.dev, at: data.at, kind: data.kind, body: data.body }
}
