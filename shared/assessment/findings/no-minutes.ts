import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** Stopped, and not a minute of air. */
export const noMinutes: FindingRule = {
  code: 'no-minutes',
  find({ air, timeline, sampledMinutes }) {
    const isReversed = timeline.startedAt !== null && timeline.stoppedAt !== null && timeline.stoppedAt < timeline.startedAt
    if (air === 'none' || timeline.state !== 'stopped' || sampledMinutes === null || sampledMinutes > 0 || isReversed) return null
    return {
      severity: 'stop', part: 'air',
      title: 'The sheet has no sampled minutes.',
      whatNow: 'Correct the start, the pauses or the stop. If no air was drawn, hand it in as not fit with the reason.',
      numbers: [{ name: 'sampled minutes', value: sampledMinutes, unit: 'min' }],
      rule: 'A sample needs more than 0 minutes of air.',
      source: HOUSE_RULE,
    }
  },
}
