import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readNumber } from '#shared/domain/number-text'

const read = (value: number, decimals: number, significant: number) => ({ ok: true, value, decimals, significant })
const refused = (reason: string) => ({ ok: false, reason })

describe('reading a typed number', () => {
  it.each([
    ['2.05', read(2.05, 2, 3)],
    ['2,05', read(2.05, 2, 3)],
    ['  1.7 ', read(1.7, 1, 2)],
    ['\u00A01,7\u202F', read(1.7, 1, 2)],
    ['-3', read(-3, 0, 1)],
    ['\u22123', read(-3, 0, 1)],
    ['0.050', read(0.05, 3, 2)],
    ['2.00', read(2, 2, 3)],
    ['007', read(7, 0, 1)],
    ['.5', read(0.5, 1, 1)],
    [',5', read(0.5, 1, 1)],
    ['200', read(200, 0, 3)],
  ])('takes %j', (text, expected) => {
    expect(readNumber(text)).toEqual(expected)
  })

  it('takes a number that is still being typed', () => {
    expect(readNumber('2.')).toEqual(read(2, 0, 1))
    expect(readNumber('2,')).toEqual(read(2, 0, 1))
  })

  it('takes one separator for the decimal separator, never for a thousand', () => {
    expect(readNumber('1,234')).toEqual(read(1.234, 3, 4))
    expect(readNumber('1.234')).toEqual(read(1.234, 3, 4))
  })

  it('never gives minus zero', () => {
    expect(readNumber('-0.00')).toEqual(read(0, 2, 0))
    expect(Object.is((readNumber('-0') as { value: number }).value, 0)).toBe(true)
  })

  it.each([
    ['', 'empty'],
    ['   ', 'empty'],
    ['1,234.5', 'grouped'],
    ['1.234,5', 'grouped'],
    ['1,234,567', 'grouped'],
    ['1.234.567', 'grouped'],
    ['1 234', 'grouped'],
    ['1\u202F234,5', 'grouped'],
    ['12’345', 'grouped'],
    ['1.2.3', 'two-separators'],
    ['1,2,3', 'two-separators'],
    ['1.2,3', 'two-separators'],
    ['1..2', 'two-separators'],
    ['1e5', 'not-a-number'],
    ['NaN', 'not-a-number'],
    ['Infinity', 'not-a-number'],
    ['0x10', 'not-a-number'],
    ['+5', 'not-a-number'],
    ['--5', 'not-a-number'],
    ['5-', 'not-a-number'],
    ['-', 'not-a-number'],
    ['.', 'not-a-number'],
    ['-,', 'not-a-number'],
    ['5 L', 'not-a-number'],
    ['2 05', 'not-a-number'],
    ['２', 'not-a-number'],
    ['9'.repeat(400), 'not-a-number'],
  ])('asks %j back', (text, reason) => {
    expect(readNumber(text)).toEqual(refused(reason))
  })

  it('reads every number that a pad can produce, with either separator', () => {
    fc.assert(fc.property(fc.nat(99_999), fc.nat(999), fc.constantFrom('.', ','), fc.boolean(), (whole, fraction, separator, negative) => {
      const digits = String(fraction).padStart(3, '0')
      const reading = readNumber(`${negative ? '-' : ''}${whole}${separator}${digits}`)
      expect(reading).toMatchObject({ ok: true, decimals: 3 })
      const size = Number(`${whole}.${digits}`)
      expect((reading as { value: number }).value).toBe(negative && size !== 0 ? -size : size)
    }))
  })

  it('never gives a number that is not finite, whatever is typed', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'0123456789.,-e ') })), (text) => {
      const reading = readNumber(text)
      if (reading.ok) expect(Number.isFinite(reading.value)).toBe(true)
      else expect(['empty', 'not-a-number', 'two-separators', 'grouped']).toContain(reading.reason)
    }))
  })
})
