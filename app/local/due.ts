import type { SheetAssessment } from '#shared/assessment/sheet-assessment'
import type { SheetBundle } from '#shared/records/sheet-bundle'

const MINUTE_MILLISECONDS = 60_000

export const DUE_KINDS = ['flow-check', 'planned-end', 'maximum-volume', 'minimum-volume', 'flow-after', 'paused-long'] as const
export type DueKind = (typeof DUE_KINDS)[number]

/** Something that a sheet asks for at an instant. */
export interface DueItem {
  sheetId: string
  what: DueKind
  at: string
  isOverdue: boolean
  /** What it is, in words; the sheet is named beside it. */
  words: string
}

const WORDS: Readonly<Record<DueKind, string>> = {
  'flow-check': 'Flow check',
  'planned-end': 'Planned end',
  'maximum-volume': 'Maximum volume',
  'minimum-volume': 'Minimum volume',
  'flow-after': 'Flow after',
  'paused-long': 'Long pause',
}

/** What a sheet asks for, in no order. Reaching the minimum volume is good news: once it has passed it is no longer listed. */
export function dueOf(bundle: SheetBundle, assessment: SheetAssessment, nowAt: string): DueItem[] {
  const { document } = bundle
  const now = Date.parse(nowAt)
  const items: DueItem[] = []
  const add = (what: DueKind, at: string | null) => {
    if (at !== null) items.push({ sheetId: document.id, what, at, isOverdue: Date.parse(at) <= now, words: WORDS[what] })
  }
  switch (assessment.progress) {
    case 'running':
      add('flow-check', assessment.nextCheckDueAt)
      add('planned-end', document.sheet.plannedEndAt)
      add('maximum-volume', assessment.projection?.maximumAt ?? null)
      add('minimum-volume', assessment.projection?.minimumAt ?? null)
      break
    case 'paused': {
      const pause = assessment.pauses.at(-1)
      if (pause && pause.toAt === null) add('paused-long', new Date(Date.parse(pause.fromAt) + bundle.settings.longPauseMinutes * MINUTE_MILLISECONDS).toISOString())
      add('planned-end', document.sheet.plannedEndAt)
      break
    }
    case 'stopped':
      if (document.sheet.air === 'pumped') add('flow-after', assessment.stoppedAt)
  }
  return items.filter(item => item.what !== 'minimum-volume' || !item.isOverdue)
}
