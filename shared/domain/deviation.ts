import { refuse, requireAbove, requireAtLeast } from './check'
import { isBeyondPercent } from './percent'

export const FLOW_CHANGE_VERDICTS = ['within', 'attention', 'stop'] as const
export type FlowChangeVerdict = typeof FLOW_CHANGE_VERDICTS[number]

export interface FlowChangeThresholds {
  /** %, 0 or more; a change beyond it needs a reason */
  attentionPercent: number
  /** %, not below attention; a change beyond it cannot be handed in as fit */
  stopPercent: number
}

/**
 * Change of flow between two calibrations, in percent of the flow **before**.
 *
 * The denominator is the flow before, because that is the flow the sample was set up with. Some publications divide by the
 * mean of the two or by the flow after; their numbers differ a little (2.0 to 1.9: -5 % of before, -5.13 % of the mean).
 *
 * @param before mean flow before sampling, L/min, above 0
 * @param after mean flow after sampling (or at a flow check), L/min, 0 or more
 * @returns change, %, negative when the flow fell
 * @throws RangeError when a flow is outside its range
 * @source common practice: (after - before) / before, published as the "5 % rule" for flows before and after
 * @example flowChangePercent(2, 1.94) // -3
 */
export function flowChangePercent(before: number, after: number): number {
  requireAbove('flowChangePercent', 'before', before, 0)
  requireAtLeast('flowChangePercent', 'after', after, 0)
  return (after - before) / before * 100
}

/**
 * Verdict on a change of flow. Exactly on a threshold is the milder verdict.
 *
 * @param percent change, %, any sign
 * @param thresholds the organisation's two thresholds, %
 * @returns `within`, `attention` or `stop`
 * @throws RangeError when the change is not finite, a threshold is negative, or stop lies below attention
 * @source common practice: two thresholds, 5 % and 10 %, both settings of the organisation
 * @example flowChangeVerdict(-5, { attentionPercent: 5, stopPercent: 10 }) // 'within'
 */
export function flowChangeVerdict(percent: number, thresholds: FlowChangeThresholds): FlowChangeVerdict {
  const { attentionPercent, stopPercent } = thresholds
  if (stopPercent < attentionPercent) refuse('flowChangeVerdict', 'stopPercent', `attentionPercent (${attentionPercent}) or more`, stopPercent)
  if (isBeyondPercent(percent, stopPercent)) return 'stop'
  return isBeyondPercent(percent, attentionPercent) ? 'attention' : 'within'
}
