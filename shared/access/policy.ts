import type { Role } from '#shared/records/person'
import { EDITABLE_STATES, isStepAllowed, TRANSITION_TABLE, type SheetState, type Transition } from '#shared/records/sheet-state'
import type { RecordKind } from '#shared/records/kinds'

/** Whoever acts: identity, organisation and roles, as the session says. */
export interface Actor {
  id: string
  organisationId: string
  roles: readonly Role[]
}

export type Action
  = | { do: 'see-office' }
    | { do: 'work-in-field' }
    | { do: 'create', kind: RecordKind }
    | { do: 'change', kind: RecordKind }
    | { do: 'step', transition: Transition }

export interface Subject {
  /** The sheet's state, where the record is a sheet. */
  state?: SheetState
  /** Whether the actor is in the crew of the survey that the record belongs to. */
  isInCrew?: boolean
}

/** What a technician may make or change on the floor; everything else is the office's. */
const FIELD_KINDS: readonly RecordKind[] = ['sheet', 'worker']

const hasRole = (actor: Actor, ...roles: Role[]) => roles.some(role => actor.roles.includes(role))

/**
 * Who may do what: the one policy. Buttons ask it before they show, the API asks it before it acts.
 * It grants nothing across organisations: the caller's data are its organisation's own.
 */
export function can(actor: Actor, action: Action, subject: Subject = {}): boolean {
  switch (action.do) {
    case 'see-office': return hasRole(actor, 'reviewer', 'administrator')
    case 'work-in-field': return hasRole(actor, 'technician', 'reviewer')
    case 'create':
    case 'change': return mayWrite(actor, action, subject)
    case 'step': return mayStep(actor, action.transition, subject)
  }
}

function mayWrite(actor: Actor, action: { do: 'create' | 'change', kind: RecordKind }, subject: Subject): boolean {
  if (action.kind === 'person' || action.kind === 'settings') return hasRole(actor, 'administrator')
  if (FIELD_KINDS.includes(action.kind)) {
    if (hasRole(actor, 'reviewer')) return true
    return hasRole(actor, 'technician') && subject.isInCrew !== false
  }
  return hasRole(actor, 'reviewer', 'administrator')
}

function mayStep(actor: Actor, transition: Transition, subject: Subject): boolean {
  if (subject.state !== undefined && !isStepAllowed(transition, subject.state)) return false
  if (!hasRole(actor, ...TRANSITION_TABLE[transition].by)) return false
  return hasRole(actor, 'reviewer') || subject.isInCrew !== false
}

/** Whether the screens of the field let this sheet be changed; the server still receives whatever arrives. */
export function isOpenForField(state: SheetState): boolean {
  return EDITABLE_STATES.includes(state)
}
