import { RECORD_SCHEMAS, RECORD_SETS, type RecordKind } from '#shared/records/kinds'
import { SHEET_EVENTS, type SheetEventType } from '#shared/records/sheet-event'
import type { Operation } from './operations'

export type Validation = { ok: true } | { ok: false, message: string }

const GOOD: Validation = { ok: true }
const bad = (message: string): Validation => ({ ok: false, message })

/**
 * Whether the content of an operation is possible for this kind of record: the impossible is held, the unusual passes.
 *
 * @param operation as parsed from the wire
 * @param kind of the record it changes
 */
export function validateOperation(operation: Operation, kind: RecordKind): Validation {
  switch (operation.kind) {
    case 'obj.new': return issuesOf(RECORD_SCHEMAS[operation.body.type].safeParse(operation.body.initial))
    case 'reg.set': return validateField(kind, operation.body.key, operation.body.value)
    case 'set.add':
    case 'set.drop':
      return RECORD_SETS[kind]?.[operation.body.set] ? GOOD : bad(`A ${kind} has no set "${operation.body.set}".`)
    case 'ev.add': {
      if (kind !== 'sheet') return bad(`A ${kind} takes no events.`)
      const schema = SHEET_EVENTS[operation.body.type as SheetEventType]
      return schema ? issuesOf(schema.safeParse(operation.body.data)) : bad(`Unknown event "${operation.body.type}".`)
    }
    case 'ev.void': return kind === 'sheet' ? GOOD : bad(`A ${kind} takes no events.`)
    case 'st.req': return kind === 'sheet' ? GOOD : bad(`A ${kind} has no such steps.`)
  }
}

/** Whether a field exists on this kind of record and takes this value. */
export function validateField(kind: RecordKind, key: string, value: unknown): Validation {
  const shape = RECORD_SCHEMAS[kind].shape as Record<string, { safeParse: (value: unknown) => ParseResult }>
  const field = Object.hasOwn(shape, key) ? shape[key] : undefined
  if (!field) return bad(`A ${kind} has no field "${key}".`)
  return value === undefined ? bad(`The field "${key}" came without a value.`) : issuesOf(field.safeParse(value))
}

interface ParseResult { success: boolean, error?: { issues: { path: PropertyKey[], message: string }[] } }

function issuesOf(result: ParseResult): Validation {
  if (result.success) return GOOD
  return bad(result.error!.issues.map(issue => [issue.path.map(String).join('.'), issue.message].filter(Boolean).join(': ')).join('; '))
}
