import * as z from 'zod'
import { daySchema, idSchema, lineSchema, textSchema } from './base'
import { airSchema, sheetKindSchema } from './sheet'

/** One sample that the office wants taken; a technician starts a sheet from it with one tap. */
export const planLineSchema = z.object({
  plannedOn: daySchema,
  kind: sheetKindSchema.default('personal'),
  air: airSchema.default('pumped'),
  workerId: idSchema.nullable().default(null),
  groupId: idSchema.nullable().default(null),
  areaName: lineSchema.default(''),
  task: lineSchema.default(''),
  agentIds: z.array(idSchema).max(20).default([]),
  methodId: idSchema.nullable().default(null),
  samplerId: idSchema.nullable().default(null),
  plannedFlowLitresPerMinute: z.number().positive().max(1000).nullable().default(null),
  plannedMinutes: z.number().positive().max(2880).nullable().default(null),
  note: textSchema.default(''),
  archived: z.boolean().default(false),
})
export type PlanLine = z.infer<typeof planLineSchema>
