import type { FindingRule } from './finding-rule'
import { isOutside, readFlows } from './read-flows'
import { flowText } from './words'

/** A mean flow outside the range the method gives. */
export const flowOutsideMethod: FindingRule = {
  code: 'flow-outside-method',
  find(facts) {
    const { method } = facts.bundle
    if (!method) return null
    const { flowMinimumLitresPerMinute: minimum, flowMaximumLitresPerMinute: maximum } = method
    return readFlows(facts).filter(({ litresPerMinute }) => isOutside(litresPerMinute, minimum, maximum)).map(({ litresPerMinute, when, part, subject, pumpId }) => ({
      severity: 'attention', part, subject,
      title: `Flow ${when}${facts.ofPump(pumpId)}, ${flowText(litresPerMinute)}, is outside ${method.code}.`,
      whatNow: when === 'before' ? 'Set the flow within the range and read it again, or give the reason.' : 'Give the reason; the laboratory and the reviewer will ask.',
      numbers: [
        { name: `flow ${when}`, value: litresPerMinute, unit: 'L/min' },
        { name: 'least flow of the method', value: minimum ?? 'not stored', unit: minimum === null ? '' : 'L/min' },
        { name: 'largest flow of the method', value: maximum ?? 'not stored', unit: maximum === null ? '' : 'L/min' },
      ],
      rule: `The flow lies within the method's range${minimum !== null && maximum !== null ? `, ${flowText(minimum)} to ${flowText(maximum)}` : ''}.`,
      source: method.source || method.code,
    }))
  },
}
