import type { Actor } from '#shared/access/policy'
import type { SheetListAnswer, SheetListQuery, SheetSummary } from '#shared/records/office-views'
import { SHEET_STATES, type SheetState } from '#shared/records/sheet-state'
import type { Transaction } from '#server/database/client'
import { listedSheets, type ListedSheet } from '#server/database/queries/listed-sheets'
import { organisationVersion } from '#server/database/queries/organisation-version'
import { summariseSheets } from './summarise-sheets'

export const PAGE_SIZE = 50

/** One page of the office's list of sheets, with how many sheets stand in each state under the same filters. */
export async function listSheets(tx: Transaction, actor: Actor, query: SheetListQuery, now: Date): Promise<SheetListAnswer> {
  const organisation = actor.organisationId
  const { ver, epoch } = await organisationVersion(tx, organisation)
  const words = query.q?.trim().toLowerCase() ?? ''
  const found = (await listedSheets(tx, organisation, query)).filter(sheet => holds(sheet, words))

  // Only where findings decide what is listed must more than the list itself be assessed.
  const listed = found.filter(sheet => isInState(sheet.state, query.state))
  const looked = query.severity === undefined ? listed : found
  const summaries = await summariseSheets(tx, organisation, epoch, [...new Set(looked.map(sheet => sheet.survey))], now)
  const passes = (sheet: ListedSheet) => summaries.has(sheet.id) && hasSeverity(summaries.get(sheet.id)!, query.severity)

  const counted = query.severity === undefined ? found : found.filter(passes)
  const sheets = listed.filter(passes).map(sheet => summaries.get(sheet.id)!).sort(orderOf(query))
  const from = (query.page - 1) * PAGE_SIZE
  return { sheets: sheets.slice(from, from + PAGE_SIZE), total: sheets.length, page: query.page, pageSize: PAGE_SIZE, counts: countStates(counted), ver }
}

function holds(sheet: ListedSheet, words: string): boolean {
  return words === '' || [sheet.number, sheet.workerCode, sheet.task].some(text => text?.toLowerCase().includes(words))
}

function isInState(state: SheetState, wanted: SheetListQuery['state']): boolean {
  return wanted === 'all' || state === (wanted === 'to-review' ? 'handed-in' : wanted)
}

function hasSeverity(summary: SheetSummary, severity: SheetListQuery['severity']): boolean {
  switch (severity) {
    case undefined: return true
    case 'stop': return summary.stopCount > 0
    case 'attention': return summary.attentionCount > 0
    case 'any': return summary.stopCount + summary.attentionCount > 0
    case 'none': return summary.stopCount + summary.attentionCount === 0
    case 'conflict': return summary.conflictCount > 0
    case 'late': return summary.lateCount > 0
  }
}

function countStates(sheets: readonly ListedSheet[]): Record<string, number> {
  const counts: Record<string, number> = Object.fromEntries(SHEET_STATES.map(state => [state, 0]))
  for (const sheet of sheets) counts[sheet.state] = (counts[sheet.state] ?? 0) + 1
  return { ...counts, 'all': sheets.length, 'to-review': counts['handed-in']! }
}

type Compare = (a: SheetSummary, b: SheetSummary) => number

const collator = new Intl.Collator('en', { numeric: true })

/** Text that is missing comes last, whichever way the list runs. */
function byText(of: (summary: SheetSummary) => string | null, sign: number): Compare {
  return (a, b) => {
    const [first, second] = [of(a), of(b)]
    if (first === null || second === null) return Number(first === null) - Number(second === null)
    return sign * collator.compare(first, second)
  }
}

const weigh = (summary: SheetSummary) => summary.stopCount * 10_000 + summary.openAttentionCount * 100 + summary.attentionCount

/** Unless told otherwise, findings run from the worst down and everything else upwards; ties by number, then id. */
function orderOf({ sort, direction }: SheetListQuery): Compare {
  const sign = (direction ?? (sort === 'findings' ? 'desc' : 'asc')) === 'desc' ? -1 : 1
  const main: Record<SheetListQuery['sort'], Compare> = {
    'findings': (a, b) => sign * (weigh(a) - weigh(b)),
    'handed-in': byText(summary => summary.handedInAt, sign),
    'number': byText(summary => summary.number, sign),
    'worker': byText(summary => summary.workerCode, sign),
    'state': (a, b) => sign * (SHEET_STATES.indexOf(a.state) - SHEET_STATES.indexOf(b.state)),
  }
  const steps: Compare[] = [main[sort], byText(summary => summary.number, 1), (a, b) => (a.id < b.id ? -1 : 1)]
  return (a, b) => {
    for (const step of steps) {
      const order = step(a, b)
      if (order !== 0) return order
    }
    return 0
  }
}
