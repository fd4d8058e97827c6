import * as z from 'zod'
import { flowSchema, idSchema, instantSchema, lineSchema, measureSchema, readFlowSchema, textSchema } from './base'

export const FLOW_UNITS = ['L/min', 'mL/min'] as const
export const flowUnitSchema = z.enum(FLOW_UNITS)
export type FlowUnit = (typeof FLOW_UNITS)[number]

/** What was typed stays beside the number that was read from it. */
const typedFlow = {
  typed: z.string().min(1).max(40),
  unit: flowUnitSchema,
  litresPerMinute: readFlowSchema,
}

/** One reading of the pump's flow against a calibrator, before or after the run. */
export const flowReadingSchema = z.object({
  when: z.enum(['before', 'after']),
  pumpId: idSchema,
  calibratorId: idSchema.nullable(),
  /** The sampler in line: which one, or null when there was none (a finding). */
  samplerInLine: lineSchema.nullable(),
  ...typedFlow,
  temperatureCelsius: measureSchema.min(-60).max(80).nullable().default(null),
  stationPressureKilopascals: measureSchema.min(20).max(120).nullable().default(null),
})

/** Starting, pausing, resuming and stopping the run; the pump is null for a diffusive sampler. */
export const TIMER_ACTIONS = ['start', 'pause', 'resume', 'stop'] as const
export const timerSchema = z.object({
  action: z.enum(TIMER_ACTIONS),
  pumpId: idSchema.nullable(),
  reason: lineSchema.nullable().default(null),
})

/** A check during the run: the flow as the pump shows it or as a calibrator reads it, and the pump's own elapsed minutes. */
export const flowCheckSchema = z.object({
  pumpId: idSchema,
  by: z.enum(['indicator', 'calibrator']),
  calibratorId: idSchema.nullable().default(null),
  typed: z.string().max(40),
  unit: flowUnitSchema,
  litresPerMinute: readFlowSchema.nullable(),
  pumpMinutes: z.number().min(0).max(100_000).nullable().default(null),
  note: lineSchema.nullable().default(null),
})

export const PUMP_FAULTS = ['stopped', 'flow-blocked', 'battery', 'tubing-off', 'other'] as const
export type PumpFault = (typeof PUMP_FAULTS)[number]
export const pumpFaultSchema = z.object({
  pumpId: idSchema,
  fault: z.enum(PUMP_FAULTS),
  note: textSchema.nullable().default(null),
})

/** From here on another pump draws the air. */
export const pumpSwapSchema = z.object({
  fromPumpId: idSchema,
  pumpId: idSchema,
  reason: lineSchema.nullable().default(null),
})

/** The flow was set anew in mid-run: what it was found at, and what it was set to. */
export const flowResetSchema = z.object({
  pumpId: idSchema,
  fromLitresPerMinute: readFlowSchema.nullable(),
  toLitresPerMinute: flowSchema,
  typed: z.string().min(1).max(40),
  unit: flowUnitSchema,
})

export const activitySchema = z.object({
  text: textSchema,
  fromAt: instantSchema,
  toAt: instantSchema.nullable().default(null),
})

export const conditionSchema = z.object({
  temperatureCelsius: measureSchema.min(-60).max(80).nullable().default(null),
  stationPressureKilopascals: measureSchema.min(20).max(120).nullable().default(null),
  relativeHumidityPercent: measureSchema.min(0).max(100).nullable().default(null),
  typed: z.record(z.string(), z.string().max(40)).default({}),
})

export const noteSchema = z.object({ text: textSchema })

/** The answer to a finding of severity "attention", or words beside one of severity "stop". */
export const findingAnswerSchema = z.object({ code: z.string().max(80), subject: z.string().max(120), reason: textSchema.min(1) })

/** The name given at hand-in, in place of ink. */
export const signatureSchema = z.object({ name: lineSchema })

/** Milliseconds between two instants of any calendar: a century is 3.2 times 10 to the 12. */
const spanSchema = z.number().min(-1e15).max(1e15)

/** The clock of the phone jumped while the page was in sight; raw times stay as they are. */
export const clockJumpSchema = z.object({ wallMilliseconds: spanSchema, monotonicMilliseconds: spanSchema })

/** Each type of event and the schema of its data. */
export const SHEET_EVENTS = {
  'flow-reading': flowReadingSchema,
  'timer': timerSchema,
  'flow-check': flowCheckSchema,
  'pump-fault': pumpFaultSchema,
  'pump-swap': pumpSwapSchema,
  'flow-reset': flowResetSchema,
  'activity': activitySchema,
  'condition': conditionSchema,
  'note': noteSchema,
  'finding-answer': findingAnswerSchema,
  'signature': signatureSchema,
  'clock-jump': clockJumpSchema,
} as const

export type SheetEventType = keyof typeof SHEET_EVENTS
export const SHEET_EVENT_TYPES = Object.keys(SHEET_EVENTS) as SheetEventType[]
export const sheetEventTypeSchema = z.enum(SHEET_EVENT_TYPES)
export type SheetEventData = { [T in SheetEventType]: z.infer<(typeof SHEET_EVENTS)[T]> }

/** Who said it, where that is not the signed-in person: a worker's words taken down by the technician. */
export const saidBySchema = z.object({ role: z.enum(['worker', 'colleague']), id: idSchema.nullable(), name: lineSchema.nullable().default(null) })
export type SaidBy = z.infer<typeof saidBySchema>

/** Taken back by a later event; both stay. */
export interface EventVoid { opId: string, reason: string, author: string, at: string }

/** An event as it stands on a sheet. */
export type SheetEvent = {
  [T in SheetEventType]: {
    id: string
    type: T
    data: SheetEventData[T]
    /** The instant it happened, as the person gave it or as the phone's clock said. */
    at: string
    /** IANA zone of the phone at that moment. */
    zone: string
    /** The instant it was written down, by the phone's own clock; differs from `at` when a time was corrected. */
    enteredAt: string
    author: string
    by: SaidBy | null
    dev: string
    /** The event that this one corrects, with the reason. */
    corrects: string | null
    reason: string | null
    void: EventVoid | null
    /** Server minus phone in ms at the last contact before the event, where known. */
    clockOffsetMilliseconds: number | null
    /** Still only on this phone. */
    isWaiting: boolean
  }
}[SheetEventType]

export type SheetEventOf<T extends SheetEventType> = Extract<SheetEvent, { type: T }>

/** Whether the event counts, i.e. was not taken back. */
export function stands(event: SheetEvent): boolean {
  return event.void === null
}
