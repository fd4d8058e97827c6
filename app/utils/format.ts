import { instantMilliseconds } from '#shared/domain/instant'
import { localParts } from '#shared/domain/local-time'
import { fixed, significant } from '#shared/domain/rounding'
import { millilitresPerMinute } from '#shared/domain/units'
import type { FlowUnit } from '#shared/domain/units'

/*
 * Numbers and times for eyes: a value always with its unit, a time always in a zone that the screen names. Nothing here
 * is ever computed with. Months are written out by hand, so that server, browser and phone print the same text.
 */

/** A number as it is shown, and its unit apart, because the unit may stand in a table's head. */
export interface Measure { value: string, unit: string }

/** Nobody draws a line below this; a change of 0.98 % is plainly shown as 1.0 %. */
const SMALLEST_THRESHOLD_PERCENT = 2
const MINUS = '\u2212'
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']
const WEEKDAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat']

/** A flow to four significant figures, in the unit it is spoken of: mL/min when asked for. */
export function formatFlow(litresPerMinute: number, unit: FlowUnit = 'L/min'): Measure {
  const value = unit === 'mL/min' ? millilitresPerMinute(litresPerMinute) : litresPerMinute
  return { value: significant(value, 4), unit }
}

/** A volume: to a tenth of a litre up to 1000 L, whole litres beyond, four significant figures below 10 L. */
export function formatVolume(litres: number): Measure {
  if (litres < 10) return { value: significant(litres, 4), unit: 'L' }
  return { value: fixed(litres, litres < 1000 ? 1 : 0), unit: 'L' }
}

export function formatMinutes(minutes: number, decimals = 0): Measure {
  return { value: signed(fixed(minutes, decimals)), unit: 'min' }
}

/**
 * A percentage, for a change with its sign. One decimal, but two where one would hide that a threshold was crossed:
 * 5.04 % must not be shown as 5.0 % beside "more than 5 %".
 */
export function formatPercent(percent: number, options: { sign?: boolean } = {}): Measure {
  const oneDecimal = fixed(percent, 1)
  const hidesCrossing = Math.abs(percent) >= SMALLEST_THRESHOLD_PERCENT && oneDecimal.endsWith('.0') && Math.abs(Number(oneDecimal) - percent) > 1e-9
  const text = hidesCrossing ? fixed(percent, 2) : oneDecimal
  const plus = options.sign && Number(text) > 0 ? '+' : ''
  return { value: plus + signed(text), unit: '%' }
}

/** A unit as it is printed: `mg/m³`. */
export function formatUnit(unit: string): string {
  return unit.replace(/m3\b/g, 'm³')
}

/** A share from 0 to 1 as whole percent. */
export function formatShare(share: number): Measure {
  return formatPercent(share * 100)
}

/** Any number that a finding or a working names, by its unit. */
export function formatQuantity(value: number | string, unit: string, zone?: string): Measure {
  if (typeof value === 'string') return { value: zone ? withLocalTimes(value, zone) : value, unit }
  switch (unit) {
    case 'L/min':
    case 'mL/min': return { value: significant(value, 4), unit }
    case 'L': return formatVolume(value)
    case 'min': return { value: signed(trimmed(fixed(value, 1))), unit }
    case '%': return formatPercent(value)
    default: return { value: signed(Number.isInteger(value) ? String(value) : significant(value, 4)), unit }
  }
}

/** Value and unit in one text: `2.03 L/min`; a dash word for what is not known. */
export function inWords(measure: Measure | null, unknown = 'not known yet'): string {
  return measure === null ? unknown : `${measure.value}${measure.unit ? ` ${measure.unit}` : ''}`
}

/** Minutes as people say them: `7 h 55 min`, `12 min`, `under 1 min`. */
export function formatDuration(minutes: number): string {
  const size = Math.abs(minutes)
  if (size > 0 && size < 1) return 'under 1 min'
  const whole = Math.floor(size)
  const sign = minutes < 0 ? MINUS : ''
  if (whole < 60) return `${sign}${whole} min`
  const days = Math.floor(whole / 1440)
  const hours = Math.floor((whole % 1440) / 60)
  const rest = whole % 60
  const parts = days > 0 ? [`${days} d`, hours > 0 ? `${hours} h` : ''] : [`${hours} h`, rest > 0 ? `${rest} min` : '']
  return sign + parts.filter(Boolean).join(' ')
}

