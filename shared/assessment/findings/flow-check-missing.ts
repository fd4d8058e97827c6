import type { FindingRule } from './finding-rule'
import { minutesText } from './words'

/** A long run during which nobody looked at the flow. */
export const flowCheckMissing: FindingRule = {
  code: 'flow-check-missing',
  find({ air, timeline, sampledMinutes, checks, settings }) {
    if (air !== 'pumped' || timeline.state !== 'stopped' || checks.length > 0 || sampledMinutes === null || sampledMinutes <= settings.checkEveryMinutes) return null
    return {
      severity: 'note', part: 'air',
      title: `No flow check in ${minutesText(sampledMinutes)}.`,
      whatNow: 'If the pump was looked at, note it with its time.',
      numbers: [{ name: 'sampled minutes', value: sampledMinutes, unit: 'min' }, { name: 'a check every', value: settings.checkEveryMinutes, unit: 'min' }],
      rule: `Flow and pump are looked at after ${minutesText(settings.firstCheckAfterMinutes)} and then every ${minutesText(settings.checkEveryMinutes)}.`,
      source: 'common practice, from memory; the times are settings of the organisation',
    }
  },
}
