import type { LateData, RowChange, RowType } from '#shared/sync/rows'
import type { LedgerEntry } from './write-ledger'

/**
 * Shows an operation that could not be read beside the record it names: a person must see it, whatever is wrong with it. One
 * that names nothing known stands with the organisation.
 */
export function unreadRow(entry: LedgerEntry, read: (t: RowType, id: string) => RowChange | undefined, organisation: string): RowChange {
  const owner = [entry.object, entry.sheet].flatMap(id => (id === null ? [] : read('obj', id) ?? []))[0]
  const { body, at } = entry.body
  const data: LateData = {
    op: entry.id, kind: entry.kind, body: body ?? entry.body, reason: entry.detail ? `${entry.reason}: ${entry.detail}` : entry.reason!,
    author: entry.author, dev: entry.dev, at: typeof at === 'string' ? at : entry.receivedAt,
  }
  return {
    t: 'late', id: entry.id, scope: owner?.scope ?? organisation, object: owner?.object ?? organisation, gone: false,
    data: data as unknown as Record<string, unknown>,
  }
}
