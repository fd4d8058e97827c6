import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** Something arrived that could not be applied: it stands beside the sheet. */
export const lateChange: FindingRule = {
  code: 'late-change',
  find({ bundle: { document } }) {
    const count = document.late.length
    if (count === 0) return null
    return {
      severity: 'note', part: 'close',
      title: count === 1 ? 'A change stands beside the sheet and is not in it.' : `${count} changes stand beside the sheet and are not in it.`,
      whatNow: 'Read them in the history. If one of them matters, the reviewer reopens the sheet.',
      numbers: [{ name: 'changes beside the sheet', value: count, unit: '' }],
      rule: 'What comes after the sheet is locked, or cannot be applied, is kept beside it.',
      source: HOUSE_RULE,
    }
  },
}
