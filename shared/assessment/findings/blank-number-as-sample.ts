import { isBlank } from '../sample-kind'
import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, sameNumber } from './words'

/** A blank and a sample under one number: one of the two labels was read wrong. */
export const blankNumberAsSample: FindingRule = {
  code: 'blank-number-as-sample',
  find({ sheet, bundle }) {
    const hasOther = bundle.siblings.some(sibling => (
      sibling.state !== 'void' && sameNumber(sibling.number, sheet.number) && isBlank(sibling.kind) !== isBlank(sheet.kind)
    ))
    if (!hasOther) return null
    return {
      severity: 'stop', part: 'set-up',
      title: isBlank(sheet.kind) ? `Number ${sheet.number} of this blank is also a sample's.` : `Number ${sheet.number} belongs to a blank.`,
      whatNow: 'Read the labels of the sample and of the blank again and correct the one that is wrong.',
      numbers: [{ name: 'number', value: sheet.number ?? '', unit: '' }],
      rule: 'A blank\'s number is never a sample\'s.',
      source: COMMON_PRACTICE,
    }
  },
}
