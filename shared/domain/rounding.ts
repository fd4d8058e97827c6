import { requireFinite, requireWhole } from './check'

/**
 * One rule for every rounded number that people see: half away from zero, on the number's decimal text.
 *
 * Working on the text means what is printed can be checked by hand. The number 1.005 is a little below that in binary, and
 * rounding the binary would print 1.00, which looks wrong beside a reading typed as 1.005. These functions return text and
 * are for eyes only: nothing is ever computed with their result.
 */

/** A number as its digits and where the point stands: 0.00123 is digits [1, 2, 3] with point -2 (0.123 × 10^-2). */
interface Decimal {
  negative: boolean
  digits: number[]
  point: number
}

/**
 * A number with a fixed count of decimals.
 *
 * @param value any finite number
 * @param decimals digits after the point, 0 or more, whole
 * @returns text with a point as separator, never with an exponent, never "-0"
 * @throws RangeError when the value is not finite or decimals is not a whole number, 0 or more
 * @source ISO 80000-1:2009, annex B, rule B (half rounds to the larger magnitude; the clause from memory)
 * @example fixed(1.005, 2) // '1.01'
 */
export function fixed(value: number, decimals: number): string {
  requireFinite('fixed', 'value', value)
  requireWhole('fixed', 'decimals', decimals, 0)
  const decimal = decimalOf(value)
  return written(roundedTo(decimal, decimal.point + decimals), decimals)
}

/**
 * A number with a count of significant figures. Zeros that keep the size of a large number stand where they must: 123456 to
 * three figures is 123000. Zero has no significant figure and is written 0.
 *
 * @param value any finite number
 * @param figures significant figures, 1 or more, whole
 * @returns text with a point as separator, never with an exponent, never "-0"
 * @throws RangeError when the value is not finite or figures is not a whole number, 1 or more
 * @source ISO 80000-1:2009, annex B, rule B (half rounds to the larger magnitude; the clause from memory)
 * @example significant(9.996, 3) // '10.0'
 */
export function significant(value: number, figures: number): string {
  requireFinite('significant', 'value', value)
  requireWhole('significant', 'figures', figures, 1)
  if (value === 0) return '0'
  const rounded = roundedTo(decimalOf(value), figures)
  return written(rounded, Math.max(0, figures - rounded.point))
}

function decimalOf(value: number): Decimal {
  // The shortest text that reads back as the same number, so the digits a person typed are the digits that are rounded.
  const [mantissa = '', exponent = '0'] = Math.abs(value).toString().split('e')
  const [whole = '', fraction = ''] = mantissa.split('.')
  const leading = /^0*/.exec(whole + fraction)?.[0].length ?? 0
  const digits = [...(whole + fraction)].slice(leading).map(Number)
  return { negative: value < 0, digits, point: whole.length + Number(exponent) - leading }
}

/** Keeps the first `count` digits, which may be none or fewer than none. */
function roundedTo({ negative, digits, point }: Decimal, count: number): Decimal {
  if (count >= digits.length) return { negative, digits, point }
  if (count < 0) return { negative, digits: [], point }
  const kept = digits.slice(0, count)
  if ((digits[count] ?? 0) < 5) return { negative, digits: kept, point }
  return carried(negative, kept, point)
}

function carried(negative: boolean, kept: number[], point: number): Decimal {
  const digits = [...kept]
  let place = digits.length - 1
  while (place >= 0 && digits[place] === 9) {
    digits[place] = 0
    place -= 1
  }
  if (place < 0) return { negative, digits: [1, ...digits], point: point + 1 }
  digits[place] = (digits[place] ?? 0) + 1
  return { negative, digits, point }
}

function written({ negative, digits, point }: Decimal, decimals: number): string {
  const digitAt = (place: number) => digits[place] ?? 0
  let whole = ''
  for (let place = Math.min(0, point - 1); place < point; place += 1) whole += place < 0 ? 0 : digitAt(place)
  let fraction = ''
  for (let place = point; place < point + decimals; place += 1) fraction += place < 0 ? 0 : digitAt(place)
  const sign = negative && digits.some(digit => digit > 0) ? '-' : ''
  const text = whole.replace(/^0+(?=\d)/, '') || '0'
  return decimals === 0 ? `${sign}${text}` : `${sign}${text}.${fraction}`
}
