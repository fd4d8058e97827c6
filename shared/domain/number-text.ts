export const NUMBER_TEXT_REASONS = ['empty', 'not-a-number', 'two-separators', 'grouped'] as const
export type NumberTextReason = typeof NUMBER_TEXT_REASONS[number]

export type NumberReading
  = | {
    ok: true
    value: number
    /** digits after the decimal separator, as typed */
    decimals: number
    /** digits from the first one that is not zero, as typed; 0 for zero itself */
    significant: number
  }
  | { ok: false, reason: NumberTextReason }

/**
 * Number as a person types it on a phone whose keyboard shows a comma or a point.
 *
 * One separator is always the decimal separator: `1,234` is one and a bit, never a thousand. Where a text could only be read
 * by guessing (two separators, groups of thousands) it is asked back with the reason, because a guess that is wrong by a
 * factor of 1000 looks like a reading. `1e5`, `5 L` and `Infinity` are no readings at all.
 *
 * @param text what was typed, any text
 * @returns the finite number with its decimals and significant digits, or why it could not be read
 * @source ISO 80000-1:2022, 7.3 (comma or point on the line; groups are set apart by a space, never by a point or a comma)
 * @example readNumber('2,05') // { ok: true, value: 2.05, decimals: 2, significant: 3 }
 */
export function readNumber(text: string): NumberReading {
  const trimmed = text.trim().replace(/^\u2212/, '-')
  if (trimmed === '') return { ok: false, reason: 'empty' }
  const plain = /^(-?)(\d*)(?:[.,](\d*))?$/.exec(trimmed)
  if (!plain) return { ok: false, reason: whyNot(trimmed) }
  const [, sign = '', whole = '', fraction = ''] = plain
  if (whole === '' && fraction === '') return { ok: false, reason: 'not-a-number' }
  const size = Number(`${whole || '0'}.${fraction || '0'}`)
  // Hundreds of digits overflow to infinity, which is no reading.
  if (!Number.isFinite(size)) return { ok: false, reason: 'not-a-number' }
  return {
    ok: true,
    // Not `-size` for zero: minus zero would print as "-0" in an export.
    value: sign === '-' && size !== 0 ? -size : size,
    decimals: fraction.length,
    significant: (whole + fraction).replace(/^0+/, '').length,
  }
}

function whyNot(text: string): NumberTextReason {
  if (/^-?\d{1,3}(?:([.,\s'’])\d{3})(?:\1\d{3})*(?:[.,]\d*)?$/.test(text)) return 'grouped'
  if (/^-?[\d.,]+$/.test(text)) return 'two-separators'
  return 'not-a-number'
}
