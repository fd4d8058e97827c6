import { RECORD_SCOPES } from '#shared/records/kinds'
import type { Operation } from '#shared/sync/operations'
import type { ObjectData, RowChange, RowType } from '#shared/sync/rows'

/**
 * Whose people see a change that is held: those of the survey it belongs to, where that survey is known; else the
 * organisation's.
 */
export function heldScope(operation: Operation, read: (t: RowType, id: string) => RowChange | undefined, organisation: string): string {
  const target = read('obj', operation.object)
  if (target) return target.scope
  if (operation.kind !== 'obj.new') return organisation
  const { type, parent } = operation.body
  if (RECORD_SCOPES[type] === 'organisation') return organisation
  if (type === 'survey') return operation.object
  return parent !== null && isSurvey(read('obj', parent)) ? parent : organisation
}

export function isSurvey(row: RowChange | undefined): boolean {
  return (row?.data as unknown as ObjectData | undefined)?.type === 'survey'
}
