import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { diffusiveVolume, meanFlowOfSegments, sampledVolume, segmentedVolume } from '#shared/domain/volume'
import { expectRefused } from './refuses'

const segment = fc.record({
  litresPerMinute: fc.double({ min: 0, max: 20, noNaN: true }),
  minutes: fc.double({ min: 0.1, max: 600, noNaN: true }),
})

describe('sampled volume', () => {
  // Source: OSHA Technical Manual, consecutive sample example: 2.0 L/min for 240 min is 480 L, for 210 min 420 L.
  it('is flow times minutes', () => {
    expect(sampledVolume(2, 240)).toBe(480)
    expect(sampledVolume(2, 210)).toBe(420)
    expect(sampledVolume(2, 0)).toBe(0)
  })

  it('is 0 for a pump that drew nothing, so that its sheet still opens', () => {
    expect(sampledVolume(0, 240)).toBe(0)
  })

  it('refuses negative flows and minutes', () => {
    expectRefused('sampledVolume', value => sampledVolume(value, 240), [-2])
    expectRefused('sampledVolume', value => sampledVolume(2, value), [-1])
    expect(() => sampledVolume(-2, 240)).toThrow('sampledVolume: flowLitresPerMinute must be 0 or more, got -2')
  })
})

describe('volume over segments', () => {
  it('is the sum over the segments', () => {
    expect(segmentedVolume([{ litresPerMinute: 2, minutes: 240 }, { litresPerMinute: 1.9, minutes: 210 }])).toEqual({ litres: 879, minutes: 450 })
    expect(segmentedVolume([])).toEqual({ litres: 0, minutes: 0 })
  })

  it('is that of a whole run when the run is cut in two', () => {
    fc.assert(fc.property(segment, fc.double({ min: 0, max: 1, noNaN: true }), ({ litresPerMinute, minutes }, part) => {
      const cut = [{ litresPerMinute, minutes: minutes * part }, { litresPerMinute, minutes: minutes * (1 - part) }]
      expect(segmentedVolume(cut).litres).toBeCloseTo(sampledVolume(litresPerMinute, minutes), 6)
    }))
  })

  it('does not care for the order of the segments', () => {
    fc.assert(fc.property(fc.array(segment, { maxLength: 6 }), (segments) => {
      expect(segmentedVolume([...segments].reverse()).litres).toBeCloseTo(segmentedVolume(segments).litres, 6)
    }))
  })

  it('has a mean flow in which a long segment counts for more', () => {
    expect(meanFlowOfSegments([{ litresPerMinute: 2, minutes: 300 }, { litresPerMinute: 1, minutes: 100 }])).toBe(1.75)
  })

  it('has a mean flow that gives the volume back', () => {
    fc.assert(fc.property(fc.array(segment, { minLength: 1, maxLength: 6 }), (segments) => {
      const { litres, minutes } = segmentedVolume(segments)
      expect(sampledVolume(meanFlowOfSegments(segments), minutes)).toBeCloseTo(litres, 6)
    }))
  })

  it('has no mean flow when it lasted no time', () => {
    expect(() => meanFlowOfSegments([])).toThrow('meanFlowOfSegments: minutes of all segments together must be above 0, got 0')
    expect(() => meanFlowOfSegments([{ litresPerMinute: 2, minutes: 0 }])).toThrow(RangeError)
  })

  it('refuses negative flows and minutes and says in which segment', () => {
    expectRefused('segmentedVolume', litresPerMinute => segmentedVolume([{ litresPerMinute, minutes: 1 }]), [-1])
    expectRefused('segmentedVolume', minutes => segmentedVolume([{ litresPerMinute: 1, minutes }]), [-1])
    expect(() => segmentedVolume([{ litresPerMinute: 2, minutes: 1 }, { litresPerMinute: 2, minutes: -1 }])).toThrow('segments[1].minutes must be 0 or more, got -1')
  })
})

describe('equivalent volume of a diffusive sampler', () => {
  // Source: definition of the uptake rate; numbers computed by hand (35 mL/min for 8 h).
  it('is uptake rate times minutes', () => {
    expect(diffusiveVolume(35, 480)).toBe(16.8)
    expect(diffusiveVolume(35, 0)).toBe(0)
  })

  it('refuses an uptake rate that is not above 0 and negative minutes', () => {
    expectRefused('diffusiveVolume', value => diffusiveVolume(value, 480), [0, -35])
    expectRefused('diffusiveVolume', value => diffusiveVolume(35, value), [-1])
  })
})
