import { isBlank } from '../sample-kind'
import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE } from './words'

/** Without the lot, samples and blanks cannot be matched. */
export const mediumLotMissing: FindingRule = {
  code: 'medium-lot-missing',
  find({ sheet, timeline, air }) {
    if (sheet.mediumLot?.trim() || (!isBlank(sheet.kind) && (air === 'none' || timeline.state === 'not-started'))) return null
    return {
      severity: 'note', part: 'set-up',
      title: 'The lot of the medium is not noted.',
      whatNow: 'Read it from the package: blanks must be of the same lot.',
      numbers: [],
      rule: 'Samples and their blanks are of one lot.',
      source: COMMON_PRACTICE,
    }
  },
}
