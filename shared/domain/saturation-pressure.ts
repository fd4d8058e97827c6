import { requireBetween } from './check'

/** Range in which the formulas here were compared with each other, °C. */
const COLDEST_CELSIUS = 0
const WARMEST_CELSIUS = 60

/**
 * Saturation pressure of water vapour over liquid water, by Buck's formula of 1996: the one Lapel computes with.
 *
 * Chosen because it is short and lies within 0.05 % of the reference equation IAPWS-95 from 0 to 50 °C (15 °C: 1.7052 against
 * 1.7057 kPa, 20 °C: 2.3383 against 2.3392, 30 °C: 4.2451 against 4.2469). The other formulas in use agree within 0.5 %.
 *
 * @param temperatureCelsius temperature, °C, 0 to 60
 * @returns saturation pressure, kPa
 * @throws RangeError when the temperature is outside its range
 * @source A. L. Buck, 1981, revised 1996
 * @example saturationPressureKilopascals(20) // 2.3383
 */
export function saturationPressureKilopascals(temperatureCelsius: number): number {
  checkTemperature('saturationPressureKilopascals', temperatureCelsius)
  const t = temperatureCelsius
  return 0.61121 * Math.exp((18.678 - t / 234.5) * (t / (257.14 + t)))
}

/**
 * Saturation pressure by the Magnus formula, for comparison.
 *
 * @param temperatureCelsius temperature, °C, 0 to 60
 * @returns saturation pressure, kPa
 * @throws RangeError when the temperature is outside its range
 * @source WMO-No. 8 (Sonntag 1990): 6.112 exp(17.62 t / (243.12 + t)) hPa
 * @example magnusKilopascals(20) // 2.3326
 */
export function magnusKilopascals(temperatureCelsius: number): number {
  checkTemperature('magnusKilopascals', temperatureCelsius)
  return 0.6112 * Math.exp(17.62 * temperatureCelsius / (243.12 + temperatureCelsius))
}

/**
 * Saturation pressure by the Antoine equation, for comparison.
 *
 * @param temperatureCelsius temperature, °C, 0 to 60
 * @returns saturation pressure, kPa
 * @throws RangeError when the temperature is outside its range
 * @source Antoine constants for water, 1 to 100 °C, mmHg: 8.07131, 1730.63, 233.426
 * @example antoineKilopascals(20) // 2.3296
 */
export function antoineKilopascals(temperatureCelsius: number): number {
  checkTemperature('antoineKilopascals', temperatureCelsius)
  const millimetresOfMercury = 10 ** (8.07131 - 1730.63 / (233.426 + temperatureCelsius))
  return millimetresOfMercury * 101.325 / 760
}

/**
 * Saturation pressure by the reference equation, for comparison.
 *
 * @param temperatureCelsius temperature, °C, 0 to 60
 * @returns saturation pressure, kPa
 * @throws RangeError when the temperature is outside its range
 * @source W. Wagner and A. Pruss, 1993 and 2002: saturation equation of IAPWS-95
 * @example iapwsKilopascals(20) // 2.3392
 */
export function iapwsKilopascals(temperatureCelsius: number): number {
  checkTemperature('iapwsKilopascals', temperatureCelsius)
  const kelvin = temperatureCelsius + 273.15
  const criticalKelvin = 647.096
  const criticalKilopascals = 22_064
  const v = 1 - kelvin / criticalKelvin
  const sum = -7.85951783 * v + 1.84408259 * v ** 1.5 - 11.7866497 * v ** 3
    + 22.6807411 * v ** 3.5 - 15.9618719 * v ** 4 + 1.80122502 * v ** 7.5
  return criticalKilopascals * Math.exp(criticalKelvin / kelvin * sum)
}

function checkTemperature(where: string, temperatureCelsius: number): void {
  requireBetween(where, 'temperatureCelsius', temperatureCelsius, COLDEST_CELSIUS, WARMEST_CELSIUS)
}
