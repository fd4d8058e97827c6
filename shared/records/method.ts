import * as z from 'zod'
import { flowSchema, lineSchema, sourceStatusSchema, textSchema } from './base'

const litresSchema = z.number().positive().max(1_000_000).nullable().default(null)

/** A sampling method as published. A null bound is "no range stored": the check says so, it is never passed in silence. */
export const methodSchema = z.object({
  code: lineSchema,
  title: lineSchema,
  analytes: lineSchema.default(''),
  air: z.enum(['pumped', 'diffusive', 'none']),
  medium: lineSchema.default(''),
  sizeSelective: z.enum(['respirable', 'inhalable', 'thoracic']).nullable().default(null),
  /** Use the sampler's nominal flow for the volume, because the sampler corrects itself. */
  usesNominalFlow: z.boolean().default(false),
  flowMinimumLitresPerMinute: flowSchema.nullable().default(null),
  flowMaximumLitresPerMinute: flowSchema.nullable().default(null),
  volumeMinimumLitres: litresSchema,
  volumeMaximumLitres: litresSchema,
  holdDays: z.number().positive().nullable().default(null),
  stabilityAsPrinted: lineSchema.default(''),
  blanksMinimum: z.int().min(0).nullable().default(null),
  blanksPercent: z.number().min(0).max(100).nullable().default(null),
  blanksMaximum: z.int().min(0).nullable().default(null),
  blanksAsPrinted: lineSchema.default(''),
  hasBackSection: z.boolean().nullable().default(null),
  loadMaximumMilligrams: z.number().positive().nullable().default(null),
  shipment: lineSchema.default(''),
  reminders: z.array(lineSchema).max(20).default([]),
  source: lineSchema.default(''),
  status: sourceStatusSchema,
  note: textSchema.default(''),
  /** Volumes that hold for one agent only. */
  agentVolumes: z.array(z.object({
    agent: lineSchema,
    volumeMinimumLitres: litresSchema,
    volumeMaximumLitres: litresSchema,
    status: sourceStatusSchema,
  })).max(60).default([]),
  archived: z.boolean().default(false),
})
export type Method = z.infer<typeof methodSchema>
