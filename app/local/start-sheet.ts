import { sheetSchema, type Sheet } from '#shared/records/sheet'
import type { PlanLine } from '#shared/records/plan-line'
import type { Worker } from '#shared/records/worker'
import { commit } from './commit'
import type { FieldStore } from './field-store'

/** Starts a sheet with what is known of it; resolves with its id when it is saved on this phone. */
export async function startSheet(store: FieldStore, surveyId: string, known: Partial<Sheet>): Promise<string> {
  const id = store.surroundings.newId()
  await commit(store, [{
    kind: 'obj.new', object: id, sheet: id,
    body: { type: 'sheet', parent: surveyId, initial: sheetSchema.parse({ ...known, technicianId: store.person.id }) },
  }])
  return id
}

/** What the office planned, as the first values of a sheet. The planned end is counted when the run starts. */
export function sheetFromPlanLine(line: PlanLine & { id: string }, worker: Worker | null): Partial<Sheet> {
  return {
    planLineId: line.id, kind: line.kind, air: line.air,
    workerId: line.workerId, groupId: line.groupId ?? worker?.groupId ?? null, jobTitle: worker?.jobTitle || null,
    areaName: line.areaName || null, task: line.task || null,
    agentIds: line.agentIds, methodId: line.methodId, samplerId: line.samplerId,
    plannedFlowLitresPerMinute: line.plannedFlowLitresPerMinute,
  }
}

/** A worker who was not on the list: known by a code; a name, where one is given, travels apart. */
export async function addWorker(store: FieldStore, worker: Pick<Worker, 'code' | 'jobTitle'> & { siteId: string | null, name?: string }): Promise<string> {
  const id = store.surroundings.newId()
  const { name, ...initial } = worker
  await commit(store, [{
    kind: 'obj.new', object: id, sheet: null, personal: name ? { name } : null,
    body: { type: 'worker', parent: null, initial: { ...initial, groupId: null, archived: false } },
  }])
  return id
}
