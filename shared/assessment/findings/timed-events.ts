import type { SheetEventType } from '#shared/records/sheet-event'
import type { Placed } from '../placed-events'
import type { SheetFacts } from '../sheet-facts'

/** Entries whose time makes a number. */
export const TIMED_TYPES = ['timer', 'flow-reading', 'flow-check', 'pump-swap', 'flow-reset', 'pump-fault'] as const satisfies readonly SheetEventType[]

export function timedEvents(facts: SheetFacts): readonly Placed<(typeof TIMED_TYPES)[number]>[] {
  return TIMED_TYPES.flatMap((type): readonly Placed<(typeof TIMED_TYPES)[number]>[] => facts.events.of(type))
}

export const ENTRY_WORDS = {
  'timer': 'timer entry', 'flow-reading': 'flow reading', 'flow-check': 'flow check', 'pump-swap': 'pump swap', 'flow-reset': 'flow reset', 'pump-fault': 'pump fault',
} as const
