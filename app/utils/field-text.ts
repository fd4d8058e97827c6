import { unionMinutes } from '#shared/domain/duration'
import { instantMilliseconds } from '#shared/domain/instant'
import { localParts } from '#shared/domain/local-time'
import type { NumberTextReason } from '#shared/domain/number-text'
import type { IndicatorAccuracy } from '#shared/domain/indicator-accuracy'
import type { Calibrator } from '#shared/records/calibrator'
import type { Method } from '#shared/records/method'
import type { Pump } from '#shared/records/pump'
import { formatDay, formatFlow, formatTime } from './format'

// What only the field says about a sheet. Numbers and days in general are in `format.ts`.

/** A flow without the zeros that nobody read: `2.05`, not `2.050`. */
export function flowNumber(litresPerMinute: number, unit: 'L/min' | 'mL/min' = 'L/min'): string {
  const { value } = formatFlow(litresPerMinute, unit)
  return value.includes('.') ? value.replace(/\.?0+$/, '') : value
}

/** Minutes of some spans up to now, the open one still growing. */
export function minutesOfSpans(spans: readonly { fromAt: string, toAt: string | null }[], nowAt: string): number {
  return unionMinutes(spans.map(({ fromAt, toAt }) => ({ fromAt, toAt: toAt ?? laterOf(fromAt, nowAt) })))
}

/** The phone's clock may have been set back since: a span never runs backwards. */
function laterOf(fromAt: string, nowAt: string): string {
  return instantMilliseconds(nowAt) > instantMilliseconds(fromAt) ? nowAt : fromAt
}

/** Minutes from now to an instant, negative when it is over. */
export function minutesUntil(at: string, nowAt: string): number {
  return (instantMilliseconds(at) - instantMilliseconds(nowAt)) / 60_000
}

/** A running clock of hours, minutes and seconds: `3:07:42`. */
export function clockText(minutes: number): string {
  const seconds = Math.floor(minutes * 60 + 1e-6)
  const two = (value: number) => String(value).padStart(2, '0')
  return `${Math.floor(seconds / 3600)}:${two(Math.floor(seconds / 60) % 60)}:${two(seconds % 60)}`
}

/** Time on the wall, with the day where that is another one than today's: `2 Mar 2026, 07:02`. */
export function dayTimeText(at: string, zone: string, nowAt: string): string {
  const dayOn = localParts(at, zone).dayOn
  return dayOn === localParts(nowAt, zone).dayOn ? formatTime(at, zone) : `${formatDay(dayOn)}, ${formatTime(at, zone)}`
}

export function pumpText(pump: Pick<Pump, 'make' | 'serial'> | null | undefined): string {
  return pump ? `${pump.make} ${pump.serial}`.trim() : 'a pump not on this phone'
}

export function calibratorText(calibrator: Pick<Calibrator, 'make' | 'serial'> | null | undefined): string {
  return calibrator ? `${calibrator.make} ${calibrator.serial}`.trim() : 'a calibrator not on this phone'
}

/** Accuracy of an indicator as its maker states it. */
export function accuracyText(accuracy: IndicatorAccuracy): string {
  if (accuracy.kind === 'percent-of-full-scale') {
    return `±${accuracy.percent} % of full scale, ${flowNumber(accuracy.fullScaleLitresPerMinute)} L/min`
  }
  return accuracy.ranges
    .map(range => `±${range.percent} % of reading, ${boundsText(range.fromLitresPerMinute, range.toLitresPerMinute, 'L/min')}`)
    .join('; ')
}

/** Bounds that may be missing on either side: `1 to 3 L/min`, `at least 12 L`, or null when nothing is stored. */
export function boundsText(minimum: number | null, maximum: number | null, unit: string): string | null {
  if (minimum !== null && maximum !== null) return minimum === maximum ? `${minimum} ${unit}` : `${minimum} to ${maximum} ${unit}`
  if (minimum !== null) return `at least ${minimum} ${unit}`
  return maximum === null ? null : `at most ${maximum} ${unit}`
}

export function methodFlowText(method: Method): string | null {
  return boundsText(method.flowMinimumLitresPerMinute, method.flowMaximumLitresPerMinute, 'L/min')
}

export function methodVolumeText(method: Method): string | null {
  return boundsText(method.volumeMinimumLitres, method.volumeMaximumLitres, 'L')
}

/** Why a typed number could not be read, in words. Nothing typed yet is no complaint. */
export const NUMBER_COMPLAINTS: Readonly<Record<NumberTextReason, string>> = {
  'empty': '',
  'not-a-number': 'This is not a number. Use digits and one comma or point.',
  'two-separators': 'There are two separators. Use one comma or point.',
  'grouped': 'Leave out the separators between thousands, so that nothing has to be guessed.',
}

/** The zone of this phone, for what belongs to no survey. */
export function phoneZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC'
}

/** The sign between whole and fraction on this phone's own keyboard. */
export function decimalSign(language: string): ',' | '.' {
  const part = new Intl.NumberFormat(language).formatToParts(1.5).find(one => one.type === 'decimal')
  return part?.value === ',' ? ',' : '.'
}
