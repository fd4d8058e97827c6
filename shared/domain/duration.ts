import { refuse } from './check'
import { instantMilliseconds, instantText } from './instant'

const MILLISECONDS_IN_MINUTE = 60_000

export interface Pause {
  fromAt: string
  /** absent or null while the pause still lasts: it then reaches to the stop */
  toAt?: string | null
}

export interface Run {
  startedAt: string
  /** for a sample that is still running, the instant up to which it is looked at */
  stoppedAt: string
  pauses: readonly Pause[]
}

export interface Span {
  fromAt: string
  toAt: string
}

/** A span in milliseconds since 1970. */
export interface MillisecondSpan {
  from: number
  to: number
}

/**
 * Minutes in which air was drawn: from start to stop with the pauses taken off.
 *
 * Counted on instants, so midnight and the change to or from summer time do not matter: from 00:30 to 08:30 on the night the
 * clocks go forward are 420 minutes. Pauses are cut to the run, and minutes that lie in two pauses are taken off once.
 *
 * @param run start, stop and pauses as instants, ISO 8601 with zone; the stop not before the start, no pause ending before it begins
 * @returns minutes, 0 or more, exact and not rounded
 * @throws RangeError when a text is not an instant, or an end lies before its beginning
 * @source common practice (the pump's running time); elapsed time on UTC instants
 * @example sampledMinutes({ startedAt: '2026-07-03T07:02:00Z', stoppedAt: '2026-07-03T15:31:00Z',
 *   pauses: [{ fromAt: '2026-07-03T11:30:00Z', toAt: '2026-07-03T12:04:00Z' }] }) // 475
 */
export function sampledMinutes(run: Run): number {
  return totalMilliseconds(drawnSpans('sampledMinutes', run)) / MILLISECONDS_IN_MINUTE
}

/**
 * The spans in which air was drawn, in order of time and not touching each other.
 *
 * @param run start, stop and pauses, as for `sampledMinutes`
 * @returns spans with both ends as UTC instants; empty when no air was drawn
 * @throws RangeError when a text is not an instant, or an end lies before its beginning
 * @source as `sampledMinutes`
 * @example runSpans({ startedAt: '2026-07-03T07:00:00Z', stoppedAt: '2026-07-03T09:00:00Z',
 *   pauses: [{ fromAt: '2026-07-03T08:00:00Z' }] }) // [{ fromAt: '2026-07-03T07:00:00.000Z', toAt: '2026-07-03T08:00:00.000Z' }]
 */
export function runSpans(run: Run): Span[] {
  return drawnSpans('runSpans', run).map(span => ({ fromAt: instantText(span.from), toAt: instantText(span.to) }))
}

/**
 * Minutes from one instant to another.
 *
 * @param fromAt instant, ISO 8601 with zone
 * @param toAt instant, ISO 8601 with zone
 * @returns minutes, negative when the second lies before the first, not rounded
 * @throws RangeError when a text is not an instant
 * @source elapsed time on UTC instants
 * @example minutesBetween('2026-07-03T23:50:00Z', '2026-07-04T00:05:30Z') // 15.5
 */
export function minutesBetween(fromAt: string, toAt: string): number {
  const from = instantMilliseconds(fromAt, 'minutesBetween')
  return (instantMilliseconds(toAt, 'minutesBetween') - from) / MILLISECONDS_IN_MINUTE
}

/**
 * Minutes that lie in at least one of several spans.
 *
 * @param spans spans as instants, in any order, overlapping or not; no end before its beginning
 * @returns minutes, each counted once
 * @throws RangeError when a text is not an instant, or an end lies before its beginning
 * @source as `sampledMinutes`
 * @example unionMinutes([{ fromAt: '2026-07-03T07:00:00Z', toAt: '2026-07-03T08:00:00Z' },
 *   { fromAt: '2026-07-03T07:30:00Z', toAt: '2026-07-03T08:30:00Z' }]) // 90
 */
export function unionMinutes(spans: readonly Span[]): number {
  const read = spans.map(span => readSpan('unionMinutes', 'span', span.fromAt, span.toAt))
  return totalMilliseconds(merged(read)) / MILLISECONDS_IN_MINUTE
}

function drawnSpans(where: string, run: Run): MillisecondSpan[] {
  const { from: start, to: stop } = readSpan(where, 'stoppedAt', run.startedAt, run.stoppedAt)
  const pauses = merged(run.pauses.map(pause => readPause(where, pause, stop)))
  const drawn: MillisecondSpan[] = []
  let from = start
  for (const pause of pauses) {
    const takesNothingOff = pause.to === pause.from || pause.to <= start || pause.from >= stop
    if (takesNothingOff) continue
    if (pause.from > from) drawn.push({ from, to: pause.from })
    from = Math.min(pause.to, stop)
  }
  if (stop > from) drawn.push({ from, to: stop })
  return drawn
}

function readPause(where: string, pause: Pause, stop: number): MillisecondSpan {
  if (pause.toAt != null) return readSpan(where, 'the end of a pause', pause.fromAt, pause.toAt)
  const from = instantMilliseconds(pause.fromAt, where)
  return { from, to: Math.max(from, stop) }
}

function readSpan(where: string, name: string, fromAt: string, toAt: string): MillisecondSpan {
  const from = instantMilliseconds(fromAt, where)
  const to = instantMilliseconds(toAt, where)
  if (to < from) refuse(where, name, `at or after ${fromAt}`, toAt)
  return { from, to }
}

function merged(spans: readonly MillisecondSpan[]): MillisecondSpan[] {
  const result: MillisecondSpan[] = []
  for (const span of [...spans].sort((a, b) => a.from - b.from)) {
    const last = result.at(-1)
    if (last && span.from <= last.to) last.to = Math.max(last.to, span.to)
    else result.push({ ...span })
  }
  return result
}

function totalMilliseconds(spans: readonly MillisecondSpan[]): number {
  return spans.reduce((sum, span) => sum + (span.to - span.from), 0)
}
