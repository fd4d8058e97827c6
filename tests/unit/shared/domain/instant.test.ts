import { describe, expect, it } from 'vitest'
import { instantMilliseconds, instantText, isInstant, isReachable } from '#shared/domain/instant'
import { expectRefused } from './refuses'

describe('instants', () => {
  it.each([
    ['2026-07-03T05:02:00Z', '2026-07-03T05:02:00.000Z'],
    ['2026-07-03T05:02Z', '2026-07-03T05:02:00.000Z'],
    ['2026-07-03T07:02:00.250+02:00', '2026-07-03T05:02:00.250Z'],
    ['2026-07-02T23:32:00-05:30', '2026-07-03T05:02:00.000Z'],
    ['2028-02-29T00:00:00Z', '2028-02-29T00:00:00.000Z'],
  ])('reads %s', (text, utc) => {
    expect(instantText(instantMilliseconds(text))).toBe(utc)
    expect(isInstant(text)).toBe(true)
  })

  it.each([
    '', 'now', '2026-07-03', '2026-07-03T05:02:00', '2026-07-03 05:02:00Z', '2026-02-30T05:02:00Z', '2026-07-03T24:00:00Z',
    '2026-07-03T05:60:00Z', '2026-07-03T05:02:60Z', '2026-07-03T05:02:00+25:00', '2026-07-03T05:02:00+0200', '1751518920000',
  ])('refuses %j, which is no instant with its zone', (text) => {
    expect(isInstant(text)).toBe(false)
    expect(() => instantMilliseconds(text)).toThrow('instantMilliseconds: an instant must be ISO 8601 text with a zone')
  })

  it('writes no date that does not exist', () => {
    expectRefused('instantText', instantText, [8.64e15 + 1, -8.64e15 - 1])
    expect(isReachable(8.64e15)).toBe(true)
    expect(isReachable(NaN)).toBe(false)
  })
})
