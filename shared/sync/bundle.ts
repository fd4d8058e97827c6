import { DEFAULT_SETTINGS, type Settings } from '#shared/records/settings'
import type { RecordKind, RecordOf } from '#shared/records/kinds'
import type { Identified, SheetBundle, SheetDocument, Sibling } from '#shared/records/sheet-bundle'
import { kindOf, recordOf, sheetDocumentOf, type ObjectRows } from './read-rows'

/** Everything that grouped rows hold, read once and handed out by sheet. */
export interface BundleSource {
  /** The sheet with every record its assessment looks at; null when its rows are not here. */
  bundle: (sheetId: string) => SheetBundle | null
  /** Every sheet here. */
  sheets: () => readonly SheetDocument[]
  /** Every record of one kind, read when first asked for. */
  records: <K extends RecordKind>(kind: K) => ReadonlyMap<string, Identified<RecordOf<K>>>
  settings: () => Settings
}

/**
 * Reads rows into bundles. Made once for a set of rows: records and siblings are read once, however many sheets are asked for.
 *
 * @param groups rows by the record they belong to, from `groupRows`: the organisation's records and the survey's sheets
 * @param siblingsOf what the sheets of one survey tell each other; the workbench's `siblingsOf` comes in as an argument, because
 *   this room must not look into that one
 */
export function createBundleSource(groups: ReadonlyMap<string, ObjectRows>, siblingsOf: (documents: readonly SheetDocument[]) => Sibling[]): BundleSource {
  const idsByKind = new Map<RecordKind, string[]>()
  for (const [id, rows] of groups) {
    const kind = kindOf(rows)
    if (kind === null) continue
    const ids = idsByKind.get(kind)
    if (ids) ids.push(id)
    else idsByKind.set(kind, [id])
  }

  const recordsByKind = new Map<RecordKind, ReadonlyMap<string, unknown>>()
  function records<K extends RecordKind>(kind: K): ReadonlyMap<string, Identified<RecordOf<K>>> {
    let known = recordsByKind.get(kind)
    if (!known) {
      known = new Map((idsByKind.get(kind) ?? []).flatMap((id) => {
        const record = recordOf(kind, groups.get(id)!)
        return record ? [[id, record] as const] : []
      }))
      recordsByKind.set(kind, known)
    }
    return known as ReadonlyMap<string, Identified<RecordOf<K>>>
  }

  const once = <T>(make: () => T) => {
    let made: { value: T } | null = null
    return () => (made ??= { value: make() }).value
  }
  const documents = once(() => new Map((idsByKind.get('sheet') ?? []).flatMap((id) => {
    const document = sheetDocumentOf(groups.get(id)!)
    return document ? [[id, document] as const] : []
  })))
  const documentList = once(() => [...documents().values()])
  const siblingsBySurvey = once(() => {
    const surveys = new Map<string, SheetDocument[]>()
    for (const document of documentList()) {
      const list = surveys.get(document.surveyId)
      if (list) list.push(document)
      else surveys.set(document.surveyId, [document])
    }
    return new Map([...surveys].map(([surveyId, list]) => [surveyId, siblingsOf(list)]))
  })
  const limitsByAgent = once(() => {
    const byAgent = new Map<string, SheetBundle['limits'][number][]>()
    for (const limit of records('limit').values()) {
      if (limit.archived) continue
      const list = byAgent.get(limit.agentId)
      if (list) list.push(limit)
      else byAgent.set(limit.agentId, [limit])
    }
    return byAgent
  })
  const pumps = once(() => Object.fromEntries(records('pump')))
  const calibrators = once(() => Object.fromEntries(records('calibrator')))
  const settings = once(() => [...records('settings').values()][0] ?? DEFAULT_SETTINGS)
  const find = <K extends RecordKind>(kind: K, id: string | null) => id === null ? null : records(kind).get(id) ?? null

  function bundle(sheetId: string): SheetBundle | null {
    const document = documents().get(sheetId)
    if (!document) return null
    const { sheet } = document
    return {
      document,
      survey: find('survey', document.surveyId),
      worker: find('worker', sheet.workerId),
      method: find('method', sheet.methodId),
      sampler: find('sampler', sheet.samplerId),
      agents: sheet.agentIds.flatMap(id => find('agent', id) ?? []),
      limits: sheet.agentIds.flatMap(id => limitsByAgent().get(id) ?? []),
      pumps: pumps(),
      calibrators: calibrators(),
      siblings: (siblingsBySurvey().get(document.surveyId) ?? []).filter(sibling => sibling.id !== sheetId),
      settings: settings(),
    }
  }

  return { bundle, sheets: documentList, records, settings }
}
