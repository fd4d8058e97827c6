import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { flowChangePercent, flowChangeVerdict } from '#shared/domain/deviation'
import { expectRefused } from './refuses'

const thresholds = { attentionPercent: 5, stopPercent: 10 }

describe('change of flow', () => {
  it('is in percent of the flow before', () => {
    expect(flowChangePercent(2, 1.94)).toBeCloseTo(-3, 12)
    expect(flowChangePercent(2, 2.1)).toBeCloseTo(5, 12)
    // Of the flow after it would be +5.26 %, of the mean -5.13 %.
    expect(flowChangePercent(2, 1.9)).toBeCloseTo(-5, 12)
  })

  it('is -100 % for a pump that has died', () => {
    expect(flowChangePercent(2, 0)).toBe(-100)
  })

  it('does not depend on the unit of flow', () => {
    fc.assert(fc.property(fc.double({ min: 0.01, max: 20, noNaN: true }), fc.double({ min: 0, max: 20, noNaN: true }), (before, after) => {
      expect(flowChangePercent(before * 1000, after * 1000)).toBeCloseTo(flowChangePercent(before, after), 6)
    }))
  })

  it('refuses a flow before that is not above 0', () => {
    expectRefused('flowChangePercent', value => flowChangePercent(value, 2), [0, -2])
    expectRefused('flowChangePercent', value => flowChangePercent(2, value), [-2])
  })
})

describe('verdict on a change of flow', () => {
  // Source: common practice, two thresholds; exactly on a threshold is the milder verdict (NMAM chapter D, 7e).
  it.each([
    [0, 'within'], [4.99, 'within'], [5, 'within'], [-5, 'within'], [5.01, 'attention'], [-5.01, 'attention'],
    [10, 'attention'], [-10, 'attention'], [10.01, 'stop'], [-10.01, 'stop'], [-100, 'stop'],
  ])('of %d %% is %s', (percent, verdict) => {
    expect(flowChangeVerdict(percent, thresholds)).toBe(verdict)
  })

  it.each([[2.0, 1.9], [2.0, 2.1], [1.7, 1.615], [0.2, 0.19], [4.2, 3.99]])('of %d to %d L/min, exactly 5 %%, is within', (before, after) => {
    expect(flowChangeVerdict(flowChangePercent(before, after), thresholds)).toBe('within')
  })

  it('skips attention when both thresholds are the same', () => {
    expect(flowChangeVerdict(5.1, { attentionPercent: 5, stopPercent: 5 })).toBe('stop')
    expect(flowChangeVerdict(5, { attentionPercent: 5, stopPercent: 5 })).toBe('within')
  })

  it('refuses thresholds the wrong way round and numbers that are none', () => {
    expect(() => flowChangeVerdict(1, { attentionPercent: 10, stopPercent: 5 })).toThrow('flowChangeVerdict: stopPercent must be attentionPercent (10) or more, got 5')
    expect(() => flowChangeVerdict(NaN, thresholds)).toThrow(RangeError)
    expect(() => flowChangeVerdict(1, { attentionPercent: -1, stopPercent: 5 })).toThrow(RangeError)
    expect(() => flowChangeVerdict(1, { attentionPercent: NaN, stopPercent: NaN })).toThrow(RangeError)
  })
})
