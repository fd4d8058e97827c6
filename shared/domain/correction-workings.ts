import { bubbleMeterFlow, rotameterCorrectedFlow, type BubbleMeterInput, type RotameterInput } from './correction'
import { saturationPressureKilopascals } from './saturation-pressure'
import { kelvin } from './units'
import type { Working } from './working'

/**
 * Working of a rotameter's flow at the conditions of sampling.
 *
 * @param reading as for `rotameterCorrectedFlow`
 * @returns the working, result in L/min
 * @throws RangeError as `rotameterCorrectedFlow`
 * @source as `rotameterCorrectedFlow`
 * @example rotameterWorking({ indicatedLitresPerMinute: 1.7, calibrationPressureKilopascals: 99.3, calibrationTemperatureCelsius: 22,
 *   samplingPressureKilopascals: 99.3, samplingTemperatureCelsius: 22 }).result // { value: 1.7, unit: 'L/min' }
 */
export function rotameterWorking(reading: RotameterInput): Working {
  return {
    title: 'Flow of a rotameter at the conditions of sampling',
    formula: 'flow shown × square root of (calibration pressure × sampling temperature / (sampling pressure × calibration temperature)), temperatures in kelvin',
    inputs: [
      { name: 'flow shown', value: reading.indicatedLitresPerMinute, unit: 'L/min' },
      { name: 'calibration pressure', value: reading.calibrationPressureKilopascals, unit: 'kPa', from: 'station pressure' },
      { name: 'calibration temperature', value: kelvin(reading.calibrationTemperatureCelsius), unit: 'K', from: `${reading.calibrationTemperatureCelsius} °C` },
      { name: 'sampling pressure', value: reading.samplingPressureKilopascals, unit: 'kPa', from: 'station pressure' },
      { name: 'sampling temperature', value: kelvin(reading.samplingTemperatureCelsius), unit: 'K', from: `${reading.samplingTemperatureCelsius} °C` },
    ],
    result: { value: rotameterCorrectedFlow(reading), unit: 'L/min' },
    source: 'NIOSH Manual of Analytical Methods, 4th edition, chapter D, section 7a(7)',
    note: 'Only for a pump whose flow is set by a rotameter.',
  }
}

/**
 * Working of the flow through a bubble meter, with the water vapour taken off.
 *
 * @param reading as for `bubbleMeterFlow`
 * @returns the working, result in L/min
 * @throws RangeError as `bubbleMeterFlow`
 * @source as `bubbleMeterFlow`
 * @example bubbleMeterWorking({ bubbleLitresPerMinute: 2, pressureKilopascals: 101.325, temperatureCelsius: 25,
 *   inletRelativeHumidityPercent: 0 }).result // { value: 1.9375, unit: 'L/min' }
 */
export function bubbleMeterWorking(reading: BubbleMeterInput): Working {
  return {
    title: 'Flow through a bubble meter',
    formula: 'flow of the bubble × (pressure - saturation pressure) / (pressure - humidity / 100 × saturation pressure)',
    inputs: [
      { name: 'flow of the bubble', value: reading.bubbleLitresPerMinute, unit: 'L/min' },
      { name: 'pressure', value: reading.pressureKilopascals, unit: 'kPa', from: 'station pressure' },
      { name: 'temperature', value: reading.temperatureCelsius, unit: '°C' },
      { name: 'humidity of the air that enters', value: reading.inletRelativeHumidityPercent, unit: '%' },
      { name: 'saturation pressure of water', value: saturationPressureKilopascals(reading.temperatureCelsius), unit: 'kPa', from: 'Buck 1996' },
    ],
    result: { value: bubbleMeterFlow(reading), unit: 'L/min' },
    source: 'the dry part of the air is the same before and inside the meter; saturation pressure by Buck 1996',
    note: 'Not for piston and other dry calibrators.',
  }
}
