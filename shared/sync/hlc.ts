/**
 * Hybrid logical clock: 48 bits of wall milliseconds and a 16-bit counter, written as 16 lower-case hex digits, so that
 * text order is time order. Ties between phones are broken by the phone's name, then by the operation's id.
 *
 * @source Kulkarni, Demirbas, Madappa, Avva, Leone: "Logical Physical Clocks", 2014
 */
export const HLC_PATTERN = /^[0-9a-f]{16}$/
export const HLC_ZERO = '0000000000000000'

/** How far ahead of the server a stamp may run before it is clamped, ms. */
export const MAX_AHEAD_MILLISECONDS = 120_000

export function formatHlc(wallMilliseconds: number, counter: number): string {
  if (!Number.isInteger(wallMilliseconds) || wallMilliseconds < 0 || wallMilliseconds >= 2 ** 48) {
    throw new RangeError(`formatHlc: wallMilliseconds must be a whole number from 0 below 2^48, got ${wallMilliseconds}`)
  }
  return wallMilliseconds.toString(16).padStart(12, '0') + counter.toString(16).padStart(4, '0')
}

export function parseHlc(stamp: string): { wallMilliseconds: number, counter: number } {
  if (!HLC_PATTERN.test(stamp)) throw new RangeError(`parseHlc: not a stamp: ${stamp}`)
  return { wallMilliseconds: Number.parseInt(stamp.slice(0, 12), 16), counter: Number.parseInt(stamp.slice(12), 16) }
}

/** The next stamp after `last` at this wall time: never goes back, whatever the wall clock does. */
export function tick(last: string, wallMilliseconds: number): string {
  const previous = parseHlc(last)
  if (wallMilliseconds > previous.wallMilliseconds) return formatHlc(wallMilliseconds, 0)
  return previous.counter < 0xFFFF
    ? formatHlc(previous.wallMilliseconds, previous.counter + 1)
    : formatHlc(previous.wallMilliseconds + 1, 0)
}

/** Takes note of a stamp that was seen: the later of the two. `seen` must be an effective stamp, else one bad clock spreads. */
export function witness(last: string, seen: string): string {
  return seen > last ? seen : last
}

/**
 * The stamp that counts, fixed for ever at first receipt: not further ahead of the server than two minutes, and never
 * below the same phone's previous one.
 */
export function effectiveStamp(claimed: string, serverMilliseconds: number, previousOfDevice: string): string {
  const ceiling = formatHlc(serverMilliseconds + MAX_AHEAD_MILLISECONDS, 0)
  const clamped = claimed < ceiling ? claimed : ceiling
  return clamped > previousOfDevice ? clamped : tick(previousOfDevice, 0)
}
