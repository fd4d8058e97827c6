export interface WorkingInput {
  name: string
  value: number | string
  /** empty for a text or a pure number */
  unit: string
  /** where the value comes from, such as "typed", "the method" or another working's title */
  from?: string
}

/**
 * How a number came about, so that a reviewer or a court can follow it. Numbers are unrounded; the screen rounds for eyes.
 * The result is always computed by calling the real function, never written beside it a second time.
 */
export interface Working {
  title: string
  /** the formula in words */
  formula: string
  inputs: readonly WorkingInput[]
  result: { value: number, unit: string }
  /** document, section and year, or "common practice" */
  source: string
  note?: string
}
