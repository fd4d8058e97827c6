import { requireAtLeast, requireFinite } from './check'

/**
 * Widest error that arithmetic on doubles leaves in a percentage, generously. Readings carry at most six digits, so two
 * readings that truly differ from a threshold do so by more than a ten-thousandth of a percent: nothing real hides in here.
 */
const ARITHMETIC_SLACK_PERCENT = 1e-9

/**
 * Whether a percentage lies beyond a threshold, on either side. Exactly on the threshold is within.
 *
 * The trap: 2.0 L/min before and 1.9 L/min after is a change of exactly -5 %, but in doubles
 * (1.9 - 2.0) / 2.0 * 100 is -5.000000000000004. A plain comparison would fail a good sample.
 *
 * @param value percentage, any sign
 * @param thresholdPercent threshold, %, 0 or more
 * @returns true when the size of the value is above the threshold by more than arithmetic can explain
 * @throws RangeError when the value is not finite or the threshold is negative
 * @source NIOSH NMAM, chapter D, section 7e ("plus/minus 5 %", read as inclusive)
 * @example isBeyondPercent((1.9 - 2.0) / 2.0 * 100, 5) // false
 */
export function isBeyondPercent(value: number, thresholdPercent: number): boolean {
  requireFinite('isBeyondPercent', 'value', value)
  requireAtLeast('isBeyondPercent', 'thresholdPercent', thresholdPercent, 0)
  return Math.abs(value) - thresholdPercent > ARITHMETIC_SLACK_PERCENT * Math.max(1, thresholdPercent)
}

/**
 * Whether a percentage lies below a least share, with the same care. Exactly on the threshold is not below.
 *
 * @param value percentage, any sign
 * @param thresholdPercent least share wanted, %, 0 or more
 * @returns true when the value is below the threshold by more than arithmetic can explain
 * @throws RangeError when the value is not finite or the threshold is negative
 * @source same reading of a threshold as `isBeyondPercent`
 * @example isBelowPercent(420 / 480 * 100, 87.5) // false
 */
export function isBelowPercent(value: number, thresholdPercent: number): boolean {
  requireFinite('isBelowPercent', 'value', value)
  requireAtLeast('isBelowPercent', 'thresholdPercent', thresholdPercent, 0)
  return thresholdPercent - value > ARITHMETIC_SLACK_PERCENT * Math.max(1, thresholdPercent)
}
