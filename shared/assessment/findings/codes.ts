/** Every code a finding can have. Screens, answers and exports name findings by these. */
export const FINDING_CODES = [
  'flow-before-missing',
] as const
export type FindingCode = (typeof FINDING_CODES)[number]

/** Attention that needs no answer before the sheet is handed in. */
export const NON_BLOCKING_CODES: readonly FindingCode[] = []
