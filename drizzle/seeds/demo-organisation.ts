import type * as z from 'zod'
import { DEFAULT_SETTINGS } from '#shared/records/settings'
import type { pumpSchema } from '#shared/records/pump'
import type { RecordKind } from '#shared/records/kinds'
import type { SeedDraft } from './draft'
import { namedId } from './ids'
import signIns from './demo-sign-ins.json'

export const DEMO_ORGANISATION = 'Tallow Bridge Hygiene (demo)'
export const DEMO_ZONE = 'Europe/Dublin'

/** Ids of the invented scenario, by the name that the seed uses. */
export interface DemoIds {
  person: (email: string) => string
  worker: (code: string) => string
  pump: (serial: string) => string
  calibrator: (serial: string) => string
  agent: (name: string) => string
  method: (code: string) => string
  sampler: (name: string) => string
  planLine: (index: number) => string
  site: string
  surveyToday: string
  surveyReview: string
}

export function demoIds(organisationId: string): DemoIds {
  const id = (kind: string) => (name: string) => namedId(organisationId, kind, name)
  return {
    person: id('person'), worker: id('worker'), pump: id('pump'), calibrator: id('calibrator'),
    agent: id('agent'), method: id('method'), sampler: id('sampler'),
    planLine: index => id('plan-line')(String(index)),
    site: id('site')('Dunmarrow Works'),
    surveyToday: id('survey')('fettling'),
    surveyReview: id('survey')('melting'),
  }
}

/** Accuracy as common practice has it: an electronic laminar-flow indicator, percent of reading by range. */
const ELECTRONIC: z.input<typeof pumpSchema>['accuracy'] = {
  kind: 'percent-of-reading',
  ranges: [
    { fromLitresPerMinute: 0.5, toLitresPerMinute: 1, percent: 5 },
    { fromLitresPerMinute: 1, toLitresPerMinute: 3, percent: 2.5 },
  ],
}

/** Accuracy as common practice has it: a mechanical flow indicator, percent of full scale. */
const MECHANICAL: z.input<typeof pumpSchema>['accuracy'] = { kind: 'percent-of-full-scale', percent: 5, fullScaleLitresPerMinute: 5 }

const PUMPS: z.input<typeof pumpSchema>[] = [
  { make: 'Brindle E5', serial: 'BR-0411', indicator: 'electronic', flowMinimumLitresPerMinute: 0.5, flowMaximumLitresPerMinute: 5, accuracy: ELECTRONIC, hasElapsedTimer: true },
  { make: 'Brindle E5', serial: 'BR-0412', indicator: 'electronic', flowMinimumLitresPerMinute: 0.5, flowMaximumLitresPerMinute: 5, accuracy: ELECTRONIC, hasElapsedTimer: true },
  { make: 'Brindle E5', serial: 'BR-0418', indicator: 'electronic', flowMinimumLitresPerMinute: 0.5, flowMaximumLitresPerMinute: 5, accuracy: ELECTRONIC, hasElapsedTimer: true },
  { make: 'Teasel R5', serial: 'TE-207', indicator: 'rotameter', flowMinimumLitresPerMinute: 1, flowMaximumLitresPerMinute: 5, accuracy: MECHANICAL, hasElapsedTimer: false },
  {
    make: 'Teasel L', serial: 'TL-033', indicator: 'electronic', flowMinimumLitresPerMinute: 0.02, flowMaximumLitresPerMinute: 0.5, hasElapsedTimer: true,
    accuracy: { kind: 'percent-of-reading', ranges: [{ fromLitresPerMinute: 0.02, toLitresPerMinute: 0.5, percent: 5 }] },
  },
]

const WORKERS: [code: string, jobTitle: string, group: string][] = [
  ['D-101', 'Fettler', 'Fettling'],
  ['D-102', 'Fettler', 'Fettling'],
  ['D-107', 'Grinder', 'Fettling'],
  ['D-114', 'Welder', 'Repair welding'],
  ['D-119', 'Furnace operator', 'Melting'],
  ['D-120', 'Furnace operator', 'Melting'],
  ['D-126', 'Moulder', 'Moulding'],
  ['D-131', 'Paint shop operator', 'Finishing'],
]

/**
 * The invented firm: people, one plant, workers, pumps of both indicator kinds, two calibrators of which one is overdue,
 * two surveys with their crew and plan.
 *
 * @param now the surveys lie around this instant, so that one is running
 */
