import * as z from 'zod'
import { idSchema } from './base'
import { roleSchema } from './person'
import type { PlanLine } from './plan-line'
import type { Identified } from './sheet-bundle'
import { sheetStateSchema, transitionSchema } from './sheet-state'

/** POST /api/session */
export const signInSchema = z.strictObject({
  email: z.string().trim().min(3).max(254),
  password: z.string().min(1).max(256),
})

/** Who is signed in, as GET and POST /api/session answer. */
export const signedInSchema = z.object({
  id: idSchema,
  organisationId: idSchema,
  organisationName: z.string(),
  name: z.string(),
  email: z.string(),
  roles: z.array(roleSchema),
})
export type SignedIn = z.infer<typeof signedInSchema>

export const sheetParamsSchema = z.strictObject({ sheetId: idSchema })
export const surveyParamsSchema = z.strictObject({ surveyId: idSchema })

const pageSchema = z.coerce.number().int().min(1).max(10_000).default(1)

/** GET /api/sheets: filters of the review queue, kept in the page's address. */
export const sheetListQuerySchema = z.strictObject({
  state: z.union([sheetStateSchema, z.literal('all'), z.literal('to-review')]).default('to-review'),
  survey: idSchema.optional(),
  technician: idSchema.optional(),
  /** What stands against a sheet; two differing values and changes kept beside it count apart from the findings. */
  severity: z.enum(['stop', 'attention', 'any', 'none', 'conflict', 'late']).optional(),
  q: z.string().max(100).optional(),
  sort: z.enum(['findings', 'handed-in', 'number', 'worker', 'state']).default('findings'),
  direction: z.enum(['asc', 'desc']).optional(),
  page: pageSchema,
})
export type SheetListQuery = z.infer<typeof sheetListQuerySchema>

/** A sheet in a list: what `assessSheet` says of it, computed where the list is made. */
export interface SheetSummary {
  id: string
  number: string | null
  kind: string
  surveyId: string
  surveyTitle: string
  workerCode: string | null
  technicianName: string | null
  state: z.infer<typeof sheetStateSchema>
  progress: string
  isFit: boolean | null
  stopCount: number
  attentionCount: number
  openAttentionCount: number
  conflictCount: number
  lateCount: number
  methodCode: string | null
  agentNames: string[]
  sampledMinutes: number | null
  volumeLitres: number | null
  changePercent: number | null
  startedAt: string | null
  stoppedAt: string | null
  handedInAt: string | null
  changedVer: number
  zone: string
  ribbon: unknown
}

export interface SheetListAnswer { sheets: SheetSummary[], total: number, page: number, pageSize: number, counts: Record<string, number>, ver: number }

/** POST /api/sheets/:sheetId/transitions: a decision on a sheet as it was shown. */
export const decisionSchema = z.strictObject({
  transition: transitionSchema,
  expect: z.int().min(0),
  fit: z.boolean().nullable().default(null),
  reason: z.string().max(10_000).nullable().default(null),
})
export type Decision = z.infer<typeof decisionSchema>

/** GET /api/sheets/:sheetId: the rows of the sheet and of every record that its assessment looks at. */
export interface SheetAnswer {
  sheetId: string
  ver: number
  rows: unknown[]
  /** Name of each person and phone that appears in the history. */
  people: Record<string, string>
  phones: Record<string, string>
  history: HistoryEntry[]
}

/** One change as the ledger keeps it, oldest first. */
export interface HistoryEntry {
  opId: string
  kind: string
  at: string
  receivedAt: string
  author: string
  dev: string
  outcome: string
  reason: string | null
  /** Field, event type or step. */
  what: string
  body: unknown
  clockOffsetMilliseconds: number | null
}

/** GET /api/phones: who still owes what since when. */
export interface PhoneView {
  dev: string
  phone: string
  label: string
  personName: string
  lastSeenAt: string
  pending: number
  oldestAt: string | null
  clockOffsetMilliseconds: number | null
  lastNumber: number
  missingNumbers: number
}

export interface SurveyView {
  id: string
  title: string
  siteName: string
  purpose: string
  startsOn: string
  endsOn: string
  zone: string
  crew: { id: string, name: string }[]
  sheetCounts: Record<string, number>
  planLineCount: number
}

/** GET /api/surveys/:surveyId: the survey and the samples that are planned in it. */
export interface SurveyDetail extends SurveyView {
  planLines: Identified<PlanLine>[]
  /** Codes of the workers and methods that the plan names, by their identity. */
  codes: Record<string, string>
}
