import * as z from 'zod'
import { idSchema, instantSchema, lineSchema, textSchema, zoneSchema } from '#shared/records/base'
import { RECORD_KINDS } from '#shared/records/kinds'
import { saidBySchema } from '#shared/records/sheet-event'
import { transitionSchema } from '#shared/records/sheet-state'
import { HLC_PATTERN } from './hlc'

/** Version of the shapes inside operations. Raise it with a line in SPEC.md when `tests/unit/shared/sync/protocol.test.ts` says so. */
export const SCHEMA_VERSION = 1

/** What every operation carries, whatever it does. */
const envelope = {
  /** Identity of the operation, UUID version 7; an event keeps it as its own. */
  id: idSchema,
  /** Counts the operations of one person on one phone, from 1. */
  n: z.int().min(1),
  hlc: z.string().regex(HLC_PATTERN),
  sv: z.int().min(1),
  /** The record that is changed; for `obj.new` the record that is made. */
  object: idSchema,
  /** The sheet it belongs to, or null. */
  sheet: idSchema.nullable(),
  /** When it happened. For a corrected time this is the corrected instant; `enteredAt` stays the phone's clock. */
  at: instantSchema,
  enteredAt: instantSchema,
  zone: zoneSchema,
  /** Monotonic clock of the page, to find a jump of the wall clock: page id and milliseconds. */
  mono: z.strictObject({ page: z.string().max(40), milliseconds: z.number() }).nullable(),
  /** Server minus phone at the last contact, ms. */
  offset: z.number().nullable(),
  by: saidBySchema.nullable(),
  /** Names and contacts only; kept outside every hash and seal so that one person can be erased. */
  personal: z.record(z.string(), z.string().max(500)).nullable(),
}

export const OPERATION_KINDS = ['ev.add', 'ev.void', 'reg.set', 'set.add', 'set.drop', 'obj.new', 'st.req'] as const
export type OperationKind = (typeof OPERATION_KINDS)[number]

const bodies = {
  'ev.add': z.strictObject({
    type: z.string().min(1).max(40),
    data: z.record(z.string(), z.unknown()),
    corrects: idSchema.nullable(),
    reason: textSchema.nullable(),
  }),
  'ev.void': z.strictObject({ target: idSchema, reason: textSchema }),
  'reg.set': z.strictObject({
    key: z.string().min(1).max(60),
    value: z.unknown(),
    /** The operation whose value was on the screen; null when the field had only its first value. */
    base: idSchema.nullable(),
    /** A person chose between two values: closes the field's conflict. */
    resolves: z.boolean(),
  }),
  'set.add': z.strictObject({ set: z.string().min(1).max(40), element: idSchema, meta: z.record(z.string(), z.unknown()) }),
  'set.drop': z.strictObject({ set: z.string().min(1).max(40), element: idSchema }),
  'obj.new': z.strictObject({
    type: z.enum(RECORD_KINDS),
    /** The survey that a survey's record belongs to; null for the organisation's own. */
    parent: idSchema.nullable(),
    initial: z.record(z.string(), z.unknown()),
  }),
  'st.req': z.strictObject({
    transition: transitionSchema,
    /** The sheet's revision as it was shown. */
    expect: z.int().min(0),
    /** Hand-in: fit to use, or not fit with the reason. Accept: used as fit or, with a reason, in spite of a finding. */
    fit: z.boolean().nullable(),
    reason: textSchema.nullable(),
  }),
} as const

export const operationSchema = z.discriminatedUnion('kind', [
  z.strictObject({ ...envelope, kind: z.literal('ev.add'), body: bodies['ev.add'] }),
  z.strictObject({ ...envelope, kind: z.literal('ev.void'), body: bodies['ev.void'] }),
  z.strictObject({ ...envelope, kind: z.literal('reg.set'), body: bodies['reg.set'] }),
  z.strictObject({ ...envelope, kind: z.literal('set.add'), body: bodies['set.add'] }),
  z.strictObject({ ...envelope, kind: z.literal('set.drop'), body: bodies['set.drop'] }),
  z.strictObject({ ...envelope, kind: z.literal('obj.new'), body: bodies['obj.new'] }),
  z.strictObject({ ...envelope, kind: z.literal('st.req'), body: bodies['st.req'] }),
])
export type Operation = z.infer<typeof operationSchema>
export type OperationOf<K extends OperationKind> = Extract<Operation, { kind: K }>

/**
 * The least that must be readable for the server to receive an operation; a body it cannot read is kept as it came and held.
 */
export const looseOperationSchema = z.looseObject({
  id: idSchema,
  n: z.int().min(1),
  hlc: z.string().regex(HLC_PATTERN),
  sv: z.int().min(1),
  kind: z.string().max(40),
})
export type LooseOperation = z.infer<typeof looseOperationSchema>

/** An operation as the merge sees it: with the stamp that counts, and who sent it from where. */
export type StampedOperation = Operation & { hlcEffective: string, dev: string, author: string, isWaiting: boolean }

export const deviceNameSchema = lineSchema.max(60)
