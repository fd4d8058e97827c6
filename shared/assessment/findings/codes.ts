/** Every code a finding can have, in the order of the day. Screens, answers and exports name findings by these. */
export const FINDING_CODES = [
  // Set-up
  'number-used-twice', 'blank-number-as-sample', 'air-differs-from-method', 'record-missing', 'method-from-memory', 'sampler-from-memory',
  'method-range-missing', 'medium-expired', 'medium-expiry-missing', 'medium-lot-missing', 'train-checks-open', 'uptake-missing', 'shift-missing', 'limit-fraction',
  // Flow before and after
  'flow-before-missing', 'flow-after-missing', 'sampler-not-in-line', 'few-readings', 'reading-away', 'reading-misplaced',
  'calibrator-missing', 'calibrator-overdue', 'calibrator-date-missing', 'calibrator-differs', 'flow-outside-method', 'sampler-design-flow',
  'pump-flow-range', 'indicator-accuracy-unstated', 'flow-change', 'flow-used', 'conditions-missing', 'rotameter-corrected',
  // Air
  'stop-before-start', 'no-minutes', 'timer-after-stop', 'timer-out-of-order', 'pump-differs', 'time-unreadable', 'event-in-future', 'time-entered-apart',
  'pause-without-reason', 'long-pause', 'paused-at-stop', 'past-planned-end', 'flow-check-away', 'flow-check-missing', 'pump-minutes-apart', 'pump-fault',
  'volume-under-minimum', 'volume-over-maximum', 'volume-projected-under', 'volume-projected-over', 'shift-coverage', 'no-activities',
  'pump-on-two-sheets', 'two-trains-one-agent',
  // Close
  'blanks-too-few', 'lot-without-blanks', 'hold-time', 'clock-jump', 'clock-off', 'two-phones', 'open-conflict', 'late-change', 'values-corrected',
] as const
export type FindingCode = (typeof FINDING_CODES)[number]

/**
 * Attention that asks for no answer before the sheet is handed in as fit: an open choice between two phones' values blocks
 * nothing, and a hold time runs on for the office, not for the person on the floor.
 */
export const NON_BLOCKING_CODES: readonly FindingCode[] = ['open-conflict', 'hold-time']
