import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { combinedPercent, expandedPercent } from '#shared/domain/uncertainty'
import { expectRefused } from './refuses'

describe('combined uncertainty', () => {
  // Source: NIOSH 77-173, appendix D: parts of 15, 2, 10 and 10 % combine to 20.7 %; with a flow part of 5 % instead, 15.1 % (recomputed).
  it('is the root of the sum of the squares', () => {
    expect(combinedPercent([15, 2, 10, 10])).toBeCloseTo(20.71, 2)
    expect(combinedPercent([5, 2, 10, 10])).toBeCloseTo(15.13, 2)
    expect(combinedPercent([3, 4])).toBe(5)
    expect(combinedPercent([7])).toBe(7)
  })

  it('is never below the largest part nor above their sum', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 1, maxLength: 8 }), (parts) => {
      const combined = combinedPercent(parts)
      expect(combined).toBeGreaterThanOrEqual(Math.max(...parts) - 1e-9)
      expect(combined).toBeLessThanOrEqual(parts.reduce((sum, part) => sum + part, 0) + 1e-9)
    }))
  })

  it('refuses no part and negative parts', () => {
    expect(() => combinedPercent([])).toThrow('combinedPercent: partsPercent must hold at least one value, got none')
    expectRefused('combinedPercent', part => combinedPercent([5, part]), [-1])
  })
})

describe('expanded uncertainty', () => {
  // Source: EN 482 and ISO 20581: coverage factor 2.
  it('is twice the combined one unless another factor is asked for', () => {
    expect(expandedPercent(10)).toBe(20)
    expect(expandedPercent(10, 3)).toBe(30)
    expect(expandedPercent(0)).toBe(0)
  })

  it('refuses impossible numbers', () => {
    expectRefused('expandedPercent', value => expandedPercent(value), [-1])
    expectRefused('expandedPercent', factor => expandedPercent(10, factor), [0, -1])
  })
})
