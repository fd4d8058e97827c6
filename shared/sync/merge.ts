import { RECORD_SCHEMAS, RECORD_SCOPES, type RecordKind } from '#shared/records/kinds'
import { isLocked, isStepAllowed, TRANSITION_TABLE, type SheetState } from '#shared/records/sheet-state'
import type { OperationOf, StampedOperation } from './operations'
import type { HeldReason, RefusedReason } from './outcomes'
import { registerRowId, setRowId, type ConflictData, type ConflictValue, type EventData, type LateData, type ObjectData, type RegisterData, type Row, type RowChange, type RowType, type SetData, type StateData } from './rows'
import { sameValue } from './same-value'
import { validateOperation } from './validate'

/** Rows by key, as far as they are needed; see `rowKeysOf`. */
export type RowReader = (t: RowType, id: string) => RowChange | Row | undefined

export type MergeResult
  = | { outcome: 'ok' | 'conflict', reason: null, rows: RowChange[] }
    | { outcome: 'held', reason: HeldReason, detail: string | null, rows: RowChange[] }
    | { outcome: 'refused', reason: RefusedReason, rows: RowChange[] }

/** What the caller adds to the table of steps: stop findings, rights. Absent on a phone that only lays its own outbox over. */
export type StepGuard = (operation: OperationOf<'st.req'>, state: SheetState) => RefusedReason | null

/** The keys of the rows that decide an operation. */
export function rowKeysOf(operation: StampedOperation): [RowType, string][] {
  const keys: [RowType, string][] = [['obj', operation.object], ['state', operation.object]]
  if (operation.kind === 'reg.set') {
    const id = registerRowId(operation.object, operation.body.key)
    keys.push(['reg', id], ['conflict', id])
  }
  if (operation.kind === 'ev.add') keys.push(['ev', operation.id])
  if (operation.kind === 'ev.void') keys.push(['ev', operation.body.target])
  if (operation.kind === 'set.add' || operation.kind === 'set.drop') keys.push(['set', setRowId(operation.object, operation.body.set, operation.body.element)])
  return keys
}

/**
 * What an operation does to the rows: the one merge rule of each kind of change. Pure (MERGE10).
 *
 * @param operation stamped with the effective clock, its phone and its author
 * @param read rows as they stand before it
 * @param organisation the scope of the organisation's own records
 * @param guard further conditions for a step in a sheet's life
 */
export function merge(operation: StampedOperation, read: RowReader, organisation: string, guard?: StepGuard): MergeResult {
  if (operation.kind === 'obj.new') return createObject(operation, read, organisation)

  const target = read('obj', operation.object)
  if (!target) return held(operation, 'unknown-object', null, organisation)
  const kind = (target.data as unknown as ObjectData).type as RecordKind

  const validation = validateOperation(operation, kind)
  if (!validation.ok) return held(operation, 'invalid', validation.message, target.scope)

  const state = stateOf(read('state', operation.object))
  if (operation.kind === 'st.req') return takeStep(operation, target.scope, state, guard)
  if (isLocked(state.state as SheetState)) return held(operation, 'locked', null, target.scope)

  switch (operation.kind) {
    case 'reg.set': return setRegister(operation, read, target)
    case 'ev.add': return addEvent(operation, read, target.scope)
    case 'ev.void': return voidEvent(operation, read, target.scope)
    case 'set.add':
    case 'set.drop': return changeSet(operation, read, target.scope)
  }
}

/** The standing of a sheet that no step was taken on yet. */
export const OPEN_STATE: StateData = { state: 'open', revision: 0, isFit: null, reason: null, author: '', at: '', transition: '' }

function stateOf(row: RowChange | undefined): StateData {
  return row ? row.data as unknown as StateData : OPEN_STATE
}

function done(rows: RowChange[], outcome: 'ok' | 'conflict' = 'ok'): MergeResult {
  return { outcome, reason: null, rows }
}

function row(t: RowType, id: string, operation: StampedOperation, scope: string, data: unknown): RowChange {
  return { t, id, scope, object: operation.object, gone: false, data: data as Record<string, unknown> }
}

/** Received, kept, not applied: the change stands beside its record for a person to look at (PUSH6, MERGE9). */
export function held(operation: StampedOperation, reason: HeldReason, detail: string | null, scope: string): MergeResult {
  const data: LateData = {
    op: operation.id, kind: operation.kind, body: operation.body, reason: detail ? `${reason}: ${detail}` : reason,
    author: operation.author, dev: operation.dev, at: operation.at,
  }
  return { outcome: 'held', reason, detail, rows: [row('late', operation.id, operation, scope, data)] }
}

function createObject(operation: OperationOf<'obj.new'> & StampedOperation, read: RowReader, organisation: string): MergeResult {
  if (read('obj', operation.object)) return done([])
  const { type, parent, initial } = operation.body
  const inSurvey = RECORD_SCOPES[type] === 'survey'
  const scope = inSurvey ? (type === 'survey' ? operation.object : parent) : organisation
  if (scope === null) return held(operation, 'invalid', `A ${type} belongs to a survey.`, organisation)
  const validation = validateOperation(operation, type)
  if (!validation.ok) return held(operation, 'invalid', validation.message, scope)
  const data: ObjectData = {
    type, parent, initial: RECORD_SCHEMAS[type].parse(initial) as Record<string, unknown>,
    op: operation.id, author: operation.author, dev: operation.dev, at: operation.at,
    ...waiting(operation),
  }
  return done([row('obj', operation.object, operation, scope, data)])
}

