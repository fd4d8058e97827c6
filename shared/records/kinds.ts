import type * as z from 'zod'
import { agentSchema } from './agent'
import { calibratorSchema } from './calibrator'
import { exposureGroupSchema } from './exposure-group'
import { limitSchema } from './limit'
import { methodSchema } from './method'
import { personSchema } from './person'
import { planLineSchema } from './plan-line'
import { pumpSchema } from './pump'
import { samplerSchema } from './sampler'
import { settingsSchema } from './settings'
import { sheetSchema } from './sheet'
import { siteSchema } from './site'
import { surveySchema } from './survey'
import { workerSchema } from './worker'

/** Every kind of record and its one schema. The wire, the phone and the server walk this list. */
export const RECORD_SCHEMAS = {
  'settings': settingsSchema,
  'person': personSchema,
  'site': siteSchema,
  'exposure-group': exposureGroupSchema,
  'worker': workerSchema,
  'survey': surveySchema,
  'plan-line': planLineSchema,
  'pump': pumpSchema,
  'calibrator': calibratorSchema,
  'sampler': samplerSchema,
  'agent': agentSchema,
  'method': methodSchema,
  'limit': limitSchema,
  'sheet': sheetSchema,
} as const

export type RecordKind = keyof typeof RECORD_SCHEMAS
export const RECORD_KINDS = Object.keys(RECORD_SCHEMAS) as [RecordKind, ...RecordKind[]]
export type RecordOf<K extends RecordKind> = z.infer<(typeof RECORD_SCHEMAS)[K]>

/**
 * Where records of a kind are seen: by the whole organisation, or by the crew of the survey they belong to
 * (their `parent` is that survey; a survey's scope is itself).
 */
export const RECORD_SCOPES: Readonly<Record<RecordKind, 'organisation' | 'survey'>> = {
  'settings': 'organisation',
  'person': 'organisation',
  'site': 'organisation',
  'exposure-group': 'organisation',
  'worker': 'organisation',
  'survey': 'survey',
  'plan-line': 'survey',
  'pump': 'organisation',
  'calibrator': 'organisation',
  'sampler': 'organisation',
  'agent': 'organisation',
  'method': 'organisation',
  'limit': 'organisation',
  'sheet': 'survey',
}

/** Sets beside a record, and the kind of record their elements name. */
export const RECORD_SETS: Readonly<Partial<Record<RecordKind, Readonly<Record<string, RecordKind>>>>> = {
  survey: { crew: 'person' },
}
