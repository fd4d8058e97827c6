import * as z from 'zod'
import { idSchema, instantSchema } from '#shared/records/base'
import { looseOperationSchema } from './operations'
import { OUTCOMES } from './outcomes'
import { rowSchema } from './rows'

/** Version of the requests and answers. */
export const PROTOCOL_VERSION = 1
export const MAX_OPERATIONS = 500
export const MAX_BODY_BYTES = 1_048_576
export const MAX_PAGE = 500

/** POST /api/sync/push */
export const pushRequestSchema = z.strictObject({
  v: z.int(),
  /** This person on this phone. */
  dev: z.string().min(1).max(60),
  /** The phone itself, the same for every person on it. */
  phone: z.string().min(1).max(60),
  /** What the phone calls itself in the office's list, e.g. "Chromium on Android". */
  label: z.string().max(120),
  epoch: z.string().max(40).nullable(),
  sv: z.int().min(1),
  /** Operations that wait on the phone, this batch included; when the oldest was written; photos that wait. */
  pending: z.int().min(0),
  oldest: instantSchema.nullable(),
  blobs: z.int().min(0),
  cursor: z.int().min(0),
  /** Phone's clock when the request was made. */
  now: instantSchema,
  ops: z.array(looseOperationSchema).max(MAX_OPERATIONS),
})
export type PushRequest = z.infer<typeof pushRequestSchema>

/** `[n, outcome, reason]`. An outcome that is not in the list is kept and shown by the phone. */
export const pushResultSchema = z.tuple([z.int(), z.string(), z.string().nullable()])
export const pushResponseSchema = z.object({
  v: z.int(),
  time: instantSchema,
  epoch: z.string(),
  ver: z.int().min(0),
  /** Operations up to this n are backed up; until the server says so the phone keeps them. */
  stable: z.int().min(0),
  fork: z.boolean(),
  res: z.array(pushResultSchema),
})
export type PushResponse = z.infer<typeof pushResponseSchema>
export const knownOutcomeSchema = z.enum(OUTCOMES)

/** GET /api/sync/pull. `after` is `ver,t,id` of the last row of the page before; `scope` names one scope to fill from 0. */
export const pullQuerySchema = z.strictObject({
  epoch: z.string().max(40).optional(),
  dev: z.string().max(60).optional(),
  ver: z.coerce.number().int().min(0),
  to: z.coerce.number().int().min(0).optional(),
  after: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(MAX_PAGE).default(MAX_PAGE),
  /** Scopes the phone holds whole, comma separated, the same through all pages of one pull; what is missing is filled from the beginning in these pages. */
  have: z.string().max(20_000).optional(),
})
export type PullQuery = z.infer<typeof pullQuerySchema>

export const pullResponseSchema = z.object({
  v: z.int(),
  time: instantSchema,
  epoch: z.string(),
  to: z.int().min(0),
  rows: z.array(rowSchema),
  scopes: z.object({ '+': z.array(idSchema), '-': z.array(idSchema) }),
  next: z.object({ ver: z.int().min(0), after: z.string().nullable() }),
  more: z.boolean(),
})
export type PullResponse = z.infer<typeof pullResponseSchema>
