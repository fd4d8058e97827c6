import { refuse, requireAbove, requireAtLeast } from './check'
import { minutesBetween, unionMinutes, type Span } from './duration'
import { instantMilliseconds } from './instant'

export interface ShiftCoverage {
  shiftMinutes: number
  /** minutes of the shift in which air was drawn */
  coveredMinutes: number
  /** minutes of the shift without air */
  uncoveredMinutes: number
  /** covered share of the shift, % */
  percent: number
}

/**
 * Share of a shift that was sampled. Several samples one after the other count together; minutes that lie in two of them
 * count once, and minutes outside the shift do not count.
 *
 * @param shift begin and end of the shift as instants, the end after the begin
 * @param spans spans in which air was drawn, from `runSpans`, of one sample or of several
 * @returns minutes and percent, not rounded
 * @throws RangeError when a text is not an instant or an end lies before its beginning
 * @source common practice: at least 7 of 8 hours for a full-period sample (U.S. industrial hygiene manual, 1977)
 * @example shiftCoverage({ fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T14:00:00Z' },
 *   [{ fromAt: '2026-07-03T07:00:00Z', toAt: '2026-07-03T14:00:00Z' }]).percent // 87.5
 */
export function shiftCoverage(shift: Span, spans: readonly Span[]): ShiftCoverage {
  const shiftMinutes = minutesBetween(shift.fromAt, shift.toAt)
  if (shiftMinutes <= 0) refuse('shiftCoverage', 'end of the shift', `after ${shift.fromAt}`, shift.toAt)
  const coveredMinutes = unionMinutes(spans.flatMap(span => clipped(span, shift)))
  return {
    shiftMinutes,
    coveredMinutes,
    uncoveredMinutes: shiftMinutes - coveredMinutes,
    percent: coveredPercent(coveredMinutes, shiftMinutes),
  }
}

/**
 * Sampled minutes in percent of a shift's minutes.
 *
 * @param coveredMinutes minutes sampled, 0 or more
 * @param shiftMinutes length of the shift, min, above 0
 * @returns share, %, above 100 when more was sampled than the shift lasts
 * @throws RangeError when a value is outside its range
 * @source common practice: 7 of 8 hours is 87.5 %
 * @example coveredPercent(420, 480) // 87.5
 */
export function coveredPercent(coveredMinutes: number, shiftMinutes: number): number {
  requireAtLeast('coveredPercent', 'coveredMinutes', coveredMinutes, 0)
  requireAbove('coveredPercent', 'shiftMinutes', shiftMinutes, 0)
  return coveredMinutes / shiftMinutes * 100
}

function clipped(span: Span, shift: Span): Span[] {
  if (minutesBetween(span.fromAt, span.toAt) < 0) refuse('shiftCoverage', 'end of a span', `at or after ${span.fromAt}`, span.toAt)
  const fromAt = later(span.fromAt, shift.fromAt)
  const toAt = earlier(span.toAt, shift.toAt)
  return minutesBetween(fromAt, toAt) > 0 ? [{ fromAt, toAt }] : []
}

function later(a: string, b: string): string {
  return instantMilliseconds(a) >= instantMilliseconds(b) ? a : b
}

function earlier(a: string, b: string): string {
  return instantMilliseconds(a) <= instantMilliseconds(b) ? a : b
}
