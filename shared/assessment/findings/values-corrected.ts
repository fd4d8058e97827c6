import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** Entries were corrected or taken back: the first values stay on record and are to be looked at. */
export const valuesCorrected: FindingRule = {
  code: 'values-corrected',
  find({ bundle: { document } }) {
    const corrected = document.events.filter(event => event.corrects !== null && event.void === null)
    const replaced = new Set(corrected.map(event => event.corrects))
    const takenBack = document.events.filter(event => event.void !== null && !replaced.has(event.id))
    if (corrected.length === 0 && takenBack.length === 0) return null
    return {
      severity: 'note', part: 'close',
      title: [
        ...(corrected.length > 0 ? [`${corrected.length} corrected`] : []),
        ...(takenBack.length > 0 ? [`${takenBack.length} taken back`] : []),
      ].join(', ').concat(': the first values stay on record.'),
      whatNow: 'Nothing to do. The reviewer looks at them in the history.',
      numbers: [{ name: 'corrected', value: corrected.length, unit: '' }, { name: 'taken back', value: takenBack.length, unit: '' }],
      rule: 'A correction keeps the first value, who, when and why; what was taken back does not count.',
      source: HOUSE_RULE,
    }
  },
}
