import type { Air, SheetKind } from '#shared/records/sheet'
import { InvalidChange, NotSaved } from '~/local/commit'
import { addWorker as writeWorker, sheetFromPlanLine, startSheet } from '~/local/start-sheet'

/** Begins sheets. Each function resolves with the new record's id when it is saved on this phone. */
export function useStartSheet() {
  const session = useSessionStore()
  session.followPhone()

  function store() {
    if (!session.fieldStore) throw new NotSaved('Nobody is signed in on this phone.')
    return session.fieldStore
  }

  return {
    async fromPlanLine(planLineId: string): Promise<string> {
      const { sheets } = session
      const line = sheets?.source.records('plan-line').get(planLineId)
      if (!sheets || !line) throw new InvalidChange('This line of the plan is not on the phone.')
      const worker = line.workerId === null ? null : sheets.source.records('worker').get(line.workerId) ?? null
      return startSheet(store(), sheets.groups.get(planLineId)!.obj!.scope, sheetFromPlanLine(line, worker))
    },
    async fromNothing(input: { surveyId: string, kind: SheetKind, air: Air }): Promise<string> {
      return startSheet(store(), input.surveyId, { kind: input.kind, air: input.air })
    },
    async addWorker(input: { surveyId: string, code: string, jobTitle: string, name?: string }): Promise<string> {
      const siteId = session.sheets?.source.records('survey').get(input.surveyId)?.siteId ?? null
      return writeWorker(store(), { code: input.code, jobTitle: input.jobTitle, siteId, name: input.name })
    },
  }
}
