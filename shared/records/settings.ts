import * as z from 'zod'

const percentSchema = z.number().min(0).max(100)

/**
 * What the organisation has decided once: thresholds of the findings, and when a flow check is due.
 *
 * The defaults are common practice in the trade; a client's or a country's rule comes first.
 */
export const settingsSchema = z.object({
  flowChangeAttentionPercent: percentSchema.default(5),
  flowChangeStopPercent: percentSchema.default(10),
  readingAwayPercent: percentSchema.default(5),
  minimumReadings: z.int().min(1).max(10).default(3),
  flowCheckAttentionPercent: percentSchema.default(5),
  flowCheckStopPercent: percentSchema.default(10),
  pumpMinutesApart: z.number().min(0).max(600).default(5),
  longPauseMinutes: z.number().min(1).max(1440).default(60),
  coverageShare: z.number().min(0).max(1).default(7 / 8),
  designFlowPercent: percentSchema.default(5),
  firstCheckAfterMinutes: z.number().min(1).max(1440).default(15),
  checkEveryMinutes: z.number().min(1).max(1440).default(120),
  clockOffSeconds: z.number().min(1).max(86_400).default(60),
})
export type Settings = z.infer<typeof settingsSchema>

/** The settings of an organisation that has decided nothing yet. */
export const DEFAULT_SETTINGS: Settings = settingsSchema.parse({})
