import { describe, expect, it } from 'vitest'
import { meanFlow } from '#shared/domain/calibration'
import { accuracyPercentAt, COMMON_LAMINAR_FLOW_ACCURACY, COMMON_MECHANICAL_ACCURACY, type IndicatorAccuracy } from '#shared/domain/indicator-accuracy'
import { expectRefused } from './refuses'

describe('accuracy in percent of full scale', () => {
  // Source: arithmetic on the maker's statement. ±5 % of full scale for a mechanical indicator: common practice.
  it('grows as the flow falls: 5 % of a 5 L/min scale is 12.5 % at 2 L/min', () => {
    expect(accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 2)).toEqual({ percent: 12.5, litresPerMinute: 0.25 })
    expect(accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 5)).toEqual({ percent: 5, litresPerMinute: 0.25 })
    expect(accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 1)).toEqual({ percent: 25, litresPerMinute: 0.25 })
  })

  it('says nothing above the scale, and nothing at no flow', () => {
    expect(accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 5.01)).toEqual({ outside: true })
    expect(accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 0)).toEqual({ outside: true })
  })
})

describe('accuracy in percent of the reading', () => {
  // Source: common practice, from memory: ±2.5 % from 1 to 3 L/min, ±5 % from 0.5 to 1 L/min.
  it('is that of the range the flow lies in', () => {
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 2)).toEqual({ percent: 2.5, litresPerMinute: 0.05 })
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 0.8)).toEqual({ percent: 5, litresPerMinute: 0.04 })
  })

  it('is the larger one where two ranges meet, in whatever order they were written', () => {
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 1)).toMatchObject({ percent: 5 })
    const reversed = { kind: 'percent-of-reading', ranges: [...COMMON_LAMINAR_FLOW_ACCURACY.kind === 'percent-of-reading' ? COMMON_LAMINAR_FLOW_ACCURACY.ranges : []].reverse() } as const
    expect(accuracyPercentAt(reversed, 1)).toMatchObject({ percent: 5 })
  })

  it('includes both ends, also when a mean comes out a hair beside them', () => {
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 0.5)).toMatchObject({ percent: 5 })
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 3)).toMatchObject({ percent: 2.5 })
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 3.0000000000000004)).toMatchObject({ percent: 2.5 })
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, meanFlow([2.9, 3.0, 3.1]))).toMatchObject({ percent: 2.5 })
  })

  it('says nothing outside every range', () => {
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 0.49)).toEqual({ outside: true })
    expect(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 3.01)).toEqual({ outside: true })
    const gap: IndicatorAccuracy = { kind: 'percent-of-reading', ranges: [{ fromLitresPerMinute: 0, toLitresPerMinute: 1, percent: 5 }, { fromLitresPerMinute: 2, toLitresPerMinute: 3, percent: 5 }] }
    expect(accuracyPercentAt(gap, 1.5)).toEqual({ outside: true })
    expect(accuracyPercentAt(gap, 0)).toEqual({ outside: true })
  })
})

describe('impossible statements of accuracy', () => {
  it('are refused', () => {
    expectRefused('accuracyPercentAt', flow => accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, flow), [-1])
    expectRefused('accuracyPercentAt', percent => accuracyPercentAt({ kind: 'percent-of-full-scale', percent, fullScaleLitresPerMinute: 5 }, 2), [0, -1])
    expectRefused('accuracyPercentAt', fullScaleLitresPerMinute => accuracyPercentAt({ kind: 'percent-of-full-scale', percent: 5, fullScaleLitresPerMinute }, 2), [0, -1])
    const range = { fromLitresPerMinute: 1, toLitresPerMinute: 3, percent: 5 }
    expectRefused('accuracyPercentAt', percent => accuracyPercentAt({ kind: 'percent-of-reading', ranges: [{ ...range, percent }] }, 2), [0, -1])
    expectRefused('accuracyPercentAt', toLitresPerMinute => accuracyPercentAt({ kind: 'percent-of-reading', ranges: [{ ...range, toLitresPerMinute }] }, 2), [0.5])
    expectRefused('accuracyPercentAt', fromLitresPerMinute => accuracyPercentAt({ kind: 'percent-of-reading', ranges: [{ ...range, fromLitresPerMinute }] }, 2), [-1])
    expect(() => accuracyPercentAt({ kind: 'percent-of-reading', ranges: [] }, 2)).toThrow('ranges must hold at least one value')
  })
})
