import type { FindingRule } from './finding-rule'
import { readFlows } from './read-flows'
import { NMAM_D } from './words'

/** Flow read without a sampler in line is not the flow of sampling. */
export const samplerNotInLine: FindingRule = {
  code: 'sampler-not-in-line',
  find: facts => readFlows(facts).flatMap(({ summary, when, subject, part, pumpId }) => {
    const without = summary.readings.filter(reading => !reading.data.samplerInLine?.trim()).length
    if (without === 0) return []
    return [{
      severity: 'attention', part, subject,
      title: `Flow ${when}${facts.ofPump(pumpId)} was read without a sampler in line (${without} of ${summary.readings.length} readings).`,
      whatNow: 'Read the flow again with a sampler of the same kind in line, or give the reason.',
      numbers: [{ name: 'readings without a sampler', value: without, unit: '' }, { name: 'readings', value: summary.readings.length, unit: '' }],
      rule: 'Each pump is calibrated with a representative sampler in line.',
      source: NMAM_D,
    }]
  }),
}
