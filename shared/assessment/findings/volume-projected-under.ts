import type { FindingRule } from './finding-rule'
import { isUnder, volumeNumbers } from './volume-bound'
import { litresText, timeText } from './words'

/** Running as it does, it will not reach the minimum by its planned end. */
export const volumeProjectedUnder: FindingRule = {
  code: 'volume-projected-under',
  find({ timeline, projection, range, plannedEndAt, zone }) {
    const litres = projection?.litresAtPlannedEnd
    if (timeline.state === 'stopped' || litres == null || plannedEndAt === null || !isUnder(litres, range.minimumLitres)) return null
    return {
      severity: 'attention', part: 'air',
      title: `It will have ${litresText(litres)} at ${timeText(Date.parse(plannedEndAt), zone)}, under the minimum of ${litresText(range.minimumLitres)}.`,
      whatNow: 'Let it run longer if that can be done, or give the reason.',
      numbers: volumeNumbers('volume at the planned end', litres, range),
      rule: 'The volume reaches the minimum of the method, if it draws on with this flow and without a pause.',
      source: range.from,
    }
  },
}
