import type { RecordKind, RecordOf } from '#shared/records/kinds'
import type { Agent } from '#shared/records/agent'
import type { Calibrator } from '#shared/records/calibrator'
import type { ExposureGroup } from '#shared/records/exposure-group'
import type { Limit } from '#shared/records/limit'
import type { Method } from '#shared/records/method'
import type { Person } from '#shared/records/person'
import type { PlanLine } from '#shared/records/plan-line'
import type { Pump } from '#shared/records/pump'
import type { Sampler } from '#shared/records/sampler'
import { DEFAULT_SETTINGS, type Settings } from '#shared/records/settings'
import type { Identified } from '#shared/records/sheet-bundle'
import type { Site } from '#shared/records/site'
import type { Survey } from '#shared/records/survey'
import type { Worker } from '#shared/records/worker'
import { setElements } from '#shared/sync/read-rows'
import type { SheetsOnPhone } from './sheets'

export type SurveyWithCrew = Identified<Survey> & { crewIds: string[] }
export type PlanLineOfSurvey = Identified<PlanLine> & { surveyId: string }

/** What a picker offers: the records of the organisation and of the person's surveys that were not put away. */
export interface Reference {
  settings: Settings
  people: Identified<Person>[]
  sites: Identified<Site>[]
  workers: Identified<Worker>[]
  surveys: SurveyWithCrew[]
  planLines: PlanLineOfSurvey[]
  pumps: Identified<Pump>[]
  calibrators: Identified<Calibrator>[]
  samplers: Identified<Sampler>[]
  agents: Identified<Agent>[]
  methods: Identified<Method>[]
  limits: Identified<Limit>[]
  exposureGroups: Identified<ExposureGroup>[]
}

export const NO_REFERENCE: Reference = {
  settings: DEFAULT_SETTINGS, people: [], sites: [], workers: [], surveys: [], planLines: [], pumps: [], calibrators: [],
  samplers: [], agents: [], methods: [], limits: [], exposureGroups: [],
}

/** Sorted by what a person reads first. */
export function referenceOf({ groups, source }: Pick<SheetsOnPhone, 'groups' | 'source'>): Reference {
  function offered<K extends Exclude<RecordKind, 'settings'>>(kind: K, nameOf: (record: RecordOf<K>) => string): Identified<RecordOf<K>>[] {
    return byName([...source.records(kind).values()].filter(record => !isArchived(record)), nameOf)
  }
  return {
    settings: source.settings(),
    people: offered('person', person => person.name),
    sites: offered('site', site => site.name),
    workers: offered('worker', worker => worker.code),
    surveys: offered('survey', survey => `${survey.startsOn} ${survey.title}`)
      .map(survey => ({ ...survey, crewIds: setElements(groups.get(survey.id)!, 'crew') })),
    planLines: offered('plan-line', line => `${line.plannedOn} ${line.areaName}`)
      .map(line => ({ ...line, surveyId: groups.get(line.id)!.obj!.scope })),
    pumps: offered('pump', pump => `${pump.make} ${pump.serial}`),
    calibrators: offered('calibrator', calibrator => `${calibrator.make} ${calibrator.serial}`),
    samplers: offered('sampler', sampler => sampler.name),
    agents: offered('agent', agent => agent.name),
    methods: offered('method', method => method.code),
    limits: offered('limit', limit => `${limit.authority} ${limit.kind}`),
    exposureGroups: offered('exposure-group', group => group.name),
  }
}

function isArchived(record: object): boolean {
  return 'archived' in record && record.archived === true
}

const inOrder = new Intl.Collator('en', { numeric: true, sensitivity: 'base' })

function byName<T>(list: T[], nameOf: (item: T) => string): T[] {
  return list.sort((a, b) => inOrder.compare(nameOf(a), nameOf(b)))
}
