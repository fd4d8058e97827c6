import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE } from './words'

/** The shift is not noted, so nobody can say how much of it was sampled. */
export const shiftMissing: FindingRule = {
  code: 'shift-missing',
  find({ sheet, share, timeline }) {
    if (sheet.kind !== 'personal' || share || timeline.state === 'not-started') return null
    const isReversed = sheet.shiftStartsAt !== null && sheet.shiftEndsAt !== null
    return {
      severity: 'note', part: 'set-up',
      title: isReversed ? 'The shift ends before it starts.' : 'The start and end of the shift are not noted.',
      whatNow: isReversed ? 'Correct the times of the shift; a night shift ends on the next day.' : 'Note when the shift starts and ends.',
      numbers: [],
      rule: 'The share of the shift that was sampled is part of the result.',
      source: COMMON_PRACTICE,
    }
  },
}
