import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { flowUsed } from '#shared/domain/flow-used'
import { expectRefused } from './refuses'

const measured = { useNominal: false, attentionPercent: 5 }

// Source: common practice (mean; lower beyond 5 %); nominal: NIOSH NMAM, method 0600.
describe('flow used', () => {
  it('is the mean while before and after agree', () => {
    expect(flowUsed({ ...measured, before: 2, after: 1.94 })).toEqual({ litresPerMinute: 1.97, rule: 'mean', why: 'change-within-attention' })
    expect(flowUsed({ ...measured, before: 2, after: 1.9 })?.rule).toBe('mean')
  })

  it('is the lower one when they do not, whichever that is', () => {
    expect(flowUsed({ ...measured, before: 1.7, after: 1.58 })).toEqual({ litresPerMinute: 1.58, rule: 'lower', why: 'change-beyond-attention' })
    expect(flowUsed({ ...measured, before: 1.7, after: 1.9 })).toMatchObject({ litresPerMinute: 1.7, rule: 'lower' })
  })

  it('is the nominal one where the method says so, even after a shift', () => {
    expect(flowUsed({ before: 1.7, after: 1.4, nominal: 1.7, useNominal: true, attentionPercent: 5 }))
      .toEqual({ litresPerMinute: 1.7, rule: 'nominal', why: 'method-uses-nominal' })
  })

  it('falls back to the measured flows when the method wants a nominal flow that nobody knows', () => {
    expect(flowUsed({ before: 2, after: 2, nominal: null, useNominal: true, attentionPercent: 5 })?.rule).toBe('mean')
  })

  it('does not use a nominal flow unasked', () => {
    expect(flowUsed({ ...measured, before: 2, after: 2, nominal: 2.5 })?.litresPerMinute).toBe(2)
  })

  it('is the only one there is, and says that', () => {
    expect(flowUsed({ ...measured, before: 2 })).toEqual({ litresPerMinute: 2, rule: 'before-only', why: 'no-flow-after' })
    expect(flowUsed({ ...measured, after: 2, before: null })).toEqual({ litresPerMinute: 2, rule: 'after-only', why: 'no-flow-before' })
  })

  it('is nothing yet without any flow', () => {
    expect(flowUsed(measured)).toBeNull()
    expect(flowUsed({ ...measured, before: null, after: null })).toBeNull()
  })

  it('is 0 for a pump that has died, and no error', () => {
    expect(flowUsed({ ...measured, before: 2, after: 0 })).toMatchObject({ litresPerMinute: 0, rule: 'lower' })
    expect(flowUsed({ ...measured, before: 0, after: 2 })).toMatchObject({ litresPerMinute: 0, rule: 'lower' })
    expect(flowUsed({ ...measured, before: 0, after: 0 })).toMatchObject({ litresPerMinute: 0, rule: 'mean' })
  })

  it('never lies above the mean of the two nor below the lower', () => {
    const flow = fc.double({ min: 0.01, max: 20, noNaN: true })
    fc.assert(fc.property(flow, flow, fc.integer({ min: 0, max: 20 }), (before, after, attentionPercent) => {
      const used = flowUsed({ before, after, useNominal: false, attentionPercent })
      expect(used?.litresPerMinute).toBeLessThanOrEqual((before + after) / 2)
      expect(used?.litresPerMinute).toBeGreaterThanOrEqual(Math.min(before, after))
    }))
  })

  it('refuses impossible numbers', () => {
    expectRefused('flowUsed', before => flowUsed({ ...measured, before }), [-1])
    expectRefused('flowUsed', after => flowUsed({ ...measured, after }), [-1])
    expectRefused('flowUsed', nominal => flowUsed({ before: 2, nominal, useNominal: true, attentionPercent: 5 }), [0, -1])
    expectRefused('flowUsed', attentionPercent => flowUsed({ before: 2, useNominal: false, attentionPercent }), [-1])
  })
})
