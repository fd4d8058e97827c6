import { assessSheet } from '#shared/assessment/assess-sheet'
import { siblingsOf } from '#shared/assessment/siblings'
import { createBundleSource } from '#shared/sync/bundle'
import type { OperationOf, StampedOperation } from '#shared/sync/operations'
import type { RefusedReason } from '#shared/sync/outcomes'
import { groupRows } from '#shared/sync/read-rows'
import type { RowChange } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { assessmentRows } from '#server/database/queries/assessment-rows'

export type StepCheck = (operation: OperationOf<'st.req'>, receivedAt: string) => RefusedReason | null

/**
 * What stands against handing in or accepting a sheet as fit, asked of the same assessment as on the phone.
 *
 * @param operations of the batch; nothing is read when none of them is such a step
 * @param rows the batch's rows as they stand when the check is called: earlier operations of the batch count
 */
export async function loadStepCheck(tx: Transaction, organisation: string, operations: readonly StampedOperation[], rows: ReadonlyMap<string, RowChange>): Promise<StepCheck> {
  const steps = operations.filter(operation => operation.kind === 'st.req' && ['hand-in', 'accept'].includes(operation.body.transition))
  if (steps.length === 0) return () => null
  const surveys = [...new Set(steps.flatMap(step => surveyOf(step.object, operations, rows) ?? []))]
  const stored = await assessmentRows(tx, organisation, surveys)

  return (operation, receivedAt) => {
    const { transition, fit, reason } = operation.body
    if (fit !== true) return transition === 'accept' && !reason?.trim() ? 'needs-reason' : null
    const current = new Map<string, RowChange>(stored.map(row => [`${row.t} ${row.id}`, row]))
    for (const [key, row] of rows) current.set(key, row)
    const bundle = createBundleSource(groupRows(current.values()), siblingsOf).bundle(operation.object)
    if (!bundle) return null
    const hasStop = assessSheet(bundle, receivedAt).findings.some(finding => finding.severity === 'stop')
    const cameAsNotFit = transition === 'accept' && bundle.document.standing.isFit === false
    return hasStop || cameAsNotFit ? 'stop-findings' : null
  }
}

function surveyOf(sheetId: string, operations: readonly StampedOperation[], rows: ReadonlyMap<string, RowChange>): string | null {
  const known = rows.get(`obj ${sheetId}`)
  if (known) return known.scope
  const creation = operations.find(operation => operation.kind === 'obj.new' && operation.object === sheetId)
  return creation?.kind === 'obj.new' ? creation.body.parent : null
}
