import { assessSheet } from '#shared/assessment/assess-sheet'
import { siblingsOf } from '#shared/assessment/siblings'
import type { SheetSummary } from '#shared/records/office-views'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { createBundleSource } from '#shared/sync/bundle'
import { groupRows } from '#shared/sync/read-rows'
import type { Row } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { assessmentRows, latestVersions } from '#server/database/queries/assessment-rows'
import { peopleNames } from '#server/database/queries/people-names'

/** Findings look at the clock too, so that a summary is made again after a minute even when nothing was written. */
const FRESH_MILLISECONDS = 60_000
const MOST_SURVEYS_KEPT = 200

interface Kept { key: string, madeAt: number, summaries: Map<string, SheetSummary> }
const kept = new Map<string, Kept>()

/**
 * What `assessSheet` says of every sheet of these surveys. A survey is assessed again only when one of its rows or of the
 * organisation's records has changed, or after a minute; the number of statements does not grow with sheets or surveys.
 */
export async function summariseSheets(tx: Transaction, organisation: string, epoch: string, surveyIds: readonly string[], now: Date): Promise<Map<string, SheetSummary>> {
  const versions = await latestVersions(tx, organisation, [organisation, ...surveyIds])
  const keyOf = (surveyId: string) => `${epoch} ${versions.get(organisation)} ${versions.get(surveyId)}`
  const nameOf = (surveyId: string) => `${organisation} ${surveyId}`
  const isFresh = (surveyId: string) => {
    const known = kept.get(nameOf(surveyId))
    return known?.key === keyOf(surveyId) && Math.abs(now.getTime() - known.madeAt) < FRESH_MILLISECONDS
  }

  const stale = surveyIds.filter(surveyId => !isFresh(surveyId))
  const made = new Map<string, SheetSummary>()
  if (stale.length > 0) {
    const rows = await assessmentRows(tx, organisation, stale)
    const names = await peopleNames(tx, organisation)
    for (const summary of summariesOf(rows, names, now)) made.set(summary.id, summary)
  }

  const all = new Map<string, SheetSummary>(made)
  for (const surveyId of surveyIds) {
    const name = nameOf(surveyId)
    const known = stale.includes(surveyId)
      ? { key: keyOf(surveyId), madeAt: now.getTime(), summaries: new Map([...made].filter(([, summary]) => summary.surveyId === surveyId)) }
      : kept.get(name)!
    for (const [id, summary] of known.summaries) all.set(id, summary)
    // Put back at the end: the one that was not asked for longest goes first.
    kept.delete(name)
    kept.set(name, known)
  }
  for (const name of kept.keys()) {
    if (kept.size <= MOST_SURVEYS_KEPT) break
    kept.delete(name)
  }
  return all
}

function summariesOf(rows: readonly Row[], names: ReadonlyMap<string, string>, now: Date): SheetSummary[] {
  const source = createBundleSource(groupRows(rows), siblingsOf)
  const changedVersions = new Map<string, number>()
  for (const row of rows) changedVersions.set(row.object, Math.max(row.ver, changedVersions.get(row.object) ?? 0))
  return source.sheets().map(({ id }) => summaryOf(source.bundle(id)!, names, changedVersions.get(id)!, now.toISOString()))
}

function summaryOf(bundle: SheetBundle, names: ReadonlyMap<string, string>, changedVer: number, nowAt: string): SheetSummary {
  const { document, survey, worker, method, agents } = bundle
  const { sheet, standing } = document
  const { assessment, faults } = assessWithoutFail(bundle, nowAt)
  const attentions = assessment.findings.filter(finding => finding.severity === 'attention')
  return {
    id: document.id, number: sheet.number, kind: sheet.kind,
    surveyId: document.surveyId, surveyTitle: survey?.title ?? '',
    workerCode: worker?.code ?? null,
    technicianName: sheet.technicianId === null ? null : names.get(sheet.technicianId) ?? null,
    state: standing.state, progress: assessment.progress, isFit: standing.isFit,
    stopCount: assessment.findings.filter(finding => finding.severity === 'stop').length + faults,
    attentionCount: attentions.length,
    openAttentionCount: attentions.filter(finding => finding.answer === null).length,
    conflictCount: document.conflicts.filter(conflict => conflict.isOpen).length,
    lateCount: document.late.length,
    methodCode: method?.code ?? null, agentNames: agents.map(agent => agent.name),
    sampledMinutes: assessment.sampledMinutes, volumeLitres: assessment.volumeLitres, changePercent: assessment.change?.percent ?? null,
    startedAt: assessment.startedAt, stoppedAt: assessment.stoppedAt,
    handedInAt: standing.state === 'handed-in' ? standing.at : null,
    changedVer, zone: survey?.zone ?? 'UTC', ribbon: assessment.ribbon,
  }
}

/**
 * One sheet that the assessment cannot take must not hide the others: it is listed without its events, as one with a stop
 * finding more, so that somebody opens it.
 */
function assessWithoutFail(bundle: SheetBundle, nowAt: string): { assessment: ReturnType<typeof assessSheet>, faults: number } {
  try {
    return { assessment: assessSheet(bundle, nowAt), faults: 0 }
  }
  catch (error) {
    console.error(`Sheet ${bundle.document.id} could not be assessed: ${error instanceof Error ? error.message : String(error)}`)
    return { assessment: assessSheet({ ...bundle, document: { ...bundle.document, events: [] }, siblings: [] }, nowAt), faults: 1 }
  }
}
