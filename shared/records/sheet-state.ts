import * as z from 'zod'
import type { Role } from './person'

/**
 * The life of a sample sheet.
 *
 * The technician's half (`planned` to `checked`) is derived from events, see `sheetProgress` in the assessment; on record it is
 * one state, `open`. From there this table rules, and the server decides.
 */
export const SHEET_STATES = ['open', 'handed-in', 'returned', 'accepted', 'void', 'resulted', 'assessed', 'released'] as const
export const sheetStateSchema = z.enum(SHEET_STATES)
export type SheetState = z.infer<typeof sheetStateSchema>

export const TRANSITIONS = ['hand-in', 'return', 'accept', 'void', 'reopen', 'result', 'assess', 'release'] as const
export const transitionSchema = z.enum(TRANSITIONS)
export type Transition = z.infer<typeof transitionSchema>

interface TransitionRule {
  from: readonly SheetState[]
  to: SheetState
  by: readonly Role[]
  /** A reason is always asked for. */
  needsReason: boolean
}

/** Every step that a sheet can take, and nothing else. */
export const TRANSITION_TABLE: Readonly<Record<Transition, TransitionRule>> = {
  'hand-in': { from: ['open', 'returned'], to: 'handed-in', by: ['technician', 'reviewer'], needsReason: false },
  'return': { from: ['handed-in'], to: 'returned', by: ['reviewer'], needsReason: true },
  'accept': { from: ['handed-in'], to: 'accepted', by: ['reviewer'], needsReason: false },
  'void': { from: ['handed-in', 'accepted'], to: 'void', by: ['reviewer'], needsReason: true },
  'reopen': { from: ['accepted', 'void'], to: 'handed-in', by: ['reviewer'], needsReason: true },
  'result': { from: ['accepted'], to: 'resulted', by: ['reviewer'], needsReason: false },
  'assess': { from: ['resulted'], to: 'assessed', by: ['reviewer'], needsReason: false },
  'release': { from: ['assessed'], to: 'released', by: ['reviewer'], needsReason: false },
}

/** States in which a sheet takes no more changes: what arrives is held beside it. */
export const LOCKED_STATES: readonly SheetState[] = ['accepted', 'void', 'resulted', 'assessed', 'released']

/** States in which its technician may change a sheet. */
export const EDITABLE_STATES: readonly SheetState[] = ['open', 'returned']

export function isLocked(state: SheetState): boolean {
  return LOCKED_STATES.includes(state)
}

/** Whether the table allows this step from this state; who may take it is for `can()`. */
export function isStepAllowed(transition: Transition, from: SheetState): boolean {
  return TRANSITION_TABLE[transition].from.includes(from)
}
