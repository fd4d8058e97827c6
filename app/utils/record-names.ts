import type { RecordKind, RecordOf } from '#shared/records/kinds'
import { kindOf, recordOf, type ObjectRows } from '#shared/sync/read-rows'

/** What a person calls the record with this identity; a short form of the identity where nothing is known of it. */
export type NameOf = (id: string) => string

type Namer<K extends RecordKind> = (record: RecordOf<K>) => string

const NAMERS: { readonly [K in RecordKind]?: Namer<K> } = {
  'person': record => record.name,
  'site': record => record.name,
  'survey': record => record.title,
  'exposure-group': record => record.name,
  'worker': record => record.code,
  'pump': record => `${record.make} ${record.serial}`.trim(),
  'calibrator': record => `${record.make} ${record.serial}`.trim(),
  'sampler': record => record.name,
  'agent': record => record.name,
  'method': record => record.code,
  'sheet': record => record.number ?? '',
}

/**
 * The names of all records in some rows, and of people who appear in a history.
 *
 * @param groups rows by record
 * @param people names by identity, for those whose record is not among the rows
 */
export function recordNames(groups: ReadonlyMap<string, ObjectRows>, people: Readonly<Record<string, string>> = {}): NameOf {
  const names = new Map<string, string>(Object.entries(people))
  for (const [id, rows] of groups) {
    const kind = kindOf(rows)
    const name = kind === null ? '' : nameIn(kind, rows)
    if (name) names.set(id, name)
  }
  return id => names.get(id) ?? `unknown (${id.slice(0, 8)})`
}

function nameIn<K extends RecordKind>(kind: K, rows: ObjectRows): string {
  const namer = NAMERS[kind] as Namer<K> | undefined
  const record = namer ? recordOf(kind, rows) : null
  return namer && record ? namer(record) : ''
}
