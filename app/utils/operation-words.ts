import type { SheetField } from '#shared/records/sheet'
import type { SheetEventData, SheetEventType } from '#shared/records/sheet-event'
import type { Operation } from '#shared/sync/operations'
import { EVENT_WORDS, FIELD_WORDS, TIMER_WORDS, TRANSITION_DONE } from './record-words'

/** What a change did, in a few words for a list. */
export function operationWords(operation: Operation): string {
  switch (operation.kind) {
    case 'obj.new': return operation.body.type === 'sheet' ? 'New sheet' : `New ${operation.body.type.replace('-', ' ')}`
    case 'reg.set': return FIELD_WORDS[operation.body.key as SheetField] ?? operation.body.key
    case 'ev.add': return operation.body.corrects === null ? eventWords(operation.body) : `Corrected: ${eventWords(operation.body)}`
    case 'ev.void': return 'Taken back'
    case 'set.add': return `Added to ${operation.body.set}`
    case 'set.drop': return `Taken out of ${operation.body.set}`
    case 'st.req': return TRANSITION_DONE[operation.body.transition]
  }
}

function eventWords({ type, data }: { type: string, data: Record<string, unknown> }): string {
  if (type === 'timer') return TIMER_WORDS[(data as SheetEventData['timer']).action] ?? EVENT_WORDS.timer
  return EVENT_WORDS[type as SheetEventType] ?? type
}
