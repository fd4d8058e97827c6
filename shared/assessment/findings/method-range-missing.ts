import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** The method's flow or volume is stored without bounds: the check against them cannot be made. */
export const methodRangeMissing: FindingRule = {
  code: 'method-range-missing',
  find({ air, bundle: { method }, range }) {
    if (!method || air === 'none') return null
    const missing = [
      ...(air === 'pumped' && method.flowMinimumLitresPerMinute === null && method.flowMaximumLitresPerMinute === null ? ['flow'] : []),
      ...(range.minimumLitres === null ? ['minimum volume'] : []),
      ...(range.maximumLitres === null ? ['maximum volume'] : []),
    ]
    if (missing.length === 0) return null
    return {
      severity: 'note', part: 'set-up',
      title: `No ${missing.join(', ')} is stored for ${method.code}: not checked.`,
      whatNow: 'Look it up in the method as published, or ask the laboratory.',
      numbers: missing.map(name => ({ name, value: 'not stored', unit: '' })),
      rule: 'An empty bound is said, never passed in silence.',
      source: HOUSE_RULE,
    }
  },
}
