import * as z from 'zod'
import { daySchema, lineSchema } from './base'

export const CALIBRATOR_PRINCIPLES = ['dry-piston', 'bubble', 'laminar-flow', 'rotameter'] as const

/** A flow calibrator: what pump flow is compared with. */
export const calibratorSchema = z.object({
  make: lineSchema,
  serial: lineSchema,
  principle: z.enum(CALIBRATOR_PRINCIPLES),
  certificateOn: daySchema.nullable().default(null),
  dueOn: daySchema.nullable().default(null),
  note: lineSchema.default(''),
  archived: z.boolean().default(false),
})
export type Calibrator = z.infer<typeof calibratorSchema>
