import { requireAbove, requireAtLeast } from './check'
import { flowChangePercent } from './deviation'
import { isBeyondPercent } from './percent'

export const FLOW_USED_RULES = ['mean', 'lower', 'nominal', 'before-only', 'after-only'] as const
export type FlowUsedRule = typeof FLOW_USED_RULES[number]

export const FLOW_USED_REASONS = [
  'change-within-attention',
  'change-beyond-attention',
  'method-uses-nominal',
  'no-flow-after',
  'no-flow-before',
] as const
export type FlowUsedReason = typeof FLOW_USED_REASONS[number]

export interface FlowUsedInput {
  /** mean flow before, L/min, 0 or more; absent or null when there is none */
  before?: number | null
  /** mean flow after, L/min, 0 or more; absent or null when there is none */
  after?: number | null
  /** the sampler's design flow, L/min, above 0 */
  nominal?: number | null
  /** whether the method computes with the nominal flow; without a nominal flow the measured ones are used */
  useNominal: boolean
  /** change beyond which the lower flow is used, %, 0 or more */
  attentionPercent: number
}

export interface FlowUsed {
  litresPerMinute: number
  rule: FlowUsedRule
  why: FlowUsedReason
}

/**
 * The one flow a sample's volume is computed with, and why that one.
 *
 * The mean of before and after, as long as they agree. When they do not, the lower: a smaller volume gives a higher, more
 * protective concentration. The nominal flow where the method says so: a cyclone that draws more cuts finer, which corrects
 * itself, so a respirable method may compute with the design flow even after a known shift. One flow alone is used as it is.
 *
 * @param input flows, L/min, and the threshold, %; see the fields
 * @returns flow in L/min with its rule and reason, or null when there is nothing to go by yet
 * @throws RangeError when a number is outside its range
 * @source common practice (mean; lower beyond 5 %); nominal flow: NIOSH NMAM, method 0600
 * @example flowUsed({ before: 2, after: 1.94, useNominal: false, attentionPercent: 5 })
 *   // { litresPerMinute: 1.97, rule: 'mean', why: 'change-within-attention' }
 */
export function flowUsed(input: FlowUsedInput): FlowUsed | null {
  const { before, after, nominal, useNominal, attentionPercent } = input
  requireAtLeast('flowUsed', 'attentionPercent', attentionPercent, 0)
  if (before != null) requireAtLeast('flowUsed', 'before', before, 0)
  if (after != null) requireAtLeast('flowUsed', 'after', after, 0)
  if (nominal != null) requireAbove('flowUsed', 'nominal', nominal, 0)

  if (useNominal && nominal != null) return { litresPerMinute: nominal, rule: 'nominal', why: 'method-uses-nominal' }
  if (before != null && after != null) return fromBoth(before, after, attentionPercent)
  if (before != null) return { litresPerMinute: before, rule: 'before-only', why: 'no-flow-after' }
  if (after != null) return { litresPerMinute: after, rule: 'after-only', why: 'no-flow-before' }
  return null
}

function fromBoth(before: number, after: number, attentionPercent: number): FlowUsed {
  if (isFarApart(before, after, attentionPercent)) {
    return { litresPerMinute: Math.min(before, after), rule: 'lower', why: 'change-beyond-attention' }
  }
  return { litresPerMinute: (before + after) / 2, rule: 'mean', why: 'change-within-attention' }
}

function isFarApart(before: number, after: number, attentionPercent: number): boolean {
  // A change from nothing has no percentage; any flow after a reading of 0 is as far away as can be.
  if (before === 0) return after > 0
  return isBeyondPercent(flowChangePercent(before, after), attentionPercent)
}
