import { refuse } from './check'
import { dayExists } from './day'

const INSTANT = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})(?::(\d{2})(\.\d+)?)?(?:Z|[+-]([01]\d|2[0-3]):([0-5]\d))$/

/** Furthest instant a computer date reaches, ms from 1970. @source ECMAScript, Time Values and Time Range */
const FURTHEST_MILLISECONDS = 8.64e15

/**
 * Milliseconds since 1970 of an instant written as ISO text. Everything about time is computed on these.
 *
 * The zone must stand in the text: `2026-03-08T08:30` means different instants on two phones and is refused.
 *
 * @param at instant, ISO 8601 with `Z` or an offset
 * @param where function that asks, for the message
 * @returns milliseconds since 1970-01-01T00:00:00Z
 * @throws RangeError when the text is not an instant
 * @source ISO 8601-1:2019; RFC 3339
 * @example instantMilliseconds('1970-01-01T01:00:00+01:00') // 0
 */
export function instantMilliseconds(at: string, where = 'instantMilliseconds'): number {
  const milliseconds = readMilliseconds(at)
  return milliseconds ?? refuse(where, 'an instant', 'ISO 8601 text with a zone, such as 2026-07-03T05:02:00Z', at)
}

/**
 * Whether a text is an instant with its zone.
 *
 * @param text any text
 * @returns true for an instant that exists
 * @source ISO 8601-1:2019; RFC 3339
 * @example isInstant('2026-02-30T10:00:00Z') // false
 */
export function isInstant(text: string): boolean {
  return readMilliseconds(text) !== null
}

/**
 * An instant as ISO text in UTC with milliseconds, the one form in which instants are kept.
 *
 * @param milliseconds milliseconds since 1970, finite and within the range of a date
 * @returns ISO 8601 text ending in `Z`
 * @throws RangeError when there is no such instant
 * @source ISO 8601-1:2019
 * @example instantText(0) // '1970-01-01T00:00:00.000Z'
 */
export function instantText(milliseconds: number): string {
  if (!isReachable(milliseconds)) refuse('instantText', 'milliseconds', `within ${FURTHEST_MILLISECONDS} of 1970`, milliseconds)
  return new Date(milliseconds).toISOString()
}

/**
 * Whether an instant lies in the range that a date can hold.
 *
 * @param milliseconds milliseconds since 1970, any number
 * @returns false for NaN, infinities and what lies hundreds of thousands of years away
 * @source ECMAScript, Time Values and Time Range
 * @example isReachable(Infinity) // false
 */
export function isReachable(milliseconds: number): boolean {
  return Math.abs(milliseconds) <= FURTHEST_MILLISECONDS
}

function readMilliseconds(text: string): number | null {
  const parts = INSTANT.exec(text)
  if (!parts) return null
  const [, year, month, day, hour, minute, second = '0'] = parts
  // Checked by hand: an engine may roll 30 February into March instead of refusing it.
  if (!dayExists(Number(year), Number(month), Number(day))) return null
  if (Number(hour) > 23 || Number(minute) > 59 || Number(second) > 59) return null
  const milliseconds = Date.parse(text)
  return Number.isNaN(milliseconds) ? null : milliseconds
}
