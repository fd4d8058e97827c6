import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** The stored method was not read from its publication yet. */
export const methodFromMemory: FindingRule = {
  code: 'method-from-memory',
  find({ bundle: { method }, range }) {
    if (!method || (method.status !== 'memory' && range.status !== 'memory')) return null
    return {
      severity: 'note', part: 'set-up',
      title: `What is stored of ${method.code} is not confirmed.`,
      whatNow: 'Read the method as published, confirm its row or correct it. Ask the laboratory.',
      numbers: [{ name: 'how far the row can be trusted', value: 'from memory', unit: '' }],
      rule: 'A value from memory is shown as such until a person has read the source.',
      source: HOUSE_RULE,
    }
  },
}
