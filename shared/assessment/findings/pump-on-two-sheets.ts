import type { FindingRule, Found } from './finding-rule'
import { OVERLAP_TOLERANCE_MINUTES, overlapMinutes } from './overlap'
import { COMMON_PRACTICE, minutesText } from './words'

/** One pump drew for two sheets at once. Through a splitter that is meant so: both sheets say it. */
export const pumpOnTwoSheets: FindingRule = {
  code: 'pump-on-two-sheets',
  find: ({ air, sheet, bundle, spans, now }) => air !== 'pumped'
    ? null
    : bundle.siblings.flatMap((sibling): Found[] => {
        if (sibling.state === 'void' || (sheet.sharesPump && sibling.sharesPump)) return []
        const minutes = spans.reduce((sum, span) => (
          span.pumpId === null ? sum : sum + overlapMinutes([span], sibling.spans.filter(other => other.pumpId === span.pumpId), now)
        ), 0)
        if (minutes <= OVERLAP_TOLERANCE_MINUTES) return []
        return [{
          severity: 'attention', part: 'set-up', subject: sibling.id,
          title: `Its pump also drew for sheet ${sibling.number ?? 'without a number'}, ${minutesText(minutes)} at once.`,
          whatNow: 'Correct the pump or the times on the sheet that is wrong. If one pump feeds both through a splitter, mark it on both.',
          numbers: [{ name: 'minutes at once', value: minutes, unit: 'min' }, { name: 'other sheet', value: sibling.number ?? '', unit: '' }],
          rule: 'A pump draws for one sheet at a time, unless a splitter is marked on both.',
          source: COMMON_PRACTICE,
        }]
      }),
}
