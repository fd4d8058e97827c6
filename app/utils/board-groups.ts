import type { FieldSheet } from '~/composables/useFieldDay'

export interface BoardGroup { key: string, title: string, sheets: FieldSheet[], isDone: boolean }

const GROUPS: readonly { key: string, title: string, isDone?: boolean }[] = [
  { key: 'returned', title: 'Returned by the office' },
  { key: 'needs-you', title: 'Needs you' },
  { key: 'drawing', title: 'Drawing air' },
  { key: 'stopped', title: 'Stopped, to be finished' },
  { key: 'set-up', title: 'Being set up' },
  { key: 'handed-in', title: 'Handed in', isDone: true },
  { key: 'office', title: 'With the office', isDone: true },
]

/** The board's groups in the order in which a day asks for them; empty ones are left out. */
export function boardGroups(sheets: readonly FieldSheet[]): BoardGroup[] {
  return GROUPS.map(group => ({ ...group, isDone: group.isDone ?? false, sheets: sheets.filter(sheet => groupOf(sheet) === group.key) })).filter(group => group.sheets.length > 0)
}

function groupOf({ bundle, assessment, needsYou }: FieldSheet): string {
  const { state } = bundle.document.standing
  if (state === 'returned') return 'returned'
  if (needsYou) return 'needs-you'
  if (state === 'handed-in') return 'handed-in'
  if (state !== 'open') return 'office'
  switch (assessment.progress) {
    case 'running':
    case 'paused': return 'drawing'
    case 'stopped':
    case 'checked': return assessment.startedAt === null ? 'set-up' : 'stopped'
    default: return 'set-up'
  }
}
