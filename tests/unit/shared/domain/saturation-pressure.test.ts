import { describe, expect, it } from 'vitest'
import { antoineKilopascals, iapwsKilopascals, magnusKilopascals, saturationPressureKilopascals } from '#shared/domain/saturation-pressure'
import { expectRefused } from './refuses'

const degrees = Array.from({ length: 61 }, (_, celsius) => celsius)

describe('saturation pressure of water', () => {
  // Source: IAPWS-95 saturation equation (Wagner and Pruss); triple point 0.611657 kPa at 0.01 °C, 25 °C: 3.1698 kPa.
  it('has a reference equation that meets the published points', () => {
    expect(iapwsKilopascals(0.01)).toBeCloseTo(0.611657, 5)
    expect(iapwsKilopascals(25)).toBeCloseTo(3.1698, 3)
  })

  // Source: Buck 1996, Magnus and Antoine at 25 °C, recomputed.
  it('is what each formula gives at 25 °C', () => {
    expect(saturationPressureKilopascals(25)).toBeCloseTo(3.1685, 4)
    expect(magnusKilopascals(25)).toBeCloseTo(3.1601, 4)
    expect(antoineKilopascals(25)).toBeCloseTo(3.1579, 4)
  })

  it('lies within 0.05 % of the reference from 0 to 50 °C, as its docstring says', () => {
    for (const celsius of degrees.filter(one => one <= 50)) {
      expect(Math.abs(saturationPressureKilopascals(celsius) / iapwsKilopascals(celsius) - 1), `${celsius} °C`).toBeLessThan(0.0005)
    }
  })

  it('rises with every degree', () => {
    for (const formula of [saturationPressureKilopascals, magnusKilopascals, antoineKilopascals, iapwsKilopascals]) {
      degrees.slice(1).forEach(celsius => expect(formula(celsius)).toBeGreaterThan(formula(celsius - 1)))
    }
  })

  it('is refused outside the range that was compared', () => {
    expectRefused('saturationPressureKilopascals', saturationPressureKilopascals, [-0.1, 60.1])
    expectRefused('magnusKilopascals', magnusKilopascals, [-0.1, 60.1])
    expectRefused('antoineKilopascals', antoineKilopascals, [-0.1, 60.1])
    expectRefused('iapwsKilopascals', iapwsKilopascals, [-0.1, 60.1])
  })
})
