import { stands, type SheetEvent, type SheetEventOf, type SheetEventType } from '#shared/records/sheet-event'

/** An event and the instant it is put at, in milliseconds since 1970. */
export type Placed<T extends SheetEventType = SheetEventType> = { [K in T]: { event: SheetEventOf<K>, at: number } }[T]

/** The events of a sheet that count, in order. */
export interface PlacedEvents {
  all: readonly Placed[]
  /** Those of one type, in order. */
  of: <T extends SheetEventType>(type: T) => readonly Placed<T>[]
  /** Phones that wrote them. */
  phones: ReadonlySet<string>
  /** Events whose time cannot be read: they count nowhere and raise a finding. */
  unreadable: readonly SheetEvent[]
}

/**
 * Puts the events that were not taken back in order: by their instant, then by id (TIMER1), whatever order they arrived in.
 *
 * One phone: instants are used as written, because differences on one clock need no other clock. Several phones: each instant
 * is moved onto the server's clock by what is known of its phone (`clockOffsetMilliseconds`, server minus phone), so that a
 * start on one phone and a stop on another make an honest difference. An event without a known offset takes the one of that
 * phone's first event that has it; a phone that never met the server stays as written. Raw times are never rewritten.
 *
 * @param events all events of a sheet, in any order
 * @returns the standing ones in order, with the instants that everything else computes with
 */
export function placeEvents(events: readonly SheetEvent[]): PlacedEvents {
  const standing = events.filter(stands)
  const phones = new Set(standing.map(event => event.dev))
  const offsets = phones.size > 1 ? knownOffsets(standing) : null
  const all: Placed[] = []
  const unreadable: SheetEvent[] = []
  for (const event of standing) {
    const written = Date.parse(event.at)
    if (Number.isNaN(written)) unreadable.push(event)
    else all.push({ event, at: offsets ? written + (event.clockOffsetMilliseconds ?? offsets.get(event.dev) ?? 0) : written } as Placed)
  }
  all.sort((a, b) => a.at - b.at || (a.event.id < b.event.id ? -1 : 1))

  const byType = new Map<SheetEventType, Placed[]>()
  for (const placed of all) {
    const list = byType.get(placed.event.type)
    if (list) list.push(placed)
    else byType.set(placed.event.type, [placed])
  }
  return {
    all,
    of: <T extends SheetEventType>(type: T) => (byType.get(type) ?? []) as unknown as readonly Placed<T>[],
    phones,
    unreadable,
  }
}

function knownOffsets(events: readonly SheetEvent[]): Map<string, number> {
  const firsts = new Map<string, SheetEvent>()
  for (const event of events) {
    if (event.clockOffsetMilliseconds === null) continue
    const first = firsts.get(event.dev)
    if (!first || event.id < first.id) firsts.set(event.dev, event)
  }
  return new Map([...firsts].map(([dev, event]) => [dev, event.clockOffsetMilliseconds ?? 0]))
}
