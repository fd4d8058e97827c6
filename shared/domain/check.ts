/**
 * Guards for impossible input. A wrong number that reaches a formula is a mistake in the program, so it stops with a sentence
 * that names the function, the value and the range. What is merely missing or unusual in the field is never treated this way.
 */

/** @throws RangeError when the value is NaN or infinite */
export function requireFinite(where: string, name: string, value: number): void {
  if (!Number.isFinite(value)) refuse(where, name, 'a finite number', value)
}

/** @throws RangeError when the value is not finite or not above the bound */
export function requireAbove(where: string, name: string, value: number, bound: number): void {
  if (!Number.isFinite(value) || value <= bound) refuse(where, name, `above ${bound}`, value)
}

/** @throws RangeError when the value is not finite or below the bound */
export function requireAtLeast(where: string, name: string, value: number, bound: number): void {
  if (!Number.isFinite(value) || value < bound) refuse(where, name, `${bound} or more`, value)
}

/** @throws RangeError when the value is not finite or outside the two bounds, which themselves are allowed */
export function requireBetween(where: string, name: string, value: number, low: number, high: number): void {
  if (!Number.isFinite(value) || value < low || value > high) refuse(where, name, `from ${low} to ${high}`, value)
}

/** @throws RangeError when the value is not a whole number or below the bound */
export function requireWhole(where: string, name: string, value: number, bound: number): void {
  if (!Number.isInteger(value) || value < bound) refuse(where, name, `a whole number, ${bound} or more`, value)
}

/** @throws RangeError when the list holds nothing */
export function requireSome(where: string, name: string, list: readonly unknown[]): void {
  if (list.length === 0) throw new RangeError(`${where}: ${name} must hold at least one value, got none`)
}

/** @throws RangeError always */
export function refuse(where: string, name: string, range: string, value: number | string): never {
  throw new RangeError(`${where}: ${name} must be ${range}, got ${value}`)
}
