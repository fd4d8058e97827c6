import { NO_REFERENCE, referenceOf, type Reference } from '~/local/reference'
import type { SheetsOnPhone } from '~/local/sheets'

export type { Reference, SurveyWithCrew, PlanLineOfSurvey } from '~/local/reference'

const references = new WeakMap<SheetsOnPhone, Reference>()

/** Live lists for pickers, read once for all of them. */
export function useReference() {
  const session = useSessionStore()
  session.followPhone()
  const reference = computed<Reference>(() => {
    const { sheets } = session
    if (!sheets) return NO_REFERENCE
    let known = references.get(sheets)
    if (!known) references.set(sheets, known = referenceOf(sheets))
    return known
  })
  const status = computed<'loading' | 'ready'>(() => session.sheets ? 'ready' : 'loading')
  return { status, reference }
}
