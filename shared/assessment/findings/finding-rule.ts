import type { Finding } from '../sheet-assessment'
import type { SheetFacts } from '../sheet-facts'
import type { FindingCode } from './codes'

/** What a rule says of a sheet; the gathering adds its code and the answer. */
export type Found = Omit<Finding, 'code' | 'subject' | 'answer'> & { subject?: string }

export interface FindingRule {
  code: FindingCode
  /** Nothing, one or several: then each has a subject of its own. Never throws on what a person may have entered. */
  find: (facts: SheetFacts) => Found | readonly Found[] | null
}
