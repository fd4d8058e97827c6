import type { Severity, Progress } from '#shared/assessment/sheet-assessment'
import type { Role } from '#shared/records/person'
import type { SourceStatus } from '#shared/records/base'
import type { Air, SheetField, SheetKind } from '#shared/records/sheet'
import type { SheetEventType } from '#shared/records/sheet-event'
import type { SheetState, Transition } from '#shared/records/sheet-state'

/* The one table from codes to the words that people read. */

export const SHEET_STATE_WORDS: Readonly<Record<SheetState, string>> = {
  'open': 'In the field',
  'handed-in': 'Handed in',
  'returned': 'Returned',
  'accepted': 'Accepted',
  'void': 'Void',
  'resulted': 'Results in',
  'assessed': 'Assessed',
  'released': 'Released',
}

export const SHEET_STATE_TONES = {
  'open': 'waiting',
  'handed-in': 'quiet',
  'returned': 'attention',
  'accepted': 'good',
  'void': 'stop',
  'resulted': 'good',
  'assessed': 'good',
  'released': 'good',
} as const satisfies Readonly<Record<SheetState, string>>

export const PROGRESS_WORDS: Readonly<Record<Progress, string>> = {
  planned: 'Planned',
  ready: 'Ready',
  running: 'Running',
  paused: 'Paused',
  stopped: 'Stopped',
  checked: 'Checked',
}

export const SHEET_KIND_WORDS: Readonly<Record<SheetKind, string>> = {
  'personal': 'Personal',
  'area': 'Area',
  'field-blank': 'Field blank',
  'media-blank': 'Media blank',
  'bulk': 'Bulk',
  'wipe': 'Wipe',
}

export const AIR_WORDS: Readonly<Record<Air, string>> = { pumped: 'Pumped', diffusive: 'Diffusive', none: 'No air drawn' }

export const SEVERITY_WORDS: Readonly<Record<Severity, string>> = { note: 'Note', attention: 'Attention', stop: 'Stop' }

export const ROLE_WORDS: Readonly<Record<Role, string>> = { technician: 'Technician', reviewer: 'Reviewer', administrator: 'Administrator' }

/** What a person does, as the verb on a button. */
export const TRANSITION_VERBS: Readonly<Record<Transition, string>> = {
  'hand-in': 'Hand in',
  'return': 'Return',
  'accept': 'Accept',
  'void': 'Void',
  'reopen': 'Reopen',
  'result': 'Enter results',
  'assess': 'Assess',
  'release': 'Release',
}

/** What was done, in a history. */
export const TRANSITION_DONE: Readonly<Record<Transition, string>> = {
  'hand-in': 'Handed in',
  'return': 'Returned',
  'accept': 'Accepted',
  'void': 'Voided',
  'reopen': 'Reopened',
  'result': 'Results entered',
  'assess': 'Assessed',
  'release': 'Released',
}

export const EVENT_WORDS: Readonly<Record<SheetEventType, string>> = {
  'flow-reading': 'Flow reading',
  'timer': 'Timer',
  'flow-check': 'Flow check',
  'pump-fault': 'Pump fault',
  'pump-swap': 'Pump swapped',
  'flow-reset': 'Flow set anew',
  'activity': 'Activity',
  'condition': 'Conditions',
  'note': 'Note',
  'finding-answer': 'Answer to a finding',
  'signature': 'Signature',
  'clock-jump': 'Clock changed',
}

export const TIMER_WORDS = { start: 'Started', pause: 'Paused', resume: 'Resumed', stop: 'Stopped' } as const
export const PUMP_FAULT_WORDS = { 'stopped': 'Pump stopped', 'flow-blocked': 'Flow blocked', 'battery': 'Battery', 'tubing-off': 'Tubing off', 'other': 'Other fault' } as const
export const INLET_SIDE_WORDS = { 'left': 'Left', 'right': 'Right', 'centre': 'Centre', 'inside-helmet': 'Inside the helmet' } as const
export const USUAL_DAY_WORDS = { 'usual': 'A usual day', 'unusual': 'Not a usual day', 'not-known': 'Not known' } as const
export const CHECK_WORDS = { 'done': 'Done', 'not-applicable': 'Does not apply' } as const

export const FIELD_WORDS: Readonly<Record<SheetField, string>> = {
  number: 'Sample number',
  kind: 'Kind of sample',
  air: 'How air is drawn',
  planLineId: 'Plan line',
  continuesId: 'Continues sheet',
  replacesId: 'Replaces sheet',
  technicianId: 'Technician',
  workerId: 'Worker',
  groupId: 'Similar exposure group',
  jobTitle: 'Job',
  task: 'Task',
  areaName: 'Place',
  shiftStartsAt: 'Shift starts',
  shiftEndsAt: 'Shift ends',
  usualDay: 'Usual day',
  usualDayNote: 'What was unusual',
  agentIds: 'Agents',
  methodId: 'Method',
  samplerId: 'Sampler',
  medium: 'Medium',
  mediumLot: 'Lot of the medium',
  mediumExpiresOn: 'Medium expires',
  seal: 'Seal',
  pumpId: 'Pump',
  calibratorId: 'Flow calibrator',
  sharesPump: 'Pump feeds several media',
  inletSide: 'Side of the inlet',
  inletPosition: 'Place of the inlet',
  checkEndsBroken: 'Ends broken',
  checkPlugOut: 'Plug out',
  checkArrow: 'Arrow in the direction of the air',
  checkCycloneUpright: 'Cyclone upright',
  checkLeak: 'Leak check',
  protection: 'Protective equipment as seen',
  controls: 'Controls as seen',
  plannedFlowLitresPerMinute: 'Planned flow',
  plannedEndAt: 'Planned end',
  uptakeMillilitresPerMinute: 'Uptake rate',
  archived: 'Archived',
}

/** A field's name in words; one that this version does not know by its own name. */
export function fieldInWords(field: string): string {
  return FIELD_WORDS[field as SheetField] ?? field
}

/** How far a stored trade value can be trusted. */
export const SOURCE_STATUS_WORDS: Readonly<Record<SourceStatus, string>> = {
  verified: 'Read in the source',
  recomputed: 'Recomputed from the source',
  secondary: 'From a secondary source',
  memory: 'From memory, check before use',
}

/** Why a change was received and not applied. */
export const HELD_WORDS: Readonly<Record<string, string>> = {
  'locked': 'The sheet was locked when it arrived',
  'no-access': 'The person was not in the crew',
  'not-allowed': 'The person may not change this',
  'unknown-object': 'The record it belongs to is not known',
  'unknown-event': 'The entry it takes back is not known',
  'invalid': 'The value cannot be stored in this field',
  'id-reused': 'Its identity was used for another change',
  'revoked': 'The phone or the person had been signed out for good',
  'error': 'The server could not apply it',
  'malformed': 'The server could not read it',
}

/** Why a decision was refused. */
export const REFUSED_WORDS: Readonly<Record<string, string>> = {
  'stale-state': 'The sheet has moved on since it was shown to you. It is loaded anew: look at it again and decide then.',
  'not-from-here': 'This step cannot be taken from the state that the sheet is in now.',
  'needs-reason': 'This step needs a reason.',
  'stop-findings': 'A stop finding stands, so the sheet cannot be accepted as fit without a reason.',
  'not-allowed': 'You may not take this step.',
}

export const OUTCOME_WORDS: Readonly<Record<string, string>> = {
  ok: 'Applied',
  dup: 'Known already',
  conflict: 'Applied, two values differ',
  held: 'Kept beside the sheet',
  parked: 'Kept until the server is newer',
  refused: 'Refused',
}
