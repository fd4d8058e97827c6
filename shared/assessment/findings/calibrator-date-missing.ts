import type { FindingRule } from './finding-rule'
import { calibratorUses } from './calibrator-use'
import { HOUSE_RULE } from './words'

/** Nobody stored until when the calibrator's certificate holds. */
export const calibratorDateMissing: FindingRule = {
  code: 'calibrator-date-missing',
  find(facts) {
    const undated = new Map(calibratorUses(facts).filter(({ calibrator }) => calibrator.dueOn === null).map(use => [use.calibratorId, use]))
    return [...undated.values()].map(({ set, calibratorId, calibrator }) => ({
      severity: 'note', part: set.part, subject: calibratorId,
      title: `When calibrator ${calibrator.serial} is due is not stored: not checked.`,
      whatNow: 'Enter the due date from its certificate under equipment.',
      numbers: [],
      rule: 'An empty date is said, never passed in silence.',
      source: HOUSE_RULE,
    }))
  },
}
