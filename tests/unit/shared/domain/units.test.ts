import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { FLOW_UNITS as RECORDED_FLOW_UNITS } from '#shared/records/sheet-event'
import { celsiusFromFahrenheit, cubicMetres, FLOW_UNITS, kelvin, kilopascals, litresPerMinute, millilitresPerMinute, PRESSURE_UNITS, pressureIn, STANDARD_ATMOSPHERE_KILOPASCALS } from '#shared/domain/units'
import { expectRefused } from './refuses'

describe('units', () => {
  it('takes a flow in either unit of a sheet', () => {
    expect(litresPerMinute(200, 'mL/min')).toBe(0.2)
    expect(litresPerMinute(1.7, 'L/min')).toBe(1.7)
    expect(litresPerMinute(0, 'mL/min')).toBe(0)
    expect([...RECORDED_FLOW_UNITS]).toEqual([...FLOW_UNITS])
  })

  // Source: one standard atmosphere is 101 325 Pa (10th CGPM, 1954) and 760 mmHg.
  it('reads one atmosphere the same in every pressure unit', () => {
    expect(kilopascals(760, 'mmHg')).toBe(STANDARD_ATMOSPHERE_KILOPASCALS)
    expect(kilopascals(1013.25, 'hPa')).toBe(STANDARD_ATMOSPHERE_KILOPASCALS)
    expect(kilopascals(101_325, 'Pa')).toBe(STANDARD_ATMOSPHERE_KILOPASCALS)
    expect(kilopascals(101.325, 'kPa')).toBe(STANDARD_ATMOSPHERE_KILOPASCALS)
  })

  it('comes back from every pressure unit', () => {
    fc.assert(fc.property(fc.double({ min: 20, max: 120, noNaN: true }), fc.constantFrom(...PRESSURE_UNITS), (pressure, unit) => {
      expect(kilopascals(pressureIn(pressure, unit), unit)).toBeCloseTo(pressure, 9)
    }))
  })

  it('comes back from millilitres', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 1000, noNaN: true }), (flow) => {
      expect(litresPerMinute(millilitresPerMinute(flow), 'mL/min')).toBeCloseTo(flow, 9)
    }))
  })

  // Source: SI, 0 °C is 273.15 K; water freezes at 32 °F and boils at 212 °F.
  it('converts temperatures at their fixed points', () => {
    expect(kelvin(0)).toBe(273.15)
    expect(kelvin(-40)).toBeCloseTo(233.15, 12)
    expect(celsiusFromFahrenheit(32)).toBe(0)
    expect(celsiusFromFahrenheit(212)).toBe(100)
    expect(celsiusFromFahrenheit(-40)).toBe(-40)
  })

  it('converts litres to cubic metres', () => {
    expect(cubicMetres(886.5)).toBe(0.8865)
    expect(cubicMetres(0)).toBe(0)
  })

  it('refuses what no instrument can show', () => {
    expectRefused('litresPerMinute', value => litresPerMinute(value, 'L/min'), [-0.1])
    expectRefused('millilitresPerMinute', millilitresPerMinute, [-0.1])
    expectRefused('cubicMetres', cubicMetres, [-1])
    expectRefused('kilopascals', value => kilopascals(value, 'kPa'), [0, -1])
    expectRefused('pressureIn', value => pressureIn(value, 'mmHg'), [0, -1])
    expectRefused('kelvin', kelvin, [-273.15, -300])
    expectRefused('celsiusFromFahrenheit', celsiusFromFahrenheit, [-460])
  })
})
