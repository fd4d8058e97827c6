import * as z from 'zod'
import { daySchema, flowSchema, idSchema, instantSchema, lineSchema, textSchema } from './base'

export const SHEET_KINDS = ['personal', 'area', 'field-blank', 'media-blank', 'bulk', 'wipe'] as const
export const sheetKindSchema = z.enum(SHEET_KINDS)
export type SheetKind = z.infer<typeof sheetKindSchema>

/** A diffusive sampler has no pump and no flow; its uptake rate gives the volume. Blanks, bulk and wipes draw no air. */
export const AIRS = ['pumped', 'diffusive', 'none'] as const
export const airSchema = z.enum(AIRS)
export type Air = z.infer<typeof airSchema>

export const INLET_SIDES = ['left', 'right', 'centre', 'inside-helmet'] as const
export const USUAL_DAY = ['usual', 'unusual', 'not-known'] as const
export const CHECK_ANSWERS = ['done', 'not-applicable'] as const
const checkSchema = z.enum(CHECK_ANSWERS).nullable().default(null)

/**
 * A sample sheet: who, what and with which train. Every field is a register of its own, so that two phones can fill in
 * one sheet; readings, times, activities and notes are events beside it. Null is "not filled in yet".
 */
export const sheetSchema = z.object({
  number: lineSchema.nullable().default(null),
  kind: sheetKindSchema.default('personal'),
  air: airSchema.default('pumped'),
  planLineId: idSchema.nullable().default(null),
  /** The sheet before this one on the same worker and pump, when the medium was changed. */
  continuesId: idSchema.nullable().default(null),
  /** The spoiled sheet that this one replaces. */
  replacesId: idSchema.nullable().default(null),
  technicianId: idSchema.nullable().default(null),

  workerId: idSchema.nullable().default(null),
  groupId: idSchema.nullable().default(null),
  jobTitle: lineSchema.nullable().default(null),
  task: textSchema.nullable().default(null),
  areaName: lineSchema.nullable().default(null),
  shiftStartsAt: instantSchema.nullable().default(null),
  shiftEndsAt: instantSchema.nullable().default(null),
  usualDay: z.enum(USUAL_DAY).nullable().default(null),
  usualDayNote: textSchema.nullable().default(null),

  agentIds: z.array(idSchema).max(20).default([]),
  methodId: idSchema.nullable().default(null),
  samplerId: idSchema.nullable().default(null),
  medium: lineSchema.nullable().default(null),
  mediumLot: lineSchema.nullable().default(null),
  mediumExpiresOn: daySchema.nullable().default(null),
  seal: lineSchema.nullable().default(null),

  pumpId: idSchema.nullable().default(null),
  calibratorId: idSchema.nullable().default(null),
  /** One pump feeds several media through a splitter: then two sheets on one pump are no finding. */
  sharesPump: z.boolean().default(false),
  inletSide: z.enum(INLET_SIDES).nullable().default(null),
  inletPosition: lineSchema.nullable().default(null),
  checkEndsBroken: checkSchema,
  checkPlugOut: checkSchema,
  checkArrow: checkSchema,
  checkCycloneUpright: checkSchema,
  checkLeak: checkSchema,
  protection: textSchema.nullable().default(null),
  controls: textSchema.nullable().default(null),

  plannedFlowLitresPerMinute: flowSchema.nullable().default(null),
  plannedEndAt: instantSchema.nullable().default(null),
  uptakeMillilitresPerMinute: z.number().positive().max(10_000).nullable().default(null),
  archived: z.boolean().default(false),
})
export type Sheet = z.infer<typeof sheetSchema>
export type SheetField = keyof Sheet
