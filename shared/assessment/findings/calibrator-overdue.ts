import { isCalibratorInDate } from '#shared/domain/calibration'
import type { FindingRule } from './finding-rule'
import { calibratorUses } from './calibrator-use'

/** The calibrator's certificate had run out on the day of the reading. */
export const calibratorOverdue: FindingRule = {
  code: 'calibrator-overdue',
  find: facts => calibratorUses(facts).flatMap(({ set, calibratorId, calibrator, dayOn }) => {
    if (calibrator.dueOn === null || isCalibratorInDate(calibrator.dueOn, dayOn)) return []
    return [{
      severity: 'attention', part: set.part, subject: `${calibratorId}/${set.subject}`,
      title: `Calibrator ${calibrator.serial} was due on ${calibrator.dueOn}; flow ${set.when} was read on ${dayOn}.`,
      whatNow: 'Read the flow with a calibrator that is in date. If none is at hand, give the reason and have this one checked.',
      numbers: [{ name: 'due', value: calibrator.dueOn, unit: '' }, { name: 'day of the reading', value: dayOn, unit: '' }],
      rule: 'The certificate of the calibrator holds on the day of the reading; the due day itself counts.',
      source: 'common practice; ASTM D5337: traceability generally every year',
    }]
  }),
}