export function demoOrganisationDrafts(organisationId: string, now: Date): SeedDraft[] {
  const ids = demoIds(organisationId)
  const at = daysFrom(now, -30).toISOString()
  const create = (type: RecordKind, object: string, initial: object, parent: string | null = null): SeedDraft =>
    ({ kind: 'obj.new', object, sheet: null, at, body: { type, parent, initial: initial as Record<string, unknown> } })
  const groups = [...new Set(WORKERS.map(([, , group]) => group))]
  const groupId = (name: string) => namedId(organisationId, 'exposure-group', name)
  const technicians = signIns.filter(person => person.role === 'technician').map(person => ids.person(person.email))

  return [
    create('settings', namedId(organisationId, 'settings'), DEFAULT_SETTINGS),
    ...signIns.map(person => create('person', ids.person(person.email), { name: person.name, roles: [person.role] })),
    create('site', ids.site, { name: 'Dunmarrow Works', employer: 'Dunmarrow Castings', address: 'Quay Road, Dunmarrow', zone: DEMO_ZONE }),
    ...groups.map(name => create('exposure-group', groupId(name), { name, siteId: ids.site })),
    ...WORKERS.map(([code, jobTitle, group]) => create('worker', ids.worker(code), { code, jobTitle, siteId: ids.site, groupId: groupId(group) })),
    ...PUMPS.map(pump => create('pump', ids.pump(pump.serial), pump)),
    create('calibrator', ids.calibrator('PD-19'), { make: 'Plumb D', serial: 'PD-19', principle: 'dry-piston', certificateOn: dayOf(daysFrom(now, -120)), dueOn: dayOf(daysFrom(now, 245)) }),
    create('calibrator', ids.calibrator('PB-04'), { make: 'Plumb B', serial: 'PB-04', principle: 'bubble', certificateOn: dayOf(daysFrom(now, -392)), dueOn: dayOf(daysFrom(now, -27)) }),
    create('survey', ids.surveyToday, {
      title: 'Fettling shop, respirable silica', siteId: ids.site, purpose: 'Exposure of the fettling crew after the new extraction was fitted.',
      startsOn: dayOf(now), endsOn: dayOf(daysFrom(now, 1)), zone: DEMO_ZONE,
    }),
    create('survey', ids.surveyReview, {
      title: 'Melting and finishing, metals and solvents', siteId: ids.site, purpose: 'Yearly survey of the furnace platform and the paint shop.',
      startsOn: dayOf(daysFrom(now, -7)), endsOn: dayOf(daysFrom(now, -3)), zone: DEMO_ZONE,
    }),
    ...[ids.surveyToday, ids.surveyReview].flatMap(survey => technicians.map((person): SeedDraft =>
      ({ kind: 'set.add', object: survey, sheet: null, at, body: { set: 'crew', element: person, meta: {} } }))),
    ...planLines(ids, now).map((line, index) => create('plan-line', ids.planLine(index), line, ids.surveyToday)),
  ]
}

function planLines(ids: DemoIds, now: Date) {
  const silica = {
    plannedOn: dayOf(now), agentIds: [ids.agent('Silica, crystalline, respirable (quartz, cristobalite, tridymite)')], methodId: ids.method('NMAM 7500'),
    samplerId: ids.sampler('Higgins-Dewell type respirable cyclone'), plannedFlowLitresPerMinute: 2.2, plannedMinutes: 420,
  }
  return [
    { ...silica, workerId: ids.worker('D-101'), task: 'Fettling of pump housings' },
    { ...silica, workerId: ids.worker('D-102'), task: 'Fettling of pump housings' },
    { ...silica, workerId: ids.worker('D-107'), task: 'Pedestal grinding' },
    { plannedOn: dayOf(now), workerId: ids.worker('D-114'), task: 'Repair welding in the booth', agentIds: [ids.agent('Manganese compounds and fume (as Mn)')], methodId: ids.method('NMAM 7300'), samplerId: ids.sampler('37-mm closed-face cassette'), plannedFlowLitresPerMinute: 2, plannedMinutes: 420, note: 'Inside the helmet.' },
    { ...silica, kind: 'area', areaName: 'Knock-out grid, north side', workerId: null, task: '' },
    { plannedOn: dayOf(now), kind: 'field-blank', air: 'none', agentIds: silica.agentIds, methodId: silica.methodId, samplerId: silica.samplerId, note: 'Open and cap beside the samples.' },
  ]
}

export function daysFrom(now: Date, days: number): Date {
  return new Date(now.getTime() + days * 86_400_000)
}

export function dayOf(date: Date): string {
  return date.toISOString().slice(0, 10)
}
