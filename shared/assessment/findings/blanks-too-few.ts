import { blanksNeeded, COMMON_BLANKS_RULE } from '#shared/domain/planning'
import type { Method } from '#shared/records/method'
import { isSample } from '../sample-kind'
import type { FindingRule } from './finding-rule'

/** Too few field blanks for the set: the samples of this survey by this method. Due once the sample is stopped. */
export const blanksTooFew: FindingRule = {
  code: 'blanks-too-few',
  find({ sheet, bundle: { method, siblings }, timeline }) {
    if (!method || !isSample(sheet.kind) || timeline.state !== 'stopped') return null
    const set = siblings.filter(sibling => sibling.methodId === method.id && sibling.state !== 'void')
    const samples = 1 + set.filter(sibling => isSample(sibling.kind)).length
    const blanks = set.filter(sibling => sibling.kind === 'field-blank').length
    const rule = blanksRuleOf(method)
    const needed = blanksNeeded(samples, rule)
    if (blanks >= needed) return null
    return {
      severity: 'attention', part: 'close',
      title: `${blanks} of ${needed} field blanks for the ${samples} ${samples === 1 ? 'sample' : 'samples'} by ${method.code}.`,
      whatNow: 'Open and cap the missing blanks now, beside the samples and from the same lot, or give the reason.',
      numbers: [
        { name: 'field blanks', value: blanks, unit: '' }, { name: 'field blanks needed', value: needed, unit: '' }, { name: 'samples in the set', value: samples, unit: '' },
        { name: 'share', value: rule.percent, unit: '% of the samples' },
      ],
      rule: method.blanksAsPrinted
        ? `${method.code}: ${method.blanksAsPrinted}. Taken as ${rule.percent} %, from ${rule.minimum} to ${rule.maximum}.`
        : `${rule.percent} % of the samples, at least ${rule.minimum}, at most ${rule.maximum} in a set.`,
      source: 'NIOSH Manual of Analytical Methods: 2 to 10 field blanks per set (0600, 7300), 10 % (1501); joined by common practice',
    }
  },
}

/** What the method leaves open is filled by common practice. */
export function blanksRuleOf(method: Pick<Method, 'blanksMinimum' | 'blanksPercent' | 'blanksMaximum'>) {
  const minimum = method.blanksMinimum ?? COMMON_BLANKS_RULE.minimum
  return {
    minimum,
    percent: method.blanksPercent ?? COMMON_BLANKS_RULE.percent,
    maximum: Math.max(minimum, method.blanksMaximum ?? COMMON_BLANKS_RULE.maximum ?? minimum),
  }
}
