import { isBelowPercent } from '#shared/domain/percent'
import { fixed } from '#shared/domain/rounding'
import type { FindingRule } from './finding-rule'
import { minutesText } from './words'

/**
 * Less of the shift sampled than a full-period sample needs, all sheets of this worker and substance together. Where the plan
 * itself was to stop within half the shift and before its end, as for a short-term sample, it is a note.
 */
export const shiftCoverageLow: FindingRule = {
  code: 'shift-coverage',
  find({ sheet, share, timeline, settings }) {
    if (sheet.kind !== 'personal' || !share || timeline.state !== 'stopped' || timeline.startedAt === null) return null
    const { percent, coveredMinutes, shiftMinutes } = share.coverage
    const wanted = settings.coverageShare * 100
    if (!isBelowPercent(percent, wanted)) return null
    const plannedEnd = sheet.plannedEndAt === null ? Infinity : Date.parse(sheet.plannedEndAt)
    const wasPlannedShort = plannedEnd < Date.parse(share.shift.toAt) && (plannedEnd - timeline.startedAt) / 60_000 < shiftMinutes / 2
    return {
      severity: wasPlannedShort ? 'note' : 'attention', part: 'air',
      title: `Air was drawn in ${fixed(percent, 0)} % of the shift, ${minutesText(coveredMinutes)} of ${minutesText(shiftMinutes)}.`,
      whatNow: 'Say what the rest of the shift was like: the same work, or no exposure.',
      numbers: [
        { name: 'minutes with air drawn', value: coveredMinutes, unit: 'min' },
        { name: 'minutes of the shift', value: shiftMinutes, unit: 'min' },
        { name: 'share', value: percent, unit: '%' },
        { name: 'share wanted', value: wanted, unit: '%' },
        { name: 'other sheets counted', value: share.otherSheets, unit: '' },
      ],
      rule: `At least ${fixed(wanted, 1)} % of the shift, 7 of 8 hours by default, for a full-period sample.`,
      source: 'common practice, after a U.S. industrial hygiene manual of 1977; a setting of the organisation',
    }
  },
}
