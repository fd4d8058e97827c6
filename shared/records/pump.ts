import * as z from 'zod'
import { flowSchema, lineSchema } from './base'

/**
 * Accuracy of the pump's own flow indicator, as its maker states it.
 * Percent of reading may differ by flow range; percent of full scale grows as the flow falls.
 */
export const indicatorAccuracySchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('percent-of-reading'),
    ranges: z.array(z.object({
      fromLitresPerMinute: z.number().min(0),
      toLitresPerMinute: flowSchema,
      percent: z.number().positive().max(100),
    })).min(1).max(10),
  }),
  z.object({
    kind: z.literal('percent-of-full-scale'),
    percent: z.number().positive().max(100),
    fullScaleLitresPerMinute: flowSchema,
  }),
])

export const INDICATORS = ['electronic', 'rotameter'] as const

/** A sampling pump. */
export const pumpSchema = z.object({
  make: lineSchema,
  serial: lineSchema,
  indicator: z.enum(INDICATORS),
  flowMinimumLitresPerMinute: flowSchema,
  flowMaximumLitresPerMinute: flowSchema,
  accuracy: indicatorAccuracySchema,
  hasElapsedTimer: z.boolean(),
  note: lineSchema.default(''),
  archived: z.boolean().default(false),
})
export type Pump = z.infer<typeof pumpSchema>
