import { refuse, requireAbove, requireBetween, requireWhole } from './check'
import { minutesToVolume } from './projection'

export interface QuantifiableInput {
  /** limit of quantification per sample, µg, above 0 */
  loqMicrograms: number
  /** limit value, mg/m3, above 0 */
  limitMilligramsPerCubicMetre: number
  /** part of the limit that must still be quantified, above 0, at most 2; EN 482 asks for 0.1 */
  fraction: number
}

export interface LoadInput {
  /** most that the filter may carry, mg, above 0 */
  maximumLoadMilligrams: number
  /** expected concentration, mg/m3, above 0 */
  concentrationMilligramsPerCubicMetre: number
}

export interface BlanksRule {
  /** least number of field blanks in a set, 0 or more */
  minimum: number
  /** share of the samples, %, 0 to 100 */
  percent: number
  /** most that are asked for in a set; absent or null for no such bound */
  maximum?: number | null
}

/** @source house rule built from two statements of NIOSH NMAM: 2 to 10 field blanks per set (0600, 7300), 10 % (1501) */
export const COMMON_BLANKS_RULE: BlanksRule = { minimum: 2, percent: 10, maximum: 10 }

/**
 * Least volume with which a fraction of the limit still gives a quantifiable mass. 1 µg/L is 1 mg/m3.
 *
 * @param input LOQ in µg, limit in mg/m3, fraction; see the fields
 * @returns volume, L
 * @throws RangeError when a value is outside its range
 * @source V = LOQ / (fraction × limit)
 * @example litresToQuantify({ loqMicrograms: 5, limitMilligramsPerCubicMetre: 0.05, fraction: 0.1 }) // 1000
 */
export function litresToQuantify(input: QuantifiableInput): number {
  requireAbove('litresToQuantify', 'loqMicrograms', input.loqMicrograms, 0)
  requireAbove('litresToQuantify', 'limitMilligramsPerCubicMetre', input.limitMilligramsPerCubicMetre, 0)
  requireAbove('litresToQuantify', 'fraction', input.fraction, 0)
  requireBetween('litresToQuantify', 'fraction', input.fraction, 0, 2)
  return input.loqMicrograms / (input.fraction * input.limitMilligramsPerCubicMetre)
}

/**
 * Least sampling time with which a fraction of the limit still gives a quantifiable mass.
 *
 * @param input LOQ in µg, limit in mg/m3, fraction, and the planned flow in L/min, above 0
 * @returns minutes, not rounded
 * @throws RangeError when a value is outside its range
 * @source t = LOQ / (fraction × limit × Q)
 * @example minimumMinutesToQuantify({ loqMicrograms: 5, limitMilligramsPerCubicMetre: 0.05, fraction: 0.1,
 *   flowLitresPerMinute: 2.5 }) // 400
 */
export function minimumMinutesToQuantify(input: QuantifiableInput & { flowLitresPerMinute: number }): number {
  return minutesToVolume(litresToQuantify(input), input.flowLitresPerMinute)
}

/**
 * Longest sampling time within the largest volume of the method.
 *
 * @param maximumLitres largest volume of the method, L, above 0
 * @param flowLitresPerMinute planned flow, L/min, above 0
 * @returns minutes, not rounded
 * @throws RangeError when a value is outside its range
 * @source t = VOL-MAX / Q
 * @example maximumMinutesForVolume(8, 0.05) // 160
 */
export function maximumMinutesForVolume(maximumLitres: number, flowLitresPerMinute: number): number {
  requireAbove('maximumMinutesForVolume', 'maximumLitres', maximumLitres, 0)
  return minutesToVolume(maximumLitres, flowLitresPerMinute)
}

/**
 * Volume at which a filter carries its largest load.
 *
 * @param input load in mg, expected concentration in mg/m3; see the fields
 * @returns volume, L
 * @throws RangeError when a value is outside its range
 * @source NIOSH NMAM, method 0600: not more than 2 mg of dust on the filter
 * @example litresToLoad({ maximumLoadMilligrams: 2, concentrationMilligramsPerCubicMetre: 5 }) // 400
 */
export function litresToLoad(input: LoadInput): number {
  requireAbove('litresToLoad', 'maximumLoadMilligrams', input.maximumLoadMilligrams, 0)
  requireAbove('litresToLoad', 'concentrationMilligramsPerCubicMetre', input.concentrationMilligramsPerCubicMetre, 0)
  return input.maximumLoadMilligrams * 1000 / input.concentrationMilligramsPerCubicMetre
}

/**
 * Longest sampling time before a filter carries its largest load.
 *
 * @param input load in mg, expected concentration in mg/m3, and the planned flow in L/min, above 0
 * @returns minutes, not rounded
 * @throws RangeError when a value is outside its range
 * @source t = load / (C × Q); NIOSH NMAM, method 0600
 * @example maximumMinutesForLoad({ maximumLoadMilligrams: 2, concentrationMilligramsPerCubicMetre: 5,
 *   flowLitresPerMinute: 2.2 }) // 181.82
 */
export function maximumMinutesForLoad(input: LoadInput & { flowLitresPerMinute: number }): number {
  return minutesToVolume(litresToLoad(input), input.flowLitresPerMinute)
}

/**
 * Field blanks that a set of samples needs: a share of the samples, rounded up, but not fewer than the minimum and not more
 * than the maximum. A set without samples needs none.
 *
 * @param samples number of samples in the set, whole, 0 or more
 * @param rule the method's or the organisation's rule
 * @returns number of field blanks
 * @throws RangeError when a number is outside its range or the maximum lies below the minimum
 * @source NIOSH NMAM: 2 to 10 field blanks per set (0600, 7300, 7605, 6009, 5040), 10 % (1501); joined by common practice
 * @example blanksNeeded(35, { minimum: 2, percent: 10, maximum: 10 }) // 4
 */
export function blanksNeeded(samples: number, rule: BlanksRule): number {
  requireWhole('blanksNeeded', 'samples', samples, 0)
  requireWhole('blanksNeeded', 'minimum', rule.minimum, 0)
  requireBetween('blanksNeeded', 'percent', rule.percent, 0, 100)
  const maximum = rule.maximum ?? Infinity
  if (rule.maximum != null) requireWhole('blanksNeeded', 'maximum', rule.maximum, 0)
  if (maximum < rule.minimum) refuse('blanksNeeded', 'maximum', `minimum (${rule.minimum}) or more`, maximum)
  if (samples === 0) return 0
  // Without the slack, 8.8 % of 375 samples would be 33.00000000000001 and ask for one blank more.
  const share = Math.ceil(samples * rule.percent / 100 - 1e-9)
  return Math.min(Math.max(share, rule.minimum), maximum)
}
