import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fixed, significant } from '#shared/domain/rounding'
import { expectRefused } from './refuses'

// Source: ISO 80000-1:2009, annex B, rule B (from memory); every case computed by hand on the decimal text.
describe('a fixed count of decimals', () => {
  it.each([
    [1.005, 2, '1.01'], [2.675, 2, '2.68'], [1.0049, 2, '1.00'], [0.5, 0, '1'], [1.5, 0, '2'], [2.5, 0, '3'], [0.49, 0, '0'],
    [-0.5, 0, '-1'], [-1.005, 2, '-1.01'], [-0.001, 2, '0.00'], [-0, 1, '0.0'], [0, 3, '0.000'], [9.995, 2, '10.00'],
    [99.99, 1, '100.0'], [0.05, 1, '0.1'], [0.05, 0, '0'], [0.005, 0, '0'], [886.5, 1, '886.5'], [2, 3, '2.000'], [1234567, 0, '1234567'],
    [1e21, 0, '1000000000000000000000'], [1e-7, 8, '0.00000010'], [1.5e-7, 7, '0.0000002'], [1.4e-7, 7, '0.0000001'], [123.456, 1, '123.5'],
  ])('of %d to %i is %s', (value, decimals, text) => {
    expect(fixed(value, decimals)).toBe(text)
  })

  it('is as close to the number as that many decimals allow', () => {
    fc.assert(fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.integer({ min: 0, max: 6 }), (value, decimals) => {
      const text = fixed(value, decimals)
      expect(text).toMatch(decimals === 0 ? /^-?\d+$/ : new RegExp(`^-?\\d+\\.\\d{${decimals}}$`))
      expect(Math.abs(Number(text) - value)).toBeLessThanOrEqual(0.5 * 10 ** -decimals * (1 + 1e-9) + 1e-9)
    }))
  })

  it('agrees with whole-number arithmetic for everything typed with three decimals', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 9_999_999 }), (thousandths) => {
      const hundredths = Math.floor((thousandths + 5) / 10)
      const digits = String(hundredths).padStart(3, '0')
      expect(fixed(thousandths / 1000, 2)).toBe(`${digits.slice(0, -2)}.${digits.slice(-2)}`)
    }))
  })
})

describe('a count of significant figures', () => {
  it.each([
    [9.996, 3, '10.0'], [1.97, 3, '1.97'], [1.97, 2, '2.0'], [886.5, 3, '887'], [886.5, 4, '886.5'], [123456, 3, '123000'], [0.0012345, 3, '0.00123'],
    [0.001235, 3, '0.00124'], [2, 3, '2.00'], [0, 3, '0'], [-0, 3, '0'], [-1.005, 3, '-1.01'], [999.9, 3, '1000'], [0.09999, 2, '0.10'], [5, 1, '5'],
    [1e21, 2, '1000000000000000000000'], [1.25e-7, 2, '0.00000013'], [95, 1, '100'],
  ])('of %d to %i is %s', (value, figures, text) => {
    expect(significant(value, figures)).toBe(text)
  })

  it('is within half a unit of the last figure', () => {
    fc.assert(fc.property(fc.double({ min: 1e-6, max: 1e9, noNaN: true }), fc.integer({ min: 1, max: 8 }), (value, figures) => {
      const unit = 10 ** (Math.floor(Math.log10(value)) - figures + 1)
      expect(Math.abs(Number(significant(value, figures)) - value)).toBeLessThanOrEqual(unit * 0.5 * (1 + 1e-6))
      expect(significant(-value, figures)).toBe(`-${significant(value, figures)}`)
    }))
  })
})

describe('rounding', () => {
  it('refuses what is no number and counts that are none', () => {
    expectRefused('fixed', value => fixed(value, 2), [])
    expectRefused('fixed', decimals => fixed(1, decimals), [-1, 0.5])
    expectRefused('significant', value => significant(value, 2), [])
    expectRefused('significant', figures => significant(1, figures), [0, -1, 1.5])
  })
})
