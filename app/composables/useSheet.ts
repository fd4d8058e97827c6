import type { MaybeRefOrGetter } from 'vue'
import { assessSheet } from '#shared/assessment/assess-sheet'
import type { SheetAssessment } from '#shared/assessment/sheet-assessment'
import { can, isOpenForField } from '#shared/access/policy'
import { setElements } from '#shared/sync/read-rows'
import { NotSaved } from '~/local/commit'
import { createSheetActions, type ShownSheet } from '~/local/sheet-actions'
import { askForPersistence } from '~/local/storage-state'

/** A running sheet is assessed anew this often; the time itself is shown from stored instants. */
const REASSESS_MILLISECONDS = 10_000

/** One sheet: as it stands on this phone, and everything that a technician does to it. */
export function useSheet(sheetId: MaybeRefOrGetter<string>) {
  const session = useSessionStore()
  session.followPhone()
  const clock = useClockStore()
  const { refusal } = useErrorText()
  const id = computed(() => toValue(sheetId))

  const bundle = computed(() => session.sheets?.bundle(id.value) ?? null)
  const step = computed(() => Math.floor(clock.nowMs / REASSESS_MILLISECONDS))
  const assessment = computed<SheetAssessment | null>(() => {
    void step.value
    return bundle.value && assessSheet(bundle.value, new Date().toISOString())
  })

  const status = computed<'loading' | 'missing' | 'ready'>(() => {
    if (bundle.value) return 'ready'
    return session.view?.cursor.isComplete ? 'missing' : 'loading'
  })
  const waiting = computed(() => session.view?.outbox.filter(entry => entry.sheet === id.value).length ?? 0)
  const ofSheet = computed(() => session.view?.refusals.filter(entry => entry.sheet === id.value) ?? [])
  const refusals = computed(() => ofSheet.value.map(entry => (
    { id: entry.id, what: operationWords(entry.op), reason: refusal(entry.outcome, entry.reason), code: entry.reason, outcome: entry.outcome }
  )))

  /** The name under which this phone writes. */
  const ownDev = computed(() => session.view?.dev ?? '')

  const canEdit = computed(() => {
    const { person, sheets } = session
    if (!bundle.value || !person || !sheets) return false
    const survey = sheets.groups.get(bundle.value.document.surveyId)
    const isInCrew = survey ? setElements(survey, 'crew').includes(person.id) : undefined
    return isOpenForField(bundle.value.document.standing.state) && can(person, { do: 'change', kind: 'sheet' }, { isInCrew })
  })

  function shown(): ShownSheet | null {
    if (!bundle.value) return null
    const { planLineId } = bundle.value.document.sheet
    return {
      bundle: bundle.value,
      assessment: bundle.value && assessSheet(bundle.value, new Date().toISOString()),
      plannedMinutes: planLineId === null ? null : session.sheets?.source.records('plan-line').get(planLineId)?.plannedMinutes ?? null,
      refusedSteps: ofSheet.value.filter(entry => entry.op.kind === 'st.req' && entry.outcome === 'refused').map(entry => entry.id),
    }
  }

  function store() {
    if (!session.fieldStore) throw new NotSaved('Nobody is signed in on this phone.')
    // Once something worth keeping is here, the browser is asked not to clear it by itself.
    void askOnce()
    return session.fieldStore
  }

  return { status, bundle, assessment, waiting, refusals, canEdit, ownDev, ...createSheetActions(store, () => id.value, shown) }
}

let hasAsked = false
async function askOnce() {
  if (hasAsked) return
  hasAsked = true
  await askForPersistence()
}
