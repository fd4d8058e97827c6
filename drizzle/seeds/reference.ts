import { readFileSync } from 'node:fs'
import { parse } from 'csv-parse/sync'
import type * as z from 'zod'
import type { limitSchema } from '#shared/records/limit'
import type { methodSchema } from '#shared/records/method'
import type { samplerSchema } from '#shared/records/sampler'
import type { SourceStatus } from '#shared/records/base'
import type { SeedDraft } from './draft'
import { namedId } from './ids'

/** Cyclones read low and high alike: NMAM 0600 uses their nominal flow for the volume. */
const NOMINAL_FLOW_METHODS = ['NMAM 0600', 'NMAM 7500', 'NMAM 7602']

const REMINDERS: Record<string, string[]> = {
  'NMAM 0600': ['Keep the cyclone upright, never invert it: large particles fall on the filter.'],
  'NMAM 7500': ['Keep the cyclone upright, never invert it: large particles fall on the filter.'],
  'NMAM 7602': ['Keep the cyclone upright, never invert it: large particles fall on the filter.'],
  'NMAM 1501': ['Break both ends just before sampling.', 'The larger section faces the air.', 'Cap with plastic, not rubber.'],
  'NMAM 1300': ['Break both ends just before sampling.', 'The larger section faces the air.', 'Cap with plastic, not rubber.'],
  'NMAM 7400': ['Open face, cowl downwards.', 'Take dusty air in short consecutive samples.'],
}

/**
 * Methods, agents, samplers and limits as every organisation starts with them: each row keeps its source and how far it
 * can be trusted.
 *
 * @param organisationId the ids are made from it
 * @param at instant of the seed
 */
export function referenceDrafts(organisationId: string, at: string): SeedDraft[] {
  const create = (type: 'agent' | 'method' | 'sampler' | 'limit', key: string, initial: object): SeedDraft => ({
    kind: 'obj.new', object: namedId(organisationId, type, key), sheet: null, at,
    body: { type, parent: null, initial: initial as Record<string, unknown> },
  })
  const limits = rowsOf('limits.csv')
  const agents = new Map<string, { cas: string, molarMass: number | null }>()
  for (const row of limits) {
    const known = agents.get(row.substance!)
    agents.set(row.substance!, { cas: known?.cas || row.cas!, molarMass: known?.molarMass ?? numberOrNull(row.molar_mass) })
  }
  return [
    ...[...agents].map(([name, agent]) => create('agent', name, { name, cas: agent.cas, molarMassGramsPerMole: agent.molarMass })),
    ...rowsOf('samplers.csv').map(row => create('sampler', row.sampler!, samplerOf(row))),
    ...methods().map(method => create('method', method.code, method)),
    ...limits.map((row, index) => create('limit', `${index} ${row.substance} ${row.authority} ${row.kind}`, limitOf(row, namedId(organisationId, 'agent', row.substance!)))),
  ]
}

type Cells = Record<string, string | undefined>

function rowsOf(file: string): Cells[] {
  return parse(readFileSync(new URL(`./data/${file}`, import.meta.url)), { columns: true, skip_empty_lines: true }) as Cells[]
}

function numberOrNull(cell: string | undefined): number | null {
  if (cell === undefined || cell.trim() === '') return null
  const value = Number(cell)
  if (!Number.isFinite(value)) throw new RangeError(`reference data: not a number: ${cell}`)
  return value
}

function samplerOf(row: Cells): z.input<typeof samplerSchema> {
  return {
    name: row.sampler!,
    fraction: (row.fraction || null) as z.input<typeof samplerSchema>['fraction'],
    designFlowLitresPerMinute: numberOrNull(row.design_flow_l_min),
    source: row.source ?? '',
    status: row.status as SourceStatus,
  }
}

function methods(): z.input<typeof methodSchema>[] {
  const volumes = rowsOf('method-agents.csv')
  return rowsOf('methods.csv').map(row => ({
    code: row.method!,
    title: row.title!,
    analytes: row.analytes ?? '',
    air: row.air as 'pumped' | 'diffusive' | 'none',
    medium: row.sampler ?? '',
    sizeSelective: (row.size_selective || null) as z.input<typeof methodSchema>['sizeSelective'],
    usesNominalFlow: NOMINAL_FLOW_METHODS.includes(row.method!),
    flowMinimumLitresPerMinute: numberOrNull(row.flow_min_l_min),
    flowMaximumLitresPerMinute: numberOrNull(row.flow_max_l_min),
    volumeMinimumLitres: numberOrNull(row.volume_min_l),
    volumeMaximumLitres: numberOrNull(row.volume_max_l),
    holdDays: numberOrNull(row.hold_days),
    stabilityAsPrinted: row.stability_as_printed ?? '',
    blanksMinimum: numberOrNull(row.blanks_min),
    blanksPercent: numberOrNull(row.blanks_percent),
    blanksMaximum: numberOrNull(row.blanks_max),
    blanksAsPrinted: row.blanks_as_printed ?? '',
    hasBackSection: row.front_back === 'yes' ? true : row.front_back === 'no' ? false : null,
    loadMaximumMilligrams: numberOrNull(row.load_max_mg),
    shipment: row.shipment ?? '',
    reminders: REMINDERS[row.method!] ?? [],
    source: row.source ?? '',
    status: row.status as SourceStatus,
    note: row.note ?? '',
    agentVolumes: volumes.filter(volume => volume.method === row.method).map(volume => ({
      agent: volume.agent!,
      volumeMinimumLitres: numberOrNull(volume.volume_min_l),
      volumeMaximumLitres: numberOrNull(volume.volume_max_l),
      status: volume.status as SourceStatus,
    })),
  }))
}

function limitOf(row: Cells, agentId: string): z.input<typeof limitSchema> {
  return {
    agentId,
    authority: row.authority!,
    kind: row.kind as z.input<typeof limitSchema>['kind'],
    averagingMinutes: numberOrNull(row.averaging_minutes),
    fraction: row.fraction ?? '',
    expressedAs: row.expressed_as ?? '',
    value: numberOrNull(row.value)!,
    unit: row.unit!,
    otherValue: numberOrNull(row.other_value),
    otherUnit: row.other_unit ?? '',
    skin: row.skin === 'yes',
    carcinogen: row.carcinogen === 'yes',
    citation: row.citation ?? '',
    status: row.status as SourceStatus,
    note: row.note ?? '',
  }
}
