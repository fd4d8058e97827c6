import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, minutesText, timeText } from './words'

/** A stop somewhat after the plan is the normal day; more than this is said. House rule. */
export const PAST_END_MINUTES = 15

/** It runs on after its planned end, or did. */
export const pastPlannedEnd: FindingRule = {
  code: 'past-planned-end',
  find({ air, timeline, plannedEndAt, now, zone }) {
    if (air === 'none' || timeline.state === 'not-started' || plannedEndAt === null) return null
    const isOpen = timeline.state !== 'stopped'
    const minutes = ((timeline.stoppedAt ?? now) - Date.parse(plannedEndAt)) / 60_000
    if (!(minutes > (isOpen ? 0 : PAST_END_MINUTES))) return null
    return {
      severity: isOpen ? 'attention' : 'note', part: 'air',
      title: `${isOpen ? 'Still running' : 'It ran'} ${minutesText(minutes)} past its planned end, ${timeText(Date.parse(plannedEndAt), zone)}.`,
      whatNow: isOpen ? 'Stop it now, or move its planned end.' : 'Say why, if it matters for the result.',
      numbers: [{ name: 'planned end', value: plannedEndAt, unit: '' }, { name: 'past it', value: minutes, unit: 'min' }],
      rule: 'A sample is stopped at its planned end, else at the end of the shift.',
      source: COMMON_PRACTICE,
    }
  },
}
