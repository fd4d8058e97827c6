import { requireAbove, requireAtLeast, requireFinite } from './check'

export const FLOW_UNITS = ['L/min', 'mL/min'] as const
export type FlowUnit = typeof FLOW_UNITS[number]

export const PRESSURE_UNITS = ['kPa', 'hPa', 'mmHg', 'Pa'] as const
export type PressureUnit = typeof PRESSURE_UNITS[number]

/** Standard atmosphere, kPa. @source 10th CGPM, 1954 (101 325 Pa exactly) */
export const STANDARD_ATMOSPHERE_KILOPASCALS = 101.325

/** Coldest temperature that exists, °C. @source SI: 0 °C is 273.15 K exactly */
export const ABSOLUTE_ZERO_CELSIUS = -273.15

const PASCALS_IN: Record<PressureUnit, number> = {
  kPa: 1000,
  hPa: 100,
  // 760 mmHg is one standard atmosphere. Written as a fraction so that 760 mmHg gives 101.325 kPa and not nearly so.
  mmHg: 101_325 / 760,
  Pa: 1,
}

/**
 * Flow in litres per minute, the unit in which every flow is computed.
 *
 * @param value flow in `unit`, 0 or more
 * @param unit unit in which it was read
 * @returns flow, L/min
 * @throws RangeError when the value is negative or not finite
 * @source SI: 1 L is 1000 mL
 * @example litresPerMinute(200, 'mL/min') // 0.2
 */
export function litresPerMinute(value: number, unit: FlowUnit): number {
  requireAtLeast('litresPerMinute', 'value', value, 0)
  return unit === 'mL/min' ? value / 1000 : value
}

/**
 * Flow in millilitres per minute, for pumps and samplers that are spoken of in that unit.
 *
 * @param flowLitresPerMinute flow, L/min, 0 or more
 * @returns flow, mL/min
 * @throws RangeError when the flow is negative or not finite
 * @source SI: 1 L is 1000 mL
 * @example millilitresPerMinute(0.05) // 50
 */
export function millilitresPerMinute(flowLitresPerMinute: number): number {
  requireAtLeast('millilitresPerMinute', 'flowLitresPerMinute', flowLitresPerMinute, 0)
  return flowLitresPerMinute * 1000
}

/**
 * Volume in cubic metres.
 *
 * @param litres volume, L, 0 or more
 * @returns volume, m3
 * @throws RangeError when the volume is negative or not finite
 * @source SI: 1 m3 is 1000 L
 * @example cubicMetres(886.5) // 0.8865
 */
export function cubicMetres(litres: number): number {
  requireAtLeast('cubicMetres', 'litres', litres, 0)
  return litres / 1000
}

/**
 * Pressure in kilopascals.
 *
 * @param value absolute pressure in `unit`, above 0
 * @param unit unit in which it was read
 * @returns absolute pressure, kPa
 * @throws RangeError when the pressure is not above 0
 * @source SI; 760 mmHg taken as one standard atmosphere (101.325 kPa)
 * @example kilopascals(760, 'mmHg') // 101.325
 */
export function kilopascals(value: number, unit: PressureUnit): number {
  requireAbove('kilopascals', 'value', value, 0)
  return value * PASCALS_IN[unit] / 1000
}

/**
 * Pressure from kilopascals into the unit a person reads.
 *
 * @param pressureKilopascals absolute pressure, kPa, above 0
 * @param unit unit wanted
 * @returns absolute pressure in `unit`
 * @throws RangeError when the pressure is not above 0
 * @source SI; 760 mmHg taken as one standard atmosphere (101.325 kPa)
 * @example pressureIn(101.325, 'hPa') // 1013.25
 */
export function pressureIn(pressureKilopascals: number, unit: PressureUnit): number {
  requireAbove('pressureIn', 'pressureKilopascals', pressureKilopascals, 0)
  return pressureKilopascals * 1000 / PASCALS_IN[unit]
}

/**
 * Absolute temperature.
 *
 * @param temperatureCelsius temperature, °C, above -273.15
 * @returns temperature, K
 * @throws RangeError when the temperature is not above absolute zero
 * @source SI: T/K = t/°C + 273.15
 * @example kelvin(25) // 298.15
 */
export function kelvin(temperatureCelsius: number): number {
  requireAbove('kelvin', 'temperatureCelsius', temperatureCelsius, ABSOLUTE_ZERO_CELSIUS)
  return temperatureCelsius + 273.15
}

/**
 * Temperature in degrees Celsius from degrees Fahrenheit, for thermometers that show only those.
 *
 * @param temperatureFahrenheit temperature, °F, above -459.67
 * @returns temperature, °C
 * @throws RangeError when the temperature is below absolute zero or not finite
 * @source SI: t/°C = (t/°F - 32) / 1.8
 * @example celsiusFromFahrenheit(77) // 25
 */
export function celsiusFromFahrenheit(temperatureFahrenheit: number): number {
  requireFinite('celsiusFromFahrenheit', 'temperatureFahrenheit', temperatureFahrenheit)
  const celsius = (temperatureFahrenheit - 32) / 1.8
  requireAbove('celsiusFromFahrenheit', 'temperature in °C', celsius, ABSOLUTE_ZERO_CELSIUS)
  return celsius
}
