import type { FindingRule } from './finding-rule'
import { isOver, volumeNumbers } from './volume-bound'
import { litresText, timeText } from './words'

/** Running as it does, it will pass the maximum before its planned end. */
export const volumeProjectedOver: FindingRule = {
  code: 'volume-projected-over',
  find({ timeline, projection, range, plannedEndAt, volumeLitres, zone }) {
    const litres = projection?.litresAtPlannedEnd
    if (timeline.state === 'stopped' || litres == null || plannedEndAt === null || !isOver(litres, range.maximumLitres)) return null
    // Already over is a finding of its own.
    if (volumeLitres !== null && isOver(volumeLitres, range.maximumLitres)) return null
    const overAt = projection?.maximumAt
    return {
      severity: 'attention', part: 'air',
      title: `It will pass the maximum of ${litresText(range.maximumLitres)}${overAt ? ` at ${timeText(Date.parse(overAt), zone)}` : ''}, before its planned end at ${timeText(Date.parse(plannedEndAt), zone)}.`,
      whatNow: 'Plan to change the medium before then, or stop earlier.',
      numbers: volumeNumbers('volume at the planned end', litres, range),
      rule: 'The volume stays within the maximum of the method, if it draws on with this flow and without a pause.',
      source: range.from,
    }
  },
}
