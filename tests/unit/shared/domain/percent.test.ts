import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isBelowPercent, isBeyondPercent } from '#shared/domain/percent'
import { expectRefused } from './refuses'

describe('comparing a percentage with a threshold', () => {
  // Source: NIOSH NMAM, chapter D, 7e, "plus/minus 5 %" read as inclusive.
  it('keeps exactly 5 % within, though the doubles say a hair more', () => {
    const change = (1.9 - 2.0) / 2.0 * 100
    expect(Math.abs(change) > 5).toBe(true)
    expect(isBeyondPercent(change, 5)).toBe(false)
  })

  it('calls the smallest real difference beyond', () => {
    expect(isBeyondPercent(5.0001, 5)).toBe(true)
    expect(isBeyondPercent(-5.0001, 5)).toBe(true)
    expect(isBeyondPercent(4.9999, 5)).toBe(false)
  })

  it('finds every exact threshold within, for any flow a person can type', () => {
    // The flow is a whole number of hundredths times 100, so that 95 % and 105 % of it are exact in the decimals typed.
    fc.assert(fc.property(fc.integer({ min: 1, max: 500 }), fc.constantFrom(-10, -5, 5, 10), (hundredths, percent) => {
      const before = hundredths / 100
      const after = Number((hundredths * (100 + percent) / 10_000).toFixed(4))
      expect(isBeyondPercent((after - before) / before * 100, Math.abs(percent))).toBe(false)
    }))
  })

  it('finds one more in the fourth decimal beyond, for any flow a person can type', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 500 }), fc.constantFrom(5, 10), (hundredths, percent) => {
      const before = hundredths / 100
      const after = Number((hundredths * (100 - percent) / 10_000 - 0.0001).toFixed(4))
      expect(isBeyondPercent((after - before) / before * 100, percent)).toBe(true)
    }))
  })

  it('works with a threshold of 0', () => {
    expect(isBeyondPercent(0, 0)).toBe(false)
    expect(isBeyondPercent(0.001, 0)).toBe(true)
  })

  it('does not call 7 of 8 hours below 87.5 %', () => {
    expect(isBelowPercent(420 / 480 * 100, 87.5)).toBe(false)
    expect(isBelowPercent(419 / 480 * 100, 87.5)).toBe(true)
    // 0.29 * 100 is 28.999999999999996 in doubles.
    expect(isBelowPercent(0.29 * 100, 29)).toBe(false)
  })

  it('refuses what is no percentage', () => {
    expectRefused('isBeyondPercent', value => isBeyondPercent(value, 5), [])
    expectRefused('isBeyondPercent', threshold => isBeyondPercent(1, threshold), [-1])
    expectRefused('isBelowPercent', value => isBelowPercent(value, 5), [])
    expectRefused('isBelowPercent', threshold => isBelowPercent(1, threshold), [-1])
  })
})
