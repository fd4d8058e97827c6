interface OpenSpan { fromAt: string, toAt: string | null }

/** Changing the medium may leave a moment in both sheets; more than this is two at once. House rule. */
export const OVERLAP_TOLERANCE_MINUTES = 1

/**
 * Minutes that two lists of spans have in common.
 *
 * @param now end of an open span, milliseconds since 1970
 */
export function overlapMinutes(first: readonly OpenSpan[], second: readonly OpenSpan[], now: number): number {
  let milliseconds = 0
  for (const a of first) {
    for (const b of second) {
      const from = Math.max(Date.parse(a.fromAt), Date.parse(b.fromAt))
      const to = Math.min(a.toAt === null ? now : Date.parse(a.toAt), b.toAt === null ? now : Date.parse(b.toAt))
      milliseconds += Math.max(0, to - from)
    }
  }
  return milliseconds / 60_000
}
