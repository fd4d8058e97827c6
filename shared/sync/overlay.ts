import { merge } from './merge'
import type { StampedOperation } from './operations'
import type { RowChange, RowType } from './rows'

export interface Overlay {
  rows: RowChange[]
  /** Operations of the outbox that this phone already knows not to be applicable, with the reason. */
  notApplied: { id: string, n: number, reason: string }[]
}

/**
 * What a screen sees: rows as last pulled with the phone's own outbox laid over them. Nothing is rebased in place; an
 * operation that the server holds or refuses simply is no longer laid over.
 */
export function overlay(base: readonly RowChange[], outbox: readonly StampedOperation[], organisation: string): Overlay {
  const rows = new Map<string, RowChange>(base.map(row => [keyOf(row.t, row.id), row]))
  const notApplied: Overlay['notApplied'] = []
  for (const operation of outbox) {
    const result = merge(operation, (t, id) => rows.get(keyOf(t, id)), organisation)
    if (result.outcome === 'held' || result.outcome === 'refused') {
      notApplied.push({ id: operation.id, n: operation.n, reason: result.reason })
      continue
    }
    for (const row of result.rows) rows.set(keyOf(row.t, row.id), row)
  }
  return { rows: [...rows.values()], notApplied }
}

function keyOf(t: RowType, id: string): string {
  return `${t} ${id}`
}
