import { can, type Actor } from '#shared/access/policy'
import { TRANSITION_TABLE, type SheetState } from '#shared/records/sheet-state'

/** The steps that a reviewer takes on the review page; results, assessment and release have pages of their own. */
export const DECISIONS = ['accept', 'return', 'void', 'reopen'] as const
export type DecisionStep = (typeof DECISIONS)[number]

/** Decisions that the table and the policy allow this person on a sheet in this state. */
export function allowedDecisions(actor: Actor, state: SheetState): DecisionStep[] {
  return DECISIONS.filter(transition => can(actor, { do: 'step', transition }, { state }))
}

export interface DecidedSheet {
  isFit: boolean | null
  stopCount: number
}

/** Whether a decision takes a reason: always where the table says so, and to use a sheet that something speaks against. */
export function decisionNeedsReason(step: DecisionStep, { isFit, stopCount }: DecidedSheet): boolean {
  return TRANSITION_TABLE[step].needsReason || (step === 'accept' && (stopCount > 0 || isFit === false))
}

/**
 * What an acceptance says of the sample: fit, or used in spite of what speaks against it, which the reason then explains.
 * Other decisions leave what was said at hand-in.
 */
export function decidedFit(step: DecisionStep, sheet: DecidedSheet): boolean | null {
  return step === 'accept' ? !decisionNeedsReason(step, sheet) : null
}
