import type { SaidBy } from '#shared/records/sheet-event'
import type { OperationKind, OperationOf } from '#shared/sync/operations'

/** An operation as a seed writes it; numbers, stamps and ids are given by whoever applies it. */
export type SeedDraft = {
  [K in OperationKind]: { kind: K, object: string, sheet: string | null, at: string, body: OperationOf<K>['body'], by?: SaidBy | null, personal?: Record<string, string> | null, id?: string }
}[OperationKind]
