import { stands, type SheetEvent } from '#shared/records/sheet-event'

/** An entry of a sheet as people read it: what counts now, and the values that it took the place of, the first one first. */
export interface EventChain {
  event: SheetEvent
  earlier: SheetEvent[]
  /** Taken back and nothing put in its place. */
  isTakenBack: boolean
}

/**
 * Puts corrected entries with what they correct, so that the first value stands beside the one that counts.
 *
 * @param events events of one sheet in their order; the order of the result is that of the entries that count
 */
export function eventChains(events: readonly SheetEvent[]): EventChain[] {
  const byId = new Map(events.map(event => [event.id, event]))
  const replaced = new Set(events.map(event => event.corrects).filter(id => id !== null && byId.has(id)))
  return events
    .filter(event => !replaced.has(event.id))
    .map(event => ({ event, earlier: earlierOf(event, byId), isTakenBack: !stands(event) }))
}

function earlierOf(event: SheetEvent, byId: ReadonlyMap<string, SheetEvent>): SheetEvent[] {
  const earlier: SheetEvent[] = []
  let previous = event.corrects === null ? undefined : byId.get(event.corrects)
  // Two entries that name each other would never end: phones cannot make them, a damaged copy could.
  while (previous && previous !== event && !earlier.includes(previous)) {
    earlier.unshift(previous)
    previous = previous.corrects === null ? undefined : byId.get(previous.corrects)
  }
  return earlier
}
