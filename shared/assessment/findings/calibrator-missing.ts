import type { FindingRule } from './finding-rule'
import { readFlows } from './read-flows'
import { COMMON_PRACTICE } from './words'

/** A reading does not say what it was compared with. */
export const calibratorMissing: FindingRule = {
  code: 'calibrator-missing',
  find: facts => readFlows(facts).flatMap(({ summary, when, subject, part, pumpId }) => {
    const without = summary.readings.filter(reading => reading.data.calibratorId === null).length
    if (without === 0) return []
    return [{
      severity: 'attention', part, subject,
      title: `Flow ${when}${facts.ofPump(pumpId)} names no calibrator.`,
      whatNow: 'Choose the calibrator it was read with, or give the reason.',
      numbers: [{ name: 'readings without a calibrator', value: without, unit: '' }],
      rule: 'A flow reading names the calibrator it was made with.',
      source: COMMON_PRACTICE,
    }]
  }),
}
