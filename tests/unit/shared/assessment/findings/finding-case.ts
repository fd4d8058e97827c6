import type { Severity } from '#shared/assessment/sheet-assessment'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { clock } from '../../../../fixtures/builders'

/** A situation in which a finding stands, and the nearest one in which it does not. */
export interface FindingCase {
  /** What is wrong, as the end of a sentence: "finds ...". */
  finds: string
  severity: Severity
  in: () => SheetBundle
  /** What is right, as the end of a sentence: "lets ... pass". */
  passes: string
  not: () => SheetBundle
  /** Looked at; 18:00 on the day when left out. */
  at?: string
  notAt?: string
}

export const EVENING = clock('18:00')
