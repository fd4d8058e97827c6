import { refuse } from './check'
import { dayExists } from './day'
import { instantMilliseconds, instantText } from './instant'

const MILLISECONDS_IN_DAY = 86_400_000

export interface LocalChoices {
  /** the earlier of the two instants: before the clocks went back */
  first: string
  /** the later one: after the clocks went back */
  second: string
}

export type LocalInstant
  = | { ok: true, at: string }
    | { ok: false, reason: 'missing' }
    | { ok: false, reason: 'ambiguous', choices: LocalChoices }

export interface LocalParts {
  /** day on the wall, YYYY-MM-DD */
  dayOn: string
  /** time on the wall, HH:mm */
  time: string
  year: number
  month: number
  day: number
  hour: number
  minute: number
  second: number
  /** how far the wall clock is ahead of UTC, min */
  offsetMinutes: number
}

/**
 * The instant that a wall clock's time means in a zone.
 *
 * Twice a year that is no plain question. In spring an hour does not exist (`missing`), in autumn one comes twice
 * (`ambiguous`): both are asked back, because a library that silently picks one changes a sample by an hour.
 *
 * @param localText what the wall clock showed, YYYY-MM-DDTHH:mm or with seconds
 * @param zone IANA name, such as Europe/London
 * @param choice which of the two instants is meant when the time comes twice
 * @returns the instant in UTC, or why there is not exactly one
 * @throws RangeError when the text is not a time of the calendar or the zone is unknown
 * @source IANA time zone database, as the running engine carries it
 * @example localInstant('2026-07-03T07:02', 'Europe/London') // { ok: true, at: '2026-07-03T06:02:00.000Z' }
 */
export function localInstant(localText: string, zone: string, choice?: 'first' | 'second'): LocalInstant {
  const wall = wallMilliseconds(localText)
  // A day to either side covers every change of the clocks that can touch this time.
  const offsets = new Set([-1, 0, 1].map(days => offsetMilliseconds(wall + days * MILLISECONDS_IN_DAY, zone)))
  const instants = [...offsets]
    .map(offset => wall - offset)
    .filter(instant => instant + offsetMilliseconds(instant, zone) === wall)
    .sort((a, b) => a - b)
  const [first, second] = instants
  if (first === undefined) return { ok: false, reason: 'missing' }
  if (second === undefined) return { ok: true, at: instantText(first) }
  const choices = { first: instantText(first), second: instantText(second) }
  return choice ? { ok: true, at: choices[choice] } : { ok: false, reason: 'ambiguous', choices }
}

/**
 * What the wall clock of a zone shows at an instant. Parts of a second are left out.
 *
 * @param at instant, ISO 8601 with zone
 * @param zone IANA name, such as Europe/London
 * @returns day, time and offset on the wall
 * @throws RangeError when the text is not an instant or the zone is unknown
 * @source IANA time zone database, as the running engine carries it
 * @example localParts('2026-07-03T06:02:00Z', 'Europe/London').time // '07:02'
 */
export function localParts(at: string, zone: string): LocalParts {
  const instant = Math.floor(instantMilliseconds(at, 'localParts') / 1000) * 1000
  const offset = offsetMilliseconds(instant, zone)
  const wall = instantText(instant + offset)
  const number = (from: number, to: number) => Number(wall.slice(from, to))
  return {
    dayOn: wall.slice(0, 10),
    time: wall.slice(11, 16),
    year: number(0, 4),
    month: number(5, 7),
    day: number(8, 10),
    hour: number(11, 13),
    minute: number(14, 16),
    second: number(17, 19),
    offsetMinutes: offset / 60_000,
  }
}

/**
 * Whether the running engine knows a zone.
 *
 * @param zone any text
 * @returns true for an IANA name it can compute with
 * @source IANA time zone database, as the running engine carries it
 * @example isZone('Europe/Nowhere') // false
 */
export function isZone(zone: string): boolean {
  try {
    formatterOf(zone)
    return true
  }
  catch {
    return false
  }
}

function wallMilliseconds(localText: string): number {
  const parts = /^(\d{4})-(\d{2})-(\d{2})T([01]\d|2[0-3]):([0-5]\d)(?::([0-5]\d))?$/.exec(localText)
  if (!parts || !dayExists(Number(parts[1]), Number(parts[2]), Number(parts[3]))) {
    refuse('localInstant', 'localText', 'a time of the calendar written YYYY-MM-DDTHH:mm or YYYY-MM-DDTHH:mm:ss', localText)
  }
  return Date.parse(`${localText.slice(0, 16)}:${parts[6] ?? '00'}Z`)
}

function offsetMilliseconds(instant: number, zone: string): number {
  const part: Record<string, string> = {}
  for (const { type, value } of formatterOf(zone).formatToParts(instant)) part[type] = value
  const { year, month, day, hour, minute, second } = part
  return Date.parse(`${year?.padStart(4, '0')}-${month}-${day}T${hour}:${minute}:${second}Z`) - instant
}

/** Building a formatter costs more than a hundred uses of it; the board asks for the same zone all day. */
const formatters = new Map<string, Intl.DateTimeFormat>()

function formatterOf(zone: string): Intl.DateTimeFormat {
  const known = formatters.get(zone)
  if (known) return known
  const made = makeFormatter(zone)
  formatters.set(zone, made)
  return made
}

function makeFormatter(zone: string): Intl.DateTimeFormat {
  try {
    // The language is fixed: its digits and calendar are read back as numbers and never shown.
    return new Intl.DateTimeFormat('en-US-u-ca-gregory-nu-latn', {
      timeZone: zone,
      hourCycle: 'h23',
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
      second: '2-digit',
    })
  }
  catch (cause) {
    throw new RangeError(`localInstant: zone must be a name of the IANA time zone database, got ${zone}`, { cause })
  }
}
