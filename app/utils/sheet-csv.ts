import type { SheetSummary } from '#shared/records/office-views'
import { SHEET_KIND_WORDS, SHEET_STATE_WORDS } from './record-words'

type Cell = string | number | null

const COLUMNS: readonly { head: string, cell: (sheet: SheetSummary) => Cell }[] = [
  { head: 'number', cell: sheet => sheet.number },
  { head: 'state', cell: sheet => SHEET_STATE_WORDS[sheet.state] },
  { head: 'kind', cell: sheet => (SHEET_KIND_WORDS as Record<string, string>)[sheet.kind] ?? sheet.kind },
  { head: 'survey', cell: sheet => sheet.surveyTitle },
  { head: 'worker', cell: sheet => sheet.workerCode },
  { head: 'technician', cell: sheet => sheet.technicianName },
  { head: 'method', cell: sheet => sheet.methodCode },
  { head: 'agents', cell: sheet => sheet.agentNames.join('; ') },
  { head: 'sampled min', cell: sheet => sheet.sampledMinutes },
  { head: 'volume L', cell: sheet => sheet.volumeLitres },
  { head: 'change of flow %', cell: sheet => sheet.changePercent },
  { head: 'stop findings', cell: sheet => sheet.stopCount },
  { head: 'attention findings', cell: sheet => sheet.attentionCount },
  { head: 'attention without answer', cell: sheet => sheet.openAttentionCount },
  { head: 'conflicts', cell: sheet => sheet.conflictCount },
  { head: 'late changes', cell: sheet => sheet.lateCount },
  { head: 'handed in as', cell: sheet => (sheet.isFit === null ? null : sheet.isFit ? 'fit' : 'not fit') },
  { head: 'started (UTC)', cell: sheet => sheet.startedAt },
  { head: 'stopped (UTC)', cell: sheet => sheet.stoppedAt },
  { head: 'handed in (UTC)', cell: sheet => sheet.handedInAt },
  { head: 'zone', cell: sheet => sheet.zone },
]

/** Without it a spreadsheet takes the text for its own old encoding and breaks every name with an accent. */
const BYTE_ORDER_MARK = '\uFEFF'

/**
 * Sheets as comma-separated values: unrounded numbers with a point, instants in UTC.
 *
 * @source RFC 4180; a text that a spreadsheet would run as a formula gets an apostrophe in front
 */
export function sheetsCsv(sheets: readonly SheetSummary[]): string {
  const lines = [COLUMNS.map(column => column.head), ...sheets.map(sheet => COLUMNS.map(column => column.cell(sheet)))]
  return BYTE_ORDER_MARK + lines.map(line => line.map(written).join(',')).join('\r\n') + '\r\n'
}

function written(cell: Cell): string {
  if (cell === null) return ''
  if (typeof cell === 'number') return String(cell)
  const harmless = /^[=+\-@\t\r]/.test(cell) ? `'${cell}` : cell
  return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless
}
