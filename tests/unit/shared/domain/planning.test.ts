import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { blanksNeeded, COMMON_BLANKS_RULE, litresToLoad, litresToQuantify, maximumMinutesForLoad, maximumMinutesForVolume, minimumMinutesToQuantify } from '#shared/domain/planning'
import { sampledVolume } from '#shared/domain/volume'
import { expectRefused } from './refuses'

const silica = { loqMicrograms: 5, limitMilligramsPerCubicMetre: 0.05, fraction: 0.1 }

describe('least sampling time', () => {
  // Source: t = LOQ / (0.1 OEL Q), recomputed: silica, 5 µg, a tenth of 50 µg/m3.
  it('is 400 min at 2.5 L/min and 238 min at 4.2 L/min for silica', () => {
    expect(minimumMinutesToQuantify({ ...silica, flowLitresPerMinute: 2.5 })).toBeCloseTo(400, 9)
    expect(minimumMinutesToQuantify({ ...silica, flowLitresPerMinute: 4.2 })).toBeCloseTo(238.1, 1)
  })

  // Source: recomputed: 0.2 L/min cannot reach a 2 µg LOQ at a tenth of 2.46 mg/m3 in 15 min, which needs 8.1 L.
  it('shows a short-term sample that cannot be quantified', () => {
    expect(litresToQuantify({ loqMicrograms: 2, limitMilligramsPerCubicMetre: 2.46, fraction: 0.1 })).toBeCloseTo(8.13, 2)
    expect(minimumMinutesToQuantify({ loqMicrograms: 2, limitMilligramsPerCubicMetre: 2.46, fraction: 0.1, flowLitresPerMinute: 0.2 })).toBeGreaterThan(15)
  })

  it('draws just enough air to find the LOQ at that fraction', () => {
    const amount = fc.double({ min: 0.001, max: 100, noNaN: true })
    fc.assert(fc.property(amount, amount, fc.double({ min: 0.01, max: 2, noNaN: true }), amount, (loqMicrograms, limit, fraction, flow) => {
      const minutes = minimumMinutesToQuantify({ loqMicrograms, limitMilligramsPerCubicMetre: limit, fraction, flowLitresPerMinute: flow })
      const foundMicrograms = sampledVolume(flow, minutes) * fraction * limit
      expect(foundMicrograms / loqMicrograms).toBeCloseTo(1, 9)
    }))
  })

  it('refuses impossible numbers', () => {
    expectRefused('litresToQuantify', loqMicrograms => litresToQuantify({ ...silica, loqMicrograms }), [0, -1])
    expectRefused('litresToQuantify', limitMilligramsPerCubicMetre => litresToQuantify({ ...silica, limitMilligramsPerCubicMetre }), [0, -1])
    expectRefused('litresToQuantify', fraction => litresToQuantify({ ...silica, fraction }), [0, -1, 2.1])
    expectRefused('minutesToVolume', flowLitresPerMinute => minimumMinutesToQuantify({ ...silica, flowLitresPerMinute }), [0, -1])
  })
})

describe('longest sampling time', () => {
  // Source: NIOSH NMAM, method 0600: 2 mg of dust, VOL-MAX 400 L.
  it('ends when a filter is loaded', () => {
    expect(litresToLoad({ maximumLoadMilligrams: 2, concentrationMilligramsPerCubicMetre: 5 })).toBe(400)
    expect(maximumMinutesForLoad({ maximumLoadMilligrams: 2, concentrationMilligramsPerCubicMetre: 5, flowLitresPerMinute: 1.7 })).toBeCloseTo(235.3, 1)
  })

  it('ends at the largest volume of the method', () => {
    expect(maximumMinutesForVolume(8, 0.2)).toBe(40)
  })

  it('refuses impossible numbers', () => {
    const dust = { maximumLoadMilligrams: 2, concentrationMilligramsPerCubicMetre: 5 }
    expectRefused('litresToLoad', maximumLoadMilligrams => litresToLoad({ ...dust, maximumLoadMilligrams }), [0, -1])
    expectRefused('litresToLoad', concentrationMilligramsPerCubicMetre => litresToLoad({ ...dust, concentrationMilligramsPerCubicMetre }), [0, -1])
    expectRefused('minutesToVolume', flowLitresPerMinute => maximumMinutesForLoad({ ...dust, flowLitresPerMinute }), [0, -1])
    expectRefused('maximumMinutesForVolume', litres => maximumMinutesForVolume(litres, 2), [0, -1])
    expectRefused('minutesToVolume', flow => maximumMinutesForVolume(8, flow), [0, -1])
  })
})

describe('field blanks', () => {
  // Source: NIOSH NMAM: 2 to 10 field blanks per set (0600, 7300); 10 % (1501). The two are joined by common practice.
  it.each([[0, 0], [1, 2], [20, 2], [21, 3], [30, 3], [35, 4], [99, 10], [1000, 10]])('for %i samples are %i', (samples, blanks) => {
    expect(blanksNeeded(samples, COMMON_BLANKS_RULE)).toBe(blanks)
  })

  it('follow the method where it says otherwise', () => {
    expect(blanksNeeded(40, { minimum: 3, percent: 0 })).toBe(3)
    expect(blanksNeeded(200, { minimum: 2, percent: 10, maximum: null })).toBe(20)
    expect(blanksNeeded(40, { minimum: 0, percent: 0, maximum: 0 })).toBe(0)
  })

  it('are not one more because of the arithmetic', () => {
    // 8.8 % of 375 is 33, whatever the doubles say.
    expect(375 * 8.8 / 100).toBeGreaterThan(33)
    expect(blanksNeeded(375, { minimum: 0, percent: 8.8 })).toBe(33)
    fc.assert(fc.property(fc.integer({ min: 1, max: 400 }), fc.integer({ min: 1, max: 200 }), (samples, tenthsOfPercent) => {
      const exact = Math.ceil(samples * tenthsOfPercent / 1000)
      expect(blanksNeeded(samples, { minimum: 0, percent: tenthsOfPercent / 10 })).toBe(exact)
    }))
  })

  it('refuses impossible rules', () => {
    expectRefused('blanksNeeded', samples => blanksNeeded(samples, COMMON_BLANKS_RULE), [-1, 1.5])
    expectRefused('blanksNeeded', minimum => blanksNeeded(5, { minimum, percent: 10 }), [-1, 0.5])
    expectRefused('blanksNeeded', percent => blanksNeeded(5, { minimum: 0, percent }), [-1, 101])
    expectRefused('blanksNeeded', maximum => blanksNeeded(5, { minimum: 0, percent: 10, maximum }), [-1, 0.5])
    expect(() => blanksNeeded(5, { minimum: 3, percent: 10, maximum: 2 })).toThrow('blanksNeeded: maximum must be minimum (3) or more, got 2')
  })
})
