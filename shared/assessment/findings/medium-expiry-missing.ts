import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE } from './words'

/** Nobody noted until when the medium may be used. */
export const mediumExpiryMissing: FindingRule = {
  code: 'medium-expiry-missing',
  find({ sheet, timeline, air }) {
    if (sheet.mediumExpiresOn !== null || air === 'none' || timeline.state === 'not-started') return null
    return {
      severity: 'note', part: 'set-up',
      title: 'The last day of the medium is not noted.',
      whatNow: 'Read it from the package, where the package has one.',
      numbers: [],
      rule: 'The medium is in date on the day of sampling.',
      source: COMMON_PRACTICE,
    }
  },
}
