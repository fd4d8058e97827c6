import { instantMilliseconds, isInstant } from '#shared/domain/instant'
import { localParts } from '#shared/domain/local-time'
import type { RibbonInput } from './ribbon'

const MINUTE = 60_000

/**
 * What a ribbon shows, in words: for whoever cannot see it, for the line below it, and for a text report.
 *
 * @param input what is known of the sample, instants as ISO 8601 text with zone
 * @param zone IANA zone in which times are said
 * @returns one sentence without a full stop; never throws
 * @example describeRibbon(input, 'Europe/London') // 'Air drawn 07:02 to 15:31, paused 34 minutes (lunch), minimum volume reached 09:40'
 */
export function describeRibbon(input: RibbonInput, zone: string): string {
  const time = (at: string) => localTime(at, zone)
  return [
    airWords(input, time),
    pauseWords(input),
    isRunning(input) ? 'running' : '',
    countWords(input.checks.length, 'flow check', 'flow checks'),
    checkWords(input),
    input.faults.length > 0 ? `pump fault ${input.faults.map(fault => time(fault.at)).join(', ')}` : '',
    reachedWords(input, input.minimumAt, 'minimum volume', time),
    reachedWords(input, input.maximumAt, 'maximum volume', time),
    isOngoing(input) && input.plannedEndAt ? `planned to ${time(input.plannedEndAt)}` : '',
  ].filter(Boolean).join(', ')
}

function isRunning(input: RibbonInput) {
  return input.spans.some(span => span.toAt === null) && !input.pauses.some(pause => pause.toAt === null)
}

function isOngoing(input: RibbonInput) {
  return input.spans.length === 0 || [...input.spans, ...input.pauses].some(span => span.toAt === null)
}

function airWords(input: RibbonInput, time: (at: string) => string): string {
  const [first] = input.spans
  if (!first) return input.shift ? `No air drawn yet, shift ${time(input.shift.fromAt)} to ${time(input.shift.toAt)}` : 'No air drawn yet'
  const from = input.spans.reduce((earliest, span) => milliseconds(span.fromAt) < milliseconds(earliest) ? span.fromAt : earliest, first.fromAt)
  if (input.spans.some(span => span.toAt === null)) return `Air drawn since ${time(from)}`
  const ends = input.spans.map(span => span.toAt ?? span.fromAt)
  const to = ends.reduce((latest, end) => milliseconds(end) > milliseconds(latest) ? end : latest)
  return `Air drawn ${time(from)} to ${time(to)}`
}

function pauseWords(input: RibbonInput): string {
  const open = input.pauses.find(pause => pause.toAt === null)
  const total = input.pauses.reduce((sum, pause) => sum + Math.max(0, milliseconds(pause.toAt ?? input.nowAt) - milliseconds(pause.fromAt)), 0)
  if (input.pauses.length === 0 || !Number.isFinite(total)) return ''
  const reasons = [...new Set(input.pauses.flatMap(pause => pause.reason ?? []))].join(', ')
  return `${open ? 'paused now, so far' : 'paused'} ${countWords(Math.round(total / MINUTE), 'minute', 'minutes', true)}${reasons ? ` (${reasons})` : ''}`
}

function checkWords(input: RibbonInput): string {
  const beyond = input.checks.filter(check => check.verdict !== 'within').length
  return beyond > 0 ? `${beyond} of them beyond what is allowed` : ''
}

function reachedWords(input: RibbonInput, at: string | null, name: string, time: (at: string) => string): string {
  if (at === null || input.spans.length === 0 || !isInstant(at)) return ''
  if (milliseconds(at) <= milliseconds(input.nowAt)) return `${name} reached ${time(at)}`
  return isOngoing(input) ? `${name} expected ${time(at)}` : ''
}

function countWords(count: number, one: string, many: string, withZero = false): string {
  if (count === 0 && !withZero) return ''
  return `${count} ${count === 1 ? one : many}`
}

function milliseconds(at: string): number {
  return isInstant(at) ? instantMilliseconds(at) : Number.NaN
}

function localTime(at: string, zone: string): string {
  try {
    return localParts(at, zone).time
  }
  catch {
    return 'at an unknown time'
  }
}
