import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bubbleMeterFlow, isRotameterCorrectionApplicable, rotameterCorrectedFlow, standardAtmospherePascals } from '#shared/domain/correction'
import { saturationPressureKilopascals } from '#shared/domain/saturation-pressure'
import { expectRefused } from './refuses'

const rotameter = {
  indicatedLitresPerMinute: 2,
  calibrationPressureKilopascals: 101,
  calibrationTemperatureCelsius: 20,
  samplingPressureKilopascals: 90,
  samplingTemperatureCelsius: 35,
}

// Source: NIOSH NMAM, 4th edition, chapter D, section 7a(7).
describe('rotameter correction', () => {
  it('raises the flow in thinner air and in warmer air', () => {
    const same = { ...rotameter, samplingPressureKilopascals: 101, samplingTemperatureCelsius: 20 }
    expect(rotameterCorrectedFlow(same)).toBe(2)
    expect(rotameterCorrectedFlow({ ...same, samplingPressureKilopascals: 90 })).toBeGreaterThan(2)
    expect(rotameterCorrectedFlow({ ...same, samplingTemperatureCelsius: 35 })).toBeGreaterThan(2)
    // By hand: 2 × (101 × 308.15 / (90 × 293.15))^0.5
    expect(rotameterCorrectedFlow(rotameter)).toBeCloseTo(2.172229, 6)
  })

  it('comes back when calibration and sampling change places', () => {
    const conditions = fc.record({ pressure: fc.double({ min: 60, max: 110, noNaN: true }), celsius: fc.double({ min: -20, max: 50, noNaN: true }) })
    fc.assert(fc.property(conditions, conditions, (there, here) => {
      const up = { calibrationPressureKilopascals: there.pressure, calibrationTemperatureCelsius: there.celsius, samplingPressureKilopascals: here.pressure, samplingTemperatureCelsius: here.celsius }
      const down = { calibrationPressureKilopascals: here.pressure, calibrationTemperatureCelsius: here.celsius, samplingPressureKilopascals: there.pressure, samplingTemperatureCelsius: there.celsius }
      const flow = rotameterCorrectedFlow({ indicatedLitresPerMinute: 1.7, ...up })
      expect(rotameterCorrectedFlow({ indicatedLitresPerMinute: flow, ...down })).toBeCloseTo(1.7, 9)
    }))
  })

  it('is for rotameters only', () => {
    expect(isRotameterCorrectionApplicable('rotameter')).toBe(true)
    expect(isRotameterCorrectionApplicable('electronic')).toBe(false)
  })

  it('refuses impossible conditions', () => {
    expectRefused('rotameterCorrectedFlow', indicatedLitresPerMinute => rotameterCorrectedFlow({ ...rotameter, indicatedLitresPerMinute }), [-1])
    expectRefused('rotameterCorrectedFlow', calibrationPressureKilopascals => rotameterCorrectedFlow({ ...rotameter, calibrationPressureKilopascals }), [0, -1])
    expectRefused('rotameterCorrectedFlow', samplingPressureKilopascals => rotameterCorrectedFlow({ ...rotameter, samplingPressureKilopascals }), [0, -1])
    expectRefused('kelvin', samplingTemperatureCelsius => rotameterCorrectedFlow({ ...rotameter, samplingTemperatureCelsius }), [-273.15])
    expectRefused('kelvin', calibrationTemperatureCelsius => rotameterCorrectedFlow({ ...rotameter, calibrationTemperatureCelsius }), [-300])
  })
})

describe('bubble meter', () => {
  const bubble = { bubbleLitresPerMinute: 2, pressureKilopascals: 101.325, temperatureCelsius: 25, inletRelativeHumidityPercent: 0 }

  /** The form that is often printed: Qb (P - Pw (1 - RH)) / P. */
  function linear({ bubbleLitresPerMinute, pressureKilopascals, temperatureCelsius, inletRelativeHumidityPercent }: typeof bubble): number {
    const missing = saturationPressureKilopascals(temperatureCelsius) * (1 - inletRelativeHumidityPercent / 100)
    return bubbleLitresPerMinute * (pressureKilopascals - missing) / pressureKilopascals
  }

  // Source: NIOSH NMAM practice, recomputed: dry air at 25 °C, 2.0 becomes 1.938.
  it('takes the water vapour off that dry air picks up', () => {
    expect(bubbleMeterFlow(bubble)).toBeCloseTo(1.9375, 4)
  })

  it('needs no correction when the air is wet already', () => {
    expect(bubbleMeterFlow({ ...bubble, inletRelativeHumidityPercent: 100 })).toBeCloseTo(2, 12)
  })

  it('agrees with the printed linear form at both ends, and differs by 0.03 % at half humidity and 25 °C', () => {
    expect(bubbleMeterFlow(bubble)).toBeCloseTo(linear(bubble), 12)
    const wet = { ...bubble, inletRelativeHumidityPercent: 100 }
    expect(bubbleMeterFlow(wet)).toBeCloseTo(linear(wet), 12)
    const half = { ...bubble, inletRelativeHumidityPercent: 50 }
    const apartPercent = (linear(half) / bubbleMeterFlow(half) - 1) * 100
    expect(apartPercent.toFixed(2)).toBe('0.03')
  })

  it('keeps the dry part of the air', () => {
    fc.assert(fc.property(fc.double({ min: 70, max: 108, noNaN: true }), fc.double({ min: 0, max: 40, noNaN: true }), fc.double({ min: 0, max: 100, noNaN: true }), (pressureKilopascals, temperatureCelsius, inletRelativeHumidityPercent) => {
      const flow = bubbleMeterFlow({ bubbleLitresPerMinute: 2, pressureKilopascals, temperatureCelsius, inletRelativeHumidityPercent })
      const saturation = saturationPressureKilopascals(temperatureCelsius)
      expect(flow * (pressureKilopascals - saturation * inletRelativeHumidityPercent / 100)).toBeCloseTo(2 * (pressureKilopascals - saturation), 9)
      expect(flow).toBeLessThanOrEqual(2 + 1e-12)
    }))
  })

  it('refuses impossible conditions', () => {
    expectRefused('bubbleMeterFlow', bubbleLitresPerMinute => bubbleMeterFlow({ ...bubble, bubbleLitresPerMinute }), [-1])
    expectRefused('bubbleMeterFlow', pressureKilopascals => bubbleMeterFlow({ ...bubble, pressureKilopascals }), [0, -1, 3])
    expectRefused('bubbleMeterFlow', inletRelativeHumidityPercent => bubbleMeterFlow({ ...bubble, inletRelativeHumidityPercent }), [-1, 101])
    expectRefused('saturationPressureKilopascals', temperatureCelsius => bubbleMeterFlow({ ...bubble, temperatureCelsius }), [-1, 61])
  })
})

describe('standard atmosphere', () => {
  // Source: U.S. Standard Atmosphere 1976; one mile, recomputed.
  it('is 83 428 Pa a mile up', () => {
    expect(Math.round(standardAtmospherePascals(1609.344))).toBe(83_428)
  })

  it('falls with height, also below the sea', () => {
    for (let height = -499; height <= 11_000; height += 500) {
      expect(standardAtmospherePascals(height)).toBeLessThan(standardAtmospherePascals(height - 1))
    }
  })

  it('is refused where the formula does not hold', () => {
    expectRefused('standardAtmospherePascals', standardAtmospherePascals, [-501, 11_001])
  })
})
