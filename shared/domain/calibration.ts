import { refuse, requireAbove, requireAtLeast, requireSome } from './check'
import { isDay } from './day'

/**
 * Mean of the flow readings of one calibration.
 *
 * A reading of 0 is allowed: a pump that has died reads 0 afterwards, and that reading is part of the record.
 *
 * @param readings flows, L/min, at least one, each 0 or more
 * @returns mean flow, L/min
 * @throws RangeError when there is no reading or one is negative or not finite
 * @source NIOSH NMAM, chapter D (repeat the measurement at least twice more and average); three readings: common practice
 * @example meanFlow([2.01, 2.0, 1.99]) // 2
 */
export function meanFlow(readings: readonly number[]): number {
  checkReadings('meanFlow', readings)
  // Around the first reading, so that equal readings give exactly their own value back.
  const first = readings[0] ?? 0
  return first + readings.reduce((sum, reading) => sum + (reading - first), 0) / readings.length
}

/**
 * How far each reading lies from the mean, in percent of the mean, with its sign.
 *
 * @param readings flows, L/min, at least one, each 0 or more
 * @returns deviations, %, in the order of the readings; all 0 when every reading is 0
 * @throws RangeError when there is no reading or one is negative or not finite
 * @source common practice (each reading is compared with the mean)
 * @example deviationsPercent([1.9, 2.0, 2.1]) // [-5, 0, 5]
 */
export function deviationsPercent(readings: readonly number[]): number[] {
  const mean = meanFlow(readings)
  return readings.map(reading => mean === 0 ? 0 : (reading - mean) / mean * 100)
}

/**
 * Spread of the readings: the largest deviation of one reading from the mean, in percent of the mean, without sign.
 *
 * @param readings flows, L/min, at least one, each 0 or more
 * @returns largest deviation, %, 0 or more
 * @throws RangeError when there is no reading or one is negative or not finite
 * @source common practice (readings within 5 % of the mean)
 * @example spreadPercent([1.9, 2.0, 2.1]) // 5
 */
export function spreadPercent(readings: readonly number[]): number {
  return deviationsPercent(readings).reduce((largest, deviation) => Math.max(largest, Math.abs(deviation)), 0)
}

/**
 * Flow from a bubble that travels through a known volume, timed several times.
 *
 * The times are averaged and then divided into the volume. The average of the single flows would come out slightly higher.
 *
 * @param volumeMillilitres volume between the two marks, mL, above 0
 * @param seconds times, s, at least one (three is good practice), each above 0
 * @returns flow, L/min
 * @throws RangeError when the volume or a time is not above 0, or there is no time
 * @source NIOSH NMAM, 4th edition, chapter D, section 7a(5): volume divided by the average of at least three times
 * @example flowFromBuret(500, [14.9, 15.1, 15.0]) // 2
 */
export function flowFromBuret(volumeMillilitres: number, seconds: readonly number[]): number {
  requireAbove('flowFromBuret', 'volumeMillilitres', volumeMillilitres, 0)
  requireSome('flowFromBuret', 'seconds', seconds)
  seconds.forEach((time, place) => requireAbove('flowFromBuret', `seconds[${place}]`, time, 0))
  const meanSeconds = seconds.reduce((sum, time) => sum + time, 0) / seconds.length
  return volumeMillilitres * 60 / (meanSeconds * 1000)
}

/**
 * Whether a calibrator's certificate still holds. The due day itself still counts as in date.
 *
 * @param dueOn day the certificate runs out, YYYY-MM-DD
 * @param onDay day of the reading where it was taken, YYYY-MM-DD
 * @returns true when the reading was taken on the due day or before
 * @throws RangeError when either is not a day of the calendar
 * @source common practice (a due date is the last day of use)
 * @example isCalibratorInDate('2026-07-03', '2026-07-03') // true
 */
export function isCalibratorInDate(dueOn: string, onDay: string): boolean {
  if (!isDay(dueOn)) refuse('isCalibratorInDate', 'dueOn', 'a day written YYYY-MM-DD', dueOn)
  if (!isDay(onDay)) refuse('isCalibratorInDate', 'onDay', 'a day written YYYY-MM-DD', onDay)
  return onDay <= dueOn
}

function checkReadings(where: string, readings: readonly number[]): void {
  requireSome(where, 'readings', readings)
  readings.forEach((reading, place) => requireAtLeast(where, `readings[${place}]`, reading, 0))
}
