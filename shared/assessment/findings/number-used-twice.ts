import { isBlank } from '../sample-kind'
import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, sameNumber } from './words'

/** Two samples of one survey with one number: the laboratory's result could belong to either. */
export const numberUsedTwice: FindingRule = {
  code: 'number-used-twice',
  find({ sheet, bundle }) {
    const same = bundle.siblings.filter(sibling => (
      sibling.state !== 'void' && sameNumber(sibling.number, sheet.number) && isBlank(sibling.kind) === isBlank(sheet.kind)
    ))
    if (same.length === 0) return null
    return {
      severity: 'stop', part: 'set-up',
      title: `Number ${sheet.number} is on ${same.length + 1} sheets of this survey.`,
      whatNow: 'Read the label on each sample again and correct the number that is wrong. Take a photo of the label.',
      numbers: [{ name: 'sheets with this number', value: same.length + 1, unit: '' }],
      rule: 'A sample number stands once in a survey; void sheets do not count.',
      source: COMMON_PRACTICE,
    }
  },
}
