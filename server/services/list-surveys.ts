import type { Actor } from '#shared/access/policy'
import type { SurveyDetail, SurveyView } from '#shared/records/office-views'
import type { Identified } from '#shared/records/sheet-bundle'
import type { PlanLine } from '#shared/records/plan-line'
import { groupRows, recordOf, setElements } from '#shared/sync/read-rows'
import type { Transaction } from '#server/database/client'
import { peopleNames } from '#server/database/queries/people-names'
import { planLineRows, recordRows, sheetCounts, surveysOf } from '#server/database/queries/survey-lists'
import { Refusal } from './refusal'

/** The surveys of the organisation, the latest first. */
export async function listSurveys(tx: Transaction, actor: Actor): Promise<SurveyView[]> {
  const views = await surveyViews(tx, actor.organisationId)
  return views.map(({ planLines: _planLines, ...view }) => view)
}

/** @throws Refusal `not-found` when the organisation has no such survey */
export async function openSurvey(tx: Transaction, actor: Actor, surveyId: string): Promise<SurveyDetail> {
  const [view] = await surveyViews(tx, actor.organisationId, surveyId)
  if (!view) throw new Refusal('not-found', 404)
  return { ...view, codes: await codesIn(tx, actor.organisationId, view.planLines) }
}

/** Codes of the workers and methods that plan lines name. */
async function codesIn(tx: Transaction, organisation: string, lines: readonly PlanLine[]): Promise<Record<string, string>> {
  const ids = [...new Set(lines.flatMap(({ workerId, methodId }) => [workerId, methodId].filter(id => id !== null)))]
  const groups = groupRows(await recordRows(tx, organisation, ids))
  return Object.fromEntries([...groups].flatMap(([id, rows]) => {
    const code = (recordOf('worker', rows) ?? recordOf('method', rows))?.code
    return code === undefined ? [] : [[id, code]]
  }))
}

async function surveyViews(tx: Transaction, organisation: string, surveyId?: string): Promise<Omit<SurveyDetail, 'codes'>[]> {
  const found = await surveysOf(tx, organisation, surveyId)
  const ids = found.map(survey => survey.id)
  const records = groupRows(await recordRows(tx, organisation, [...ids, ...new Set(found.map(survey => survey.site))]))
  const names = await peopleNames(tx, organisation)
  const counts = await sheetCounts(tx, organisation)
  const planLines = planLinesBySurvey(await planLineRows(tx, organisation, ids))

  return found.map((survey) => {
    const rows = records.get(survey.id)
    const site = records.get(survey.site)
    const lines = planLines.get(survey.id) ?? []
    return {
      id: survey.id, title: survey.title, startsOn: survey.startsOn, endsOn: survey.endsOn, zone: survey.zone,
      siteName: (site && recordOf('site', site)?.name) ?? '',
      purpose: (rows && recordOf('survey', rows)?.purpose) ?? '',
      crew: (rows ? setElements(rows, 'crew') : []).map(id => ({ id, name: names.get(id) ?? '' })),
      sheetCounts: counts.get(survey.id) ?? {},
      planLineCount: lines.length, planLines: lines,
    }
  })
}

function planLinesBySurvey(rows: Awaited<ReturnType<typeof planLineRows>>): Map<string, Identified<PlanLine>[]> {
  const bySurvey = new Map<string, Identified<PlanLine>[]>()
  for (const group of groupRows(rows).values()) {
    const line = recordOf('plan-line', group)
    if (!line || line.archived) continue
    const surveyId = group.obj!.scope
    bySurvey.set(surveyId, [...bySurvey.get(surveyId) ?? [], line])
  }
  for (const lines of bySurvey.values()) lines.sort((a, b) => (`${a.plannedOn} ${a.id}` < `${b.plannedOn} ${b.id}` ? -1 : 1))
  return bySurvey
}
