import type { FindingRule } from './finding-rule'
import { samplingDay } from './sampling-day'
import { COMMON_PRACTICE } from './words'

/** The medium was out of date on the day of sampling. Its last day still counts. */
export const mediumExpired: FindingRule = {
  code: 'medium-expired',
  find(facts) {
    const { mediumExpiresOn, mediumLot } = facts.sheet
    if (mediumExpiresOn === null) return null
    const day = samplingDay(facts)
    if (day <= mediumExpiresOn) return null
    return {
      severity: 'attention', part: 'set-up',
      title: `The medium${mediumLot ? ` of lot ${mediumLot}` : ''} ran out on ${mediumExpiresOn}.`,
      whatNow: 'Use a medium that is in date. If air was drawn already, ask the laboratory and give the reason.',
      numbers: [{ name: 'last day of the medium', value: mediumExpiresOn, unit: '' }, { name: 'day of sampling', value: day, unit: '' }],
      rule: 'The medium is in date on the day of sampling; its last day still counts.',
      source: COMMON_PRACTICE,
    }
  },
}
