import { SHEET_EVENTS, type SheetEvent, type SheetEventType } from '#shared/records/sheet-event'
import type { SheetField } from '#shared/records/sheet'
import { TRANSITIONS, type Transition } from '#shared/records/sheet-state'
import { eventInWords, type SaidEvent } from './event-words'
import type { NameOf } from './record-names'
import { FIELD_WORDS, HELD_WORDS, TRANSITION_DONE } from './record-words'
import { valueInWords } from './value-words'

export interface ChangeContext {
  nameOf: NameOf
  zone: string
  /** Entries of the sheet by identity, to say what was taken back. */
  eventOf?: (id: string) => SheetEvent | undefined
}

/** A change as the ledger keeps it, in words. A body that is not understood is shown as it came, never left out. */
export function changeInWords(kind: string, body: unknown, context: ChangeContext): string {
  const fields = isRecord(body) ? body : {}
  switch (kind) {
    case 'obj.new': return 'Made the record'
    case 'reg.set': return fieldChange(fields, context)
    case 'ev.add': return eventChange(fields, context)
    case 'ev.void': {
      const target = typeof fields.target === 'string' ? context.eventOf?.(fields.target) : undefined
      return `Took back ${target ? eventText(target, context) : 'an entry'}: ${String(fields.reason ?? '')}`
    }
    case 'st.req': return stepChange(fields)
    case 'set.add': return `Added ${context.nameOf(String(fields.element))} to ${String(fields.set)}`
    case 'set.drop': return `Took ${context.nameOf(String(fields.element))} from ${String(fields.set)}`
    default: return `${kind} ${JSON.stringify(body)}`
  }
}

/** Why a change was held, from the row's `code: detail`. */
export function heldInWords(reason: string): string {
  const [code = '', ...detail] = reason.split(': ')
  const words = HELD_WORDS[code] ?? code
  return detail.length > 0 ? `${words} (${detail.join(': ')})` : words
}

function fieldChange(fields: Record<string, unknown>, { nameOf, zone }: ChangeContext): string {
  const key = String(fields.key ?? '')
  const label = FIELD_WORDS[key as SheetField] ?? key
  return `${label}: ${valueInWords(key, fields.value, nameOf, zone)}${fields.resolves === true ? ' (chosen between two values)' : ''}`
}

function eventChange(fields: Record<string, unknown>, context: ChangeContext): string {
  const said = readEvent(fields)
  const text = said ? eventText(said, context) : JSON.stringify(fields)
  return fields.corrects ? `Corrected to ${text}: ${String(fields.reason ?? '')}` : text
}

function readEvent(fields: Record<string, unknown>): SaidEvent | null {
  const type = String(fields.type)
  if (!Object.hasOwn(SHEET_EVENTS, type)) return null
  const parsed = SHEET_EVENTS[type as SheetEventType].safeParse(fields.data)
  return parsed.success ? { type, data: parsed.data } as SaidEvent : null
}

function eventText(event: SaidEvent, { nameOf, zone }: ChangeContext): string {
  const { title, detail } = eventInWords(event, nameOf, zone)
  return detail ? `${title}: ${detail}` : title
}

function stepChange(fields: Record<string, unknown>): string {
  const transition = String(fields.transition)
  const known = (TRANSITIONS as readonly string[]).includes(transition)
  const done = known ? TRANSITION_DONE[transition as Transition] : transition
  const fit = fields.fit === true ? ' as fit' : fields.fit === false ? ' as not fit' : ''
  return `${done}${fit}${fields.reason ? `: ${String(fields.reason)}` : ''}`
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}
