import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { effectiveStamp, formatHlc, HLC_ZERO, MAX_AHEAD_MILLISECONDS, parseHlc, tick, witness } from '#shared/sync/hlc'

const wall = fc.integer({ min: 0, max: 2 ** 47 })

describe('the hybrid clock', () => {
  it('never goes back, whatever the wall clock does', () => {
    fc.assert(fc.property(fc.array(wall, { maxLength: 50 }), (walls) => {
      let last = HLC_ZERO
      for (const now of walls) {
        const next = tick(last, now)
        expect(next > last).toBe(true)
        last = next
      }
    }))
  })

  it('orders as text as it orders in time', () => {
    fc.assert(fc.property(wall, fc.nat(65_535), wall, fc.nat(65_535), (a, i, b, j) => {
      expect(formatHlc(a, i) < formatHlc(b, j)).toBe(a !== b ? a < b : i < j)
    }))
  })

  it('carries over when a millisecond is full', () => {
    expect(parseHlc(tick(formatHlc(5, 0xFFFF), 3))).toEqual({ wallMilliseconds: 6, counter: 0 })
  })

  it('takes the later of what it knew and what it saw', () => {
    expect(witness(formatHlc(5, 1), formatHlc(5, 2))).toBe(formatHlc(5, 2))
  })

  it('[CLOCK1] clamps a stamp from the future and keeps a phone in its own order', () => {
    const server = 1_700_000_000_000
    const clamped = effectiveStamp(formatHlc(server + 86_400_000, 0), server, HLC_ZERO)
    expect(parseHlc(clamped).wallMilliseconds).toBe(server + MAX_AHEAD_MILLISECONDS)
    fc.assert(fc.property(fc.array(wall, { maxLength: 30 }), wall, (claims, now) => {
      let previous = HLC_ZERO
      for (const claim of claims) {
        const stamp = effectiveStamp(formatHlc(claim, 0), now, previous)
        expect(stamp > previous).toBe(true)
        previous = stamp
      }
    }))
  })

  it('leaves an honest stamp as it is', () => {
    expect(effectiveStamp(formatHlc(1000, 3), 5000, formatHlc(900, 0))).toBe(formatHlc(1000, 3))
  })
})
