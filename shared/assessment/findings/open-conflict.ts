import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** Two phones set one field without knowing of each other, and nobody has chosen yet. Blocks nothing. */
export const openConflict: FindingRule = {
  code: 'open-conflict',
  find: ({ bundle: { document } }) => document.conflicts.filter(conflict => conflict.isOpen).map(conflict => ({
    severity: 'attention', part: 'set-up', subject: conflict.field,
    title: 'Two phones gave one field different values.',
    whatNow: 'Look at both and choose. Until then the later one is used, and both are kept.',
    numbers: conflict.values.map((value, place) => ({ name: `value ${place + 1}${value.isCurrent ? ', used' : ''}`, value: wordsOf(value.value), unit: '' })),
    rule: 'Both values are kept until a person has looked.',
    source: HOUSE_RULE,
  })),
}

function wordsOf(value: unknown): string | number {
  if (value === null || value === undefined) return 'empty'
  return typeof value === 'string' || typeof value === 'number' ? value : JSON.stringify(value)
}
