import { describe, expect, it } from 'vitest'
import { coveredPercent, shiftCoverage } from '#shared/domain/coverage'
import { isBelowPercent } from '#shared/domain/percent'
import { expectRefused } from './refuses'

const at = (time: string, day = '2026-07-03') => `${day}T${time}:00Z`
const span = (from: string, to: string) => ({ fromAt: at(from), toAt: at(to) })
const shift = span('06:00', '14:00')

describe('share of a shift covered', () => {
  // Source: common practice: at least 7 of 8 hours.
  it('is 87.5 % for 7 of 8 hours, which is enough', () => {
    const coverage = shiftCoverage(shift, [span('07:00', '14:00')])
    expect(coverage).toEqual({ shiftMinutes: 480, coveredMinutes: 420, uncoveredMinutes: 60, percent: 87.5 })
    expect(isBelowPercent(coverage.percent, 7 / 8 * 100)).toBe(false)
  })

  it('adds samples one after the other and counts doubled minutes once', () => {
    expect(shiftCoverage(shift, [span('06:00', '10:00'), span('10:00', '13:00')]).coveredMinutes).toBe(420)
    expect(shiftCoverage(shift, [span('06:00', '10:00'), span('09:00', '11:00')]).coveredMinutes).toBe(300)
  })

  it('leaves out what lies outside the shift', () => {
    expect(shiftCoverage(shift, [span('05:00', '07:00'), span('13:30', '15:00'), span('16:00', '17:00')]).coveredMinutes).toBe(90)
    expect(shiftCoverage(shift, [span('05:00', '17:00')]).percent).toBe(100)
  })

  it('is 0 without a sample', () => {
    expect(shiftCoverage(shift, [])).toEqual({ shiftMinutes: 480, coveredMinutes: 0, uncoveredMinutes: 480, percent: 0 })
  })

  it('works over midnight and with offsets in the text', () => {
    const night = { fromAt: '2026-07-03T22:00:00+02:00', toAt: '2026-07-04T06:00:00+02:00' }
    expect(shiftCoverage(night, [{ fromAt: at('20:30'), toAt: at('03:30', '2026-07-04') }]).coveredMinutes).toBe(420)
  })

  it('refuses a shift that does not end after it begins and a span the wrong way round', () => {
    expect(() => shiftCoverage(span('06:00', '06:00'), [])).toThrow('shiftCoverage: end of the shift must be after')
    expect(() => shiftCoverage(shift, [span('09:00', '08:00')])).toThrow('shiftCoverage: end of a span must be at or after')
  })
})

describe('minutes in percent of a shift', () => {
  it('may go above 100', () => {
    expect(coveredPercent(500, 400)).toBe(125)
  })

  it('refuses impossible minutes', () => {
    expectRefused('coveredPercent', minutes => coveredPercent(minutes, 480), [-1])
    expectRefused('coveredPercent', minutes => coveredPercent(420, minutes), [0, -1])
  })
})
