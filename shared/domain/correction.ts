import { refuse, requireAbove, requireAtLeast, requireBetween } from './check'
import { saturationPressureKilopascals } from './saturation-pressure'
import { kelvin } from './units'

export const FLOW_INDICATORS = ['rotameter', 'electronic'] as const
export type FlowIndicator = typeof FLOW_INDICATORS[number]

export interface RotameterInput {
  /** flow shown in the field, on the scale as calibrated, L/min, 0 or more */
  indicatedLitresPerMinute: number
  /** station pressure where it was calibrated, kPa, above 0 */
  calibrationPressureKilopascals: number
  calibrationTemperatureCelsius: number
  /** station pressure where it was used, kPa, above 0 */
  samplingPressureKilopascals: number
  samplingTemperatureCelsius: number
}

export interface BubbleMeterInput {
  /** flow the bubble shows, L/min, 0 or more */
  bubbleLitresPerMinute: number
  /** station pressure, kPa, above the saturation pressure of water */
  pressureKilopascals: number
  /** °C, 0 to 60 */
  temperatureCelsius: number
  /** relative humidity of the air that enters the meter, %, 0 to 100 */
  inletRelativeHumidityPercent: number
}

/**
 * Whether a pump's flow needs the rotameter correction. Only a pump whose flow is set by a float in a tube does; one that
 * measures and holds its flow electronically must not be corrected this way.
 *
 * @param indicator how the pump shows its flow
 * @returns true for a rotameter
 * @source NIOSH NMAM, 4th edition, chapter D, section 7a(7): not used for non-rotameter pumps
 * @example isRotameterCorrectionApplicable('electronic') // false
 */
export function isRotameterCorrectionApplicable(indicator: FlowIndicator): boolean {
  return indicator === 'rotameter'
}

/**
 * True flow of a rotameter that is read at another pressure or temperature than it was calibrated at.
 *
 * Thinner air lifts the float less, so on a mountain more air passes than the scale says. Pressures are station pressures:
 * a weather service's value is reduced to sea level and would hide exactly this.
 *
 * @param input flow in L/min, pressures in kPa, temperatures in °C; see the fields
 * @returns flow, L/min at the conditions of sampling
 * @throws RangeError when a value is outside its range
 * @source NIOSH NMAM, 4th edition, chapter D, section 7a(7): V = Q t (Pc Ts / (Ps Tc))^0.5
 * @example rotameterCorrectedFlow({ indicatedLitresPerMinute: 2, calibrationPressureKilopascals: kilopascals(760, 'mmHg'),
 *   calibrationTemperatureCelsius: 25, samplingPressureKilopascals: kilopascals(630, 'mmHg'), samplingTemperatureCelsius: 25 })
 *   // 2.1967
 */
export function rotameterCorrectedFlow(input: RotameterInput): number {
  const where = 'rotameterCorrectedFlow'
  requireAtLeast(where, 'indicatedLitresPerMinute', input.indicatedLitresPerMinute, 0)
  requireAbove(where, 'calibrationPressureKilopascals', input.calibrationPressureKilopascals, 0)
  requireAbove(where, 'samplingPressureKilopascals', input.samplingPressureKilopascals, 0)
  const pressureRatio = input.calibrationPressureKilopascals / input.samplingPressureKilopascals
  const temperatureRatio = kelvin(input.samplingTemperatureCelsius) / kelvin(input.calibrationTemperatureCelsius)
  return input.indicatedLitresPerMinute * Math.sqrt(pressureRatio * temperatureRatio)
}

/**
 * True flow of ambient air through a bubble meter, in which the air takes up water until it is saturated.
 *
 * The exact form: the dry part of the air is the same before and inside the meter, Q (P - RH Pw) = Qb (P - Pw). Often printed
 * as Qb (P - Pw (1 - RH)) / P, which is 0.03 % away at half humidity. A piston or other dry calibrator needs none of this.
 *
 * @param input flow in L/min, pressure in kPa, temperature in °C, humidity in %; see the fields
 * @returns flow of the air that entered, L/min
 * @throws RangeError when a value is outside its range
 * @source conservation of the dry air; saturation pressure by `saturationPressureKilopascals`
 * @example bubbleMeterFlow({ bubbleLitresPerMinute: 2, pressureKilopascals: 101.325, temperatureCelsius: 25,
 *   inletRelativeHumidityPercent: 0 }) // 1.9375
 */
export function bubbleMeterFlow(input: BubbleMeterInput): number {
  const where = 'bubbleMeterFlow'
  requireAtLeast(where, 'bubbleLitresPerMinute', input.bubbleLitresPerMinute, 0)
  requireAbove(where, 'pressureKilopascals', input.pressureKilopascals, 0)
  requireBetween(where, 'inletRelativeHumidityPercent', input.inletRelativeHumidityPercent, 0, 100)
  const saturation = saturationPressureKilopascals(input.temperatureCelsius)
  if (input.pressureKilopascals <= saturation) {
    refuse(where, 'pressureKilopascals', `above the saturation pressure of water (${saturation})`, input.pressureKilopascals)
  }
  const inlet = saturation * input.inletRelativeHumidityPercent / 100
  return input.bubbleLitresPerMinute * (input.pressureKilopascals - saturation) / (input.pressureKilopascals - inlet)
}

/**
 * Pressure of the standard atmosphere at a height, to check a station pressure against: a reading far from it is often the
 * weather service's sea-level value.
 *
 * @param heightMetres height above sea level (geopotential), m, -500 to 11000
 * @returns pressure, Pa
 * @throws RangeError when the height is outside its range
 * @source U.S. Standard Atmosphere 1976, ISO 2533:1975: 101325 (1 - 0.0065 H / 288.15)^5.255876
 * @example standardAtmospherePascals(1000) // 89875
 */
export function standardAtmospherePascals(heightMetres: number): number {
  requireBetween('standardAtmospherePascals', 'heightMetres', heightMetres, -500, 11_000)
  return 101_325 * (1 - 0.0065 * heightMetres / 288.15) ** 5.255876
}
