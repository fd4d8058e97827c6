import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE } from './words'

/** Nobody noted what the person did, so nobody can say later what the result stands for. */
export const noActivities: FindingRule = {
  code: 'no-activities',
  find({ sheet, air, timeline, events }) {
    if (air === 'none' || timeline.state !== 'stopped' || events.of('activity').length > 0) return null
    return {
      severity: sheet.kind === 'personal' ? 'attention' : 'note', part: 'air',
      title: sheet.kind === 'personal' ? 'No activity is noted: what did the person do?' : 'No activity is noted: what went on at this place?',
      whatNow: 'Ask now, while it is remembered, and note it with times.',
      numbers: [{ name: 'activities', value: 0, unit: '' }],
      rule: 'The work during sampling is noted with its times.',
      source: COMMON_PRACTICE,
    }
  },
}
