import { answerKey, answersOf } from '../finding-answers'
import { SEVERITIES, type Finding } from '../sheet-assessment'
import type { SheetFacts } from '../sheet-facts'
import type { FindingRule } from './finding-rule'
import { airDiffersFromMethod } from './air-differs-from-method'
import { blankNumberAsSample } from './blank-number-as-sample'
import { blanksTooFew } from './blanks-too-few'
import { calibratorDateMissing } from './calibrator-date-missing'
import { calibratorDiffers } from './calibrator-differs'
import { calibratorMissing } from './calibrator-missing'
import { calibratorOverdue } from './calibrator-overdue'
import { clockJump } from './clock-jump'
import { clockOff } from './clock-off'
import { conditionsMissing } from './conditions-missing'
import { eventInFuture } from './event-in-future'
import { fewReadings } from './few-readings'
import { flowAfterMissing } from './flow-after-missing'
import { flowBeforeMissing } from './flow-before-missing'
import { flowChange } from './flow-change'
import { flowCheckAway } from './flow-check-away'
import { flowCheckMissing } from './flow-check-missing'
import { flowOutsideMethod } from './flow-outside-method'
import { flowUsedNote } from './flow-used'
import { holdTime } from './hold-time'
import { indicatorAccuracyUnstated } from './indicator-accuracy-unstated'
import { lateChange } from './late-change'
import { limitFraction } from './limit-fraction'
import { longPause } from './long-pause'
import { lotWithoutBlanks } from './lot-without-blanks'
import { mediumExpired } from './medium-expired'
import { mediumExpiryMissing } from './medium-expiry-missing'
import { mediumLotMissing } from './medium-lot-missing'
import { methodFromMemory } from './method-from-memory'
import { methodRangeMissing } from './method-range-missing'
import { noActivities } from './no-activities'
import { noMinutes } from './no-minutes'
import { numberUsedTwice } from './number-used-twice'
import { openConflict } from './open-conflict'
import { pastPlannedEnd } from './past-planned-end'
import { pauseWithoutReason } from './pause-without-reason'
import { pausedAtStop } from './paused-at-stop'
import { pumpDiffers } from './pump-differs'
import { pumpFault } from './pump-fault'
import { pumpFlowRange } from './pump-flow-range'
import { pumpMinutesApart } from './pump-minutes-apart'
import { pumpOnTwoSheets } from './pump-on-two-sheets'
import { readingAway } from './reading-away'
import { readingMisplaced } from './reading-misplaced'
import { recordMissing } from './record-missing'
import { rotameterCorrected } from './rotameter-corrected'
import { samplerFromMemory } from './sampler-from-memory'
import { samplerDesignFlow } from './sampler-design-flow'
import { samplerNotInLine } from './sampler-not-in-line'
import { shiftCoverageLow } from './shift-coverage'
import { shiftMissing } from './shift-missing'
import { stopBeforeStart } from './stop-before-start'
import { timeEnteredApart } from './time-entered-apart'
import { timeUnreadable } from './time-unreadable'
import { timerAfterStop } from './timer-after-stop'
import { timerOutOfOrder } from './timer-out-of-order'
import { trainChecksOpen } from './train-checks-open'
import { twoPhones } from './two-phones'
import { twoTrainsOneAgent } from './two-trains-one-agent'
import { uptakeMissing } from './uptake-missing'
import { valuesCorrected } from './values-corrected'
import { volumeOverMaximum } from './volume-over-maximum'
import { volumeProjectedOver } from './volume-projected-over'
import { volumeProjectedUnder } from './volume-projected-under'
import { volumeUnderMinimum } from './volume-under-minimum'

/** Every rule, in the order of the day. */
export const FINDING_RULES: readonly FindingRule[] = [
  numberUsedTwice, blankNumberAsSample, airDiffersFromMethod, recordMissing, methodFromMemory, samplerFromMemory,
  methodRangeMissing, mediumExpired, mediumExpiryMissing, mediumLotMissing, trainChecksOpen, uptakeMissing,
  shiftMissing, limitFraction, flowBeforeMissing, flowAfterMissing, samplerNotInLine, fewReadings, readingAway,
  readingMisplaced, calibratorMissing, calibratorOverdue, calibratorDateMissing, calibratorDiffers, flowOutsideMethod,
  samplerDesignFlow, pumpFlowRange, indicatorAccuracyUnstated, flowChange, flowUsedNote, conditionsMissing,
  rotameterCorrected, stopBeforeStart, noMinutes, timerAfterStop, timerOutOfOrder, pumpDiffers, timeUnreadable,
  eventInFuture, timeEnteredApart, pauseWithoutReason, longPause, pausedAtStop, pastPlannedEnd, flowCheckAway,
  flowCheckMissing, pumpMinutesApart, pumpFault, volumeUnderMinimum, volumeOverMaximum, volumeProjectedUnder,
  volumeProjectedOver, shiftCoverageLow, noActivities, pumpOnTwoSheets, twoTrainsOneAgent, blanksTooFew,
  lotWithoutBlanks, holdTime, clockJump, clockOff, twoPhones, openConflict, lateChange, valuesCorrected,
]

/** All that the rules find, the gravest first, each with the answer that was given to it. */
export function findAll(facts: SheetFacts): Finding[] {
  const answers = answersOf(facts.events.of('finding-answer'))
  const findings = FINDING_RULES.flatMap(({ code, find }) => [find(facts) ?? []].flat().map((found): Finding => {
    const subject = found.subject ?? ''
    return { ...found, code, subject, answer: answers.get(answerKey(code, subject)) ?? null }
  }))
  return findings.sort((a, b) => SEVERITIES.indexOf(b.severity) - SEVERITIES.indexOf(a.severity))
}
