import { deviationsPercent, meanFlow, spreadPercent } from './calibration'
import { flowChangePercent } from './deviation'
import { flowUsed, type FlowUsedInput, type FlowUsedReason } from './flow-used'
import { accuracyPercentAt, type IndicatorAccuracy } from './indicator-accuracy'
import type { Working, WorkingInput } from './working'

/**
 * Working of the mean of the flow readings.
 *
 * @param readings flows, L/min, at least one, each 0 or more
 * @param from where the readings come from, such as "before, pump 12"
 * @returns the working, result in L/min
 * @throws RangeError as `meanFlow`
 * @source as `meanFlow`
 * @example meanFlowWorking([2.01, 2.0, 1.99]).result // { value: 2, unit: 'L/min' }
 */
export function meanFlowWorking(readings: readonly number[], from?: string): Working {
  const value = meanFlow(readings)
  const deviations = deviationsPercent(readings)
  return {
    title: 'Mean flow',
    formula: 'sum of the readings / number of readings',
    inputs: [
      ...readings.map((reading, place) => input(`reading ${place + 1}`, reading, 'L/min', from)),
      ...deviations.map((deviation, place) => input(`reading ${place + 1} away from the mean`, deviation, '%', 'this working')),
    ],
    result: { value, unit: 'L/min' },
    source: 'NIOSH Manual of Analytical Methods, chapter D: repeat and average; three readings: common practice',
  }
}

/**
 * Working of the spread of the flow readings.
 *
 * @param readings flows, L/min, at least one, each 0 or more
 * @param from where the readings come from
 * @returns the working, result in %
 * @throws RangeError as `spreadPercent`
 * @source as `spreadPercent`
 * @example spreadWorking([1.9, 2.0, 2.1]).result // { value: 5, unit: '%' }
 */
export function spreadWorking(readings: readonly number[], from?: string): Working {
  return {
    title: 'Spread of the readings',
    formula: 'largest (reading - mean), without sign / mean × 100',
    inputs: [
      ...readings.map((reading, place) => input(`reading ${place + 1}`, reading, 'L/min', from)),
      input('mean', meanFlow(readings), 'L/min', 'Mean flow'),
    ],
    result: { value: spreadPercent(readings), unit: '%' },
    source: 'common practice',
  }
}

/**
 * Working of the change of flow.
 *
 * @param before mean flow before, L/min, above 0
 * @param after mean flow after, or at a flow check, L/min, 0 or more
 * @returns the working, result in % of the flow before
 * @throws RangeError as `flowChangePercent`
 * @source as `flowChangePercent`
 * @example flowChangeWorking(2, 1.94).result // { value: -3, unit: '%' }
 */
export function flowChangeWorking(before: number, after: number): Working {
  return {
    title: 'Change of flow',
    formula: '(flow after - flow before) / flow before × 100',
    inputs: [
      input('flow before', before, 'L/min', 'Mean flow'),
      input('flow after', after, 'L/min', 'Mean flow'),
    ],
    result: { value: flowChangePercent(before, after), unit: '%' },
    source: 'common practice',
    note: 'In percent of the flow before. Other definitions divide by the flow after or by the mean of both.',
  }
}

const FLOW_USED_FORMULAS: Record<FlowUsedReason, string> = {
  'change-within-attention': '(flow before + flow after) / 2',
  'change-beyond-attention': 'the lower of flow before and flow after',
  'method-uses-nominal': 'the nominal flow of the sampler',
  'no-flow-after': 'flow before',
  'no-flow-before': 'flow after',
}

const FLOW_USED_NOTES: Record<FlowUsedReason, string> = {
  'change-within-attention': 'The change of flow is within the threshold, so the mean is used.',
  'change-beyond-attention': 'The change of flow is beyond the threshold, so the lower flow is used: it gives the higher concentration.',
  'method-uses-nominal': 'The method computes with the nominal flow of this size-selective sampler.',
  'no-flow-after': 'There is no flow after, so the flow before is used alone.',
  'no-flow-before': 'There is no flow before, so the flow after is used alone.',
}

/**
 * Working of the flow that a volume is computed with.
 *
 * @param flows as for `flowUsed`
 * @returns the working, result in L/min, or null when there is nothing to go by yet
 * @throws RangeError as `flowUsed`
 * @source as `flowUsed`
 * @example flowUsedWorking({ before: 1.7, after: 1.58, useNominal: false, attentionPercent: 5 })?.result // { value: 1.58, unit: 'L/min' }
 */
export function flowUsedWorking(flows: FlowUsedInput): Working | null {
  const used = flowUsed(flows)
  if (!used) return null
  const inputs: WorkingInput[] = []
  if (flows.before != null) inputs.push(input('flow before', flows.before, 'L/min', 'Mean flow'))
  if (flows.after != null) inputs.push(input('flow after', flows.after, 'L/min', 'Mean flow'))
  if (flows.before != null && flows.before > 0 && flows.after != null) {
    inputs.push(input('change of flow', flowChangePercent(flows.before, flows.after), '%', 'Change of flow'))
  }
  if (flows.nominal != null) inputs.push(input('nominal flow', flows.nominal, 'L/min', 'the sampler'))
  inputs.push(input('threshold for attention', flows.attentionPercent, '%', 'settings'))
  return {
    title: 'Flow used',
    formula: FLOW_USED_FORMULAS[used.why],
    inputs,
    result: { value: used.litresPerMinute, unit: 'L/min' },
    source: used.rule === 'nominal' ? 'NIOSH Manual of Analytical Methods, method 0600' : 'common practice',
    note: FLOW_USED_NOTES[used.why],
  }
}

/**
 * Working of the accuracy of a pump's flow indicator at one flow.
 *
 * @param accuracy what the maker states
 * @param flowLitresPerMinute flow shown, L/min, 0 or more
 * @returns the working, result in % of the flow, or null when the flow is outside what the maker states
 * @throws RangeError as `accuracyPercentAt`
 * @source as `accuracyPercentAt`
 * @example indicatorAccuracyWorking(COMMON_MECHANICAL_ACCURACY, 2)?.result // { value: 12.5, unit: '%' }
 */
export function indicatorAccuracyWorking(accuracy: IndicatorAccuracy, flowLitresPerMinute: number): Working | null {
  const at = accuracyPercentAt(accuracy, flowLitresPerMinute)
  if (at.outside) return null
  const flow = input('flow', flowLitresPerMinute, 'L/min')
  const amount = input('the same as an amount', at.litresPerMinute, '± L/min', 'this working')
  const shared = { title: 'Accuracy of the flow indicator', result: { value: at.percent, unit: '%' }, source: 'the maker\'s statement' }
  if (accuracy.kind === 'percent-of-reading') {
    return {
      ...shared,
      formula: 'percent of the reading for the range this flow lies in',
      inputs: [flow, input('accuracy of the range', at.percent, '% of reading', 'the maker'), amount],
    }
  }
  return {
    ...shared,
    formula: 'percent of full scale × full scale / flow',
    inputs: [
      input('accuracy', accuracy.percent, '% of full scale', 'the maker'),
      input('full scale', accuracy.fullScaleLitresPerMinute, 'L/min', 'the maker'),
      flow,
      amount,
    ],
    note: 'The amount stays the same down the scale, so its share grows as the flow gets smaller.',
  }
}

function input(name: string, value: number | string, unit: string, from?: string): WorkingInput {
  return from === undefined ? { name, value, unit } : { name, value, unit, from }
}
