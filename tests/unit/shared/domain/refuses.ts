import { expect } from 'vitest'

/**
 * Impossible input stops with a RangeError whose sentence names the function and the value. Every number is also tried as
 * NaN and as both infinities, because those are what a mistake in a program produces.
 */
export function expectRefused(functionName: string, run: (value: number) => unknown, values: readonly number[]): void {
  for (const value of [...values, NaN, Infinity, -Infinity]) {
    expect(() => run(value), `${functionName} took ${value}`).toThrow(RangeError)
    expect(() => run(value)).toThrow(new RegExp(`^${functionName}: .+ must be .+, got `))
  }
}