function setRegister(operation: OperationOf<'reg.set'> & StampedOperation, read: RowReader, target: RowChange): MergeResult {
  const { key, value, base, resolves } = operation.body
  const id = registerRowId(operation.object, key)
  const currentRow = read('reg', id)
  const current = currentRow?.data as unknown as RegisterData | undefined
  if (current?.op === operation.id) return done([])

  const created = target.data as unknown as ObjectData
  const next: RegisterData = {
    key, value, op: operation.id, hlc: operation.hlcEffective, author: operation.author, dev: operation.dev, at: operation.at,
    previous: current
      ? { op: current.op, value: current.value, author: current.author, at: current.at }
      : { op: created.op, value: created.initial[key] ?? null, author: created.author, at: created.at },
    ...waiting(operation),
  }
  const openConflict = conflictOf(read('conflict', id))
  const isConcurrent = current !== undefined && current.op !== base && !sameValue(current.value, value)

  if (!isConcurrent) {
    // The same value from two phones: the later stamp stands, and an open conflict has its answer (MERGE5).
    const winner = current !== undefined && current.op !== base && !isLater(next, current) ? current : next
    const rows = [row('reg', id, operation, target.scope, winner)]
    if (openConflict?.isOpen && (resolves || current?.op !== base)) {
      rows.push(row('conflict', id, operation, target.scope, { ...openConflict, isOpen: false, closedBy: operation.id } satisfies ConflictData))
    }
    return done(rows)
  }

  const winner = isLater(next, current) ? next : current
  const known = openConflict?.isOpen ? openConflict.values : [valueOf(current)]
  const values = [...known.filter(item => item.opId !== operation.id), valueOf(next)]
  const conflict: ConflictData = { key, isOpen: true, values, closedBy: null }
  return done([
    row('reg', id, operation, target.scope, winner),
    row('conflict', id, operation, target.scope, conflict),
  ], 'conflict')
}

/** MERGE3: stamp, then phone, then operation; text order on fixed-width text. */
function isLater(a: RegisterData | SetData, b: RegisterData | SetData): boolean {
  if (a.hlc !== b.hlc) return a.hlc > b.hlc
  if (a.dev !== b.dev) return a.dev > b.dev
  return a.op > b.op
}

function valueOf(register: RegisterData): ConflictValue {
  return { opId: register.op, value: register.value, author: register.author, at: register.at, dev: register.dev }
}

function conflictOf(conflict: RowChange | undefined): ConflictData | undefined {
  return conflict?.data as unknown as ConflictData | undefined
}

function addEvent(operation: OperationOf<'ev.add'> & StampedOperation, read: RowReader, scope: string): MergeResult {
  if (read('ev', operation.id)) return done([])
  const { type, data, corrects, reason } = operation.body
  const event: EventData = {
    type, data, corrects, reason,
    at: operation.at, enteredAt: operation.enteredAt, zone: operation.zone, offset: operation.offset, mono: operation.mono,
    author: operation.author, by: operation.by, dev: operation.dev, void: null,
    ...waiting(operation),
  }
  return done([row('ev', operation.id, operation, scope, event)])
}

function voidEvent(operation: OperationOf<'ev.void'> & StampedOperation, read: RowReader, scope: string): MergeResult {
  const target = read('ev', operation.body.target)
  if (!target || target.object !== operation.object) return held(operation, 'unknown-event', null, scope)
  const event = target.data as unknown as EventData
  if (event.void) return done([])
  const taken: EventData = { ...event, void: { opId: operation.id, reason: operation.body.reason, author: operation.author, at: operation.at } }
  return done([row('ev', target.id, operation, scope, taken)])
}

function changeSet(operation: (OperationOf<'set.add'> | OperationOf<'set.drop'>) & StampedOperation, read: RowReader, scope: string): MergeResult {
  const { set, element } = operation.body
  const id = setRowId(operation.object, set, element)
  const current = read('set', id)?.data as unknown as SetData | undefined
  const next: SetData = {
    set, element, isPresent: operation.kind === 'set.add',
    meta: operation.kind === 'set.add' ? operation.body.meta : current?.meta ?? {},
    op: operation.id, hlc: operation.hlcEffective, dev: operation.dev,
  }
  if (current && !isLater(next, current)) return done([])
  return done([row('set', id, operation, scope, next)])
}

function takeStep(operation: OperationOf<'st.req'> & StampedOperation, scope: string, state: StateData, guard?: StepGuard): MergeResult {
  const { transition, expect, fit, reason } = operation.body
  const refused = (why: RefusedReason): MergeResult => ({ outcome: 'refused', reason: why, rows: [] })
  if (state.revision !== expect) return refused('stale-state')
  if (!isStepAllowed(transition, state.state as SheetState)) return refused('not-from-here')
  const needsReason = TRANSITION_TABLE[transition].needsReason || (transition === 'hand-in' && fit === false)
  if (needsReason && !reason?.trim()) return refused('needs-reason')
  const against = guard?.(operation, state.state as SheetState)
  if (against) return refused(against)
  const next: StateData = {
    state: TRANSITION_TABLE[transition].to,
    revision: state.revision + 1,
    isFit: fit ?? state.isFit,
    reason, author: operation.author, at: operation.at, transition,
    ...waiting(operation),
  }
  return done([row('state', operation.object, operation, scope, next)])
}

function waiting(operation: StampedOperation): { isWaiting?: true } {
  return operation.isWaiting ? { isWaiting: true } : {}
}