/** How long ago an instant was: `12 min ago`, `3 h ago`, `2 days ago`; `in 5 min` for what is still to come. */
export function formatAgo(at: string, nowMs: number): string {
  const minutes = (nowMs - instantMilliseconds(at)) / 60_000
  if (Math.abs(minutes) < 1) return 'just now'
  return minutes < 0 ? `in ${roughly(-minutes)}` : `${roughly(minutes)} ago`
}

/** How long something has waited, without "ago": `3 h`, `2 days`. */
export function formatWait(at: string, nowMs: number): string {
  const minutes = Math.max(0, (nowMs - instantMilliseconds(at)) / 60_000)
  return minutes < 1 ? 'under 1 min' : roughly(minutes)
}

/** Time on the wall of the place: `07:02`, with seconds where they matter. */
export function formatTime(at: string, zone: string, options: { seconds?: boolean } = {}): string {
  const parts = localParts(at, zone)
  return options.seconds ? `${parts.time}:${String(parts.second).padStart(2, '0')}` : parts.time
}

/** A day of the calendar: `3 Mar 2026`. */
export function formatDay(on: string): string {
  const [year, month, day] = on.split('-').map(Number)
  return `${day} ${MONTHS[(month ?? 1) - 1]} ${year}`
}

/** A day with its weekday: `Tue 3 Mar 2026`. */
export function formatWeekday(on: string): string {
  return `${WEEKDAYS[new Date(`${on}T00:00:00Z`).getUTCDay()]} ${formatDay(on)}`
}

/** From one day to another, saying nothing twice: `3 to 5 Mar 2026`. */
export function formatDays(startsOn: string, endsOn: string): string {
  if (startsOn === endsOn) return formatDay(startsOn)
  const [start, end] = [formatDay(startsOn), formatDay(endsOn)]
  if (startsOn.slice(0, 7) === endsOn.slice(0, 7)) return `${start.split(' ')[0]} to ${end}`
  if (startsOn.slice(0, 4) === endsOn.slice(0, 4)) return `${start.split(' ').slice(0, 2).join(' ')} to ${end}`
  return `${start} to ${end}`
}

/** Day and time on the wall of the place: `3 Mar 2026, 07:02`. */
export function formatInstant(at: string, zone: string, options: { seconds?: boolean } = {}): string {
  return `${formatDay(localParts(at, zone).dayOn)}, ${formatTime(at, zone, options)}`
}

/** The zone's name and what it was ahead of UTC at that instant: `Europe/Dublin, UTC+1`. */
export function formatZone(zone: string, at: string): string {
  const minutes = localParts(at, zone).offsetMinutes
  if (minutes === 0) return zone === 'UTC' ? 'UTC' : `${zone}, UTC`
  const hours = Math.floor(Math.abs(minutes) / 60)
  const rest = Math.abs(minutes) % 60
  return `${zone}, UTC${minutes < 0 ? MINUS : '+'}${hours}${rest ? `:${String(rest).padStart(2, '0')}` : ''}`
}

/** A phone's clock against the server's: `47 s behind`, `2 min ahead`. @param milliseconds server minus phone */
export function formatClockOff(milliseconds: number): string {
  const seconds = Math.round(Math.abs(milliseconds) / 1000)
  if (seconds === 0) return 'right'
  const size = seconds < 120 ? `${seconds} s` : formatDuration(seconds / 60)
  return `${size} ${milliseconds > 0 ? 'behind' : 'ahead'}`
}

/** A count with its noun: `1 sheet`, `3 sheets`. */
export function formatCount(count: number, noun: string, plural = `${noun}s`): string {
  return `${count} ${count === 1 ? noun : plural}`
}

/** Instants inside a sentence, such as a working's `from`, in the zone of the place. */
export function withLocalTimes(text: string, zone: string): string {
  return text.replace(/\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(?:\.\d+)?Z/g, at => formatInstant(at, zone, { seconds: true }))
}

function roughly(minutes: number): string {
  if (minutes < 60) return `${Math.floor(minutes)} min`
  if (minutes < 48 * 60) return `${Math.floor(minutes / 60)} h`
  return `${Math.floor(minutes / 1440)} days`
}

function signed(text: string): string {
  return text.replace('-', MINUS)
}

function trimmed(text: string): string {
  return text.replace(/\.0+$/, '')
}
