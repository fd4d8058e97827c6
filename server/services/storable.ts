/** Whether PostgreSQL keeps the text as it is: no NUL in it, no half of a cut emoji. */
export function isStorable(text: string): boolean {
  return !text.includes('\u0000') && text.isWellFormed()
}

/**
 * A JSON value as PostgreSQL can keep it: without the character NUL, and with halves of cut emoji replaced. Everything else
 * stays as it was typed.
 */
export function storable<T>(value: T): T {
  if (typeof value === 'string') return value.replaceAll('\u0000', '').toWellFormed() as T
  if (Array.isArray(value)) return value.map(storable) as T
  if (value !== null && typeof value === 'object') {
    return Object.fromEntries(Object.entries(value).map(([key, item]) => [storable(key), storable(item)])) as T
  }
  return value
}
