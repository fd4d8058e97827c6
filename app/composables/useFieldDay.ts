import { isOpenForField } from '#shared/access/policy'
import type { SheetAssessment } from '#shared/assessment/sheet-assessment'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { dueOf, type DueItem } from '~/local/due'
import type { PlanLineOfSurvey, SurveyWithCrew } from '~/local/reference'

export type { DueItem, DueKind } from '~/local/due'

/** A sheet as the board shows it. */
export interface FieldSheet {
  bundle: SheetBundle
  assessment: SheetAssessment
  /** Operations of this sheet that are still only on this phone. */
  waiting: number
  needsYou: boolean
}

/** A line of the plan with the sheets that were started from it. */
export type PlanLineView = PlanLineOfSurvey & { sheetIds: string[] }

/** How long a sheet that the office has taken over stays on the board. */
const SHOWN_DAYS = 14
const DAY_MILLISECONDS = 86_400_000
const MINUTE_MILLISECONDS = 60_000

/** The board: what is on this phone for the person at work, and what falls due. */
export function useFieldDay() {
  const session = useSessionStore()
  session.followPhone()
  const clock = useClockStore()
  const { reference } = useReference()

  const minute = computed(() => Math.floor(clock.nowMs / MINUTE_MILLISECONDS))

  const sheets = computed<FieldSheet[]>(() => {
    const { sheets, view } = session
    if (!sheets || !view) return []
    void minute.value
    const nowAt = new Date().toISOString()
    const oldest = new Date(Date.now() - SHOWN_DAYS * DAY_MILLISECONDS).toISOString()
    const waiting = countBySheet(view.outbox)
    const refused = countBySheet(view.refusals)
    const list: FieldSheet[] = []
    for (const id of sheets.sheetIds) {
      const bundle = sheets.bundle(id)
      if (!bundle || bundle.document.sheet.archived || !isShown(bundle, oldest)) continue
      const assessment = sheets.assess(id, nowAt)
      if (!assessment) continue
      const hasConflict = isOpenForField(bundle.document.standing.state) && bundle.document.conflicts.some(conflict => conflict.isOpen)
      list.push({ bundle, assessment, waiting: waiting.get(id) ?? 0, needsYou: hasConflict || refused.has(id) })
    }
    return list.sort((a, b) => (a.bundle.document.createdAt < b.bundle.document.createdAt ? -1 : 1))
  })

  const surveys = computed<SurveyWithCrew[]>(() => reference.value.surveys)

  const planLines = computed<PlanLineView[]>(() => {
    const started = new Map<string, string[]>()
    for (const document of session.sheets?.source.sheets() ?? []) {
      const { planLineId, archived } = document.sheet
      if (planLineId === null || archived || document.standing.state === 'void') continue
      started.set(planLineId, [...started.get(planLineId) ?? [], document.id])
    }
    return reference.value.planLines.map(line => ({ ...line, sheetIds: started.get(line.id) ?? [] }))
  })

  const due = computed<DueItem[]>(() => {
    const nowAt = clock.nowAt
    return sheets.value
      .filter(sheet => isOpenForField(sheet.bundle.document.standing.state))
      .flatMap(sheet => dueOf(sheet.bundle, sheet.assessment, nowAt))
      .sort((a, b) => Date.parse(a.at) - Date.parse(b.at))
  })

  const status = computed<'loading' | 'empty' | 'ready'>(() => {
    const { view } = session
    // Half of a first download would show surveys without their crew: nothing is shown before all of it is here, but one's own work always is.
    if (!view || (!view.cursor.isComplete && view.outbox.length === 0)) return 'loading'
    return surveys.value.length > 0 || sheets.value.length > 0 ? 'ready' : 'empty'
  })

  return { status, surveys, sheets, planLines, due }
}

function isShown({ document }: SheetBundle, oldest: string): boolean {
  return isOpenForField(document.standing.state) || document.standing.state === 'handed-in' || document.createdAt >= oldest
}

function countBySheet(entries: readonly { sheet: string | null }[]): Map<string, number> {
  const counts = new Map<string, number>()
  for (const { sheet } of entries) if (sheet !== null) counts.set(sheet, (counts.get(sheet) ?? 0) + 1)
  return counts
}
