import type { FindingRule } from './finding-rule'
import { readFlows } from './read-flows'

/** Fewer readings than the organisation wants for one mean. */
export const fewReadings: FindingRule = {
  code: 'few-readings',
  find: facts => readFlows(facts).flatMap(({ summary, when, subject, part, pumpId }) => {
    const count = summary.readings.length
    if (count >= facts.settings.minimumReadings) return []
    return [{
      severity: 'attention', part, subject,
      title: `Flow ${when}${facts.ofPump(pumpId)} has ${count} of ${facts.settings.minimumReadings} readings.`,
      whatNow: 'Read the flow again until there are enough, or give the reason.',
      numbers: [{ name: 'readings', value: count, unit: '' }, { name: 'readings wanted', value: facts.settings.minimumReadings, unit: '' }],
      rule: `At least ${facts.settings.minimumReadings} readings make a mean.`,
      source: 'NIOSH Manual of Analytical Methods, chapter D: repeat at least twice more; the number is a setting of the organisation',
    }]
  }),
}
