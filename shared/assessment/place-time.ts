import { instantText } from '#shared/domain/instant'
import { localParts, type LocalParts } from '#shared/domain/local-time'

/**
 * Day and clock time on the wall of the place. Findings ask for the same few instants each time a sheet is looked at, and the
 * engine's calendar is the slowest thing they touch: what it said is kept, by zone and minute.
 */
const known = new Map<string, LocalParts>()
const MOST_KEPT = 4000

/** @param at milliseconds since 1970 */
export function dayAt(at: number, zone: string): string {
  return partsAt(at, zone).dayOn
}

/** @param at milliseconds since 1970 */
export function timeAt(at: number, zone: string): string {
  return partsAt(at, zone).time
}

function partsAt(at: number, zone: string): LocalParts {
  const minute = Math.floor(at / 60_000)
  const key = `${zone} ${minute}`
  const kept = known.get(key)
  if (kept) return kept
  const parts = localParts(instantText(minute * 60_000), zone)
  if (known.size >= MOST_KEPT) known.clear()
  known.set(key, parts)
  return parts
}
