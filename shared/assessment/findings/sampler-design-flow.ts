import { flowChangePercent } from '#shared/domain/deviation'
import { isBeyondPercent } from '#shared/domain/percent'
import type { FindingRule } from './finding-rule'
import { readFlows } from './read-flows'
import { flowText, percentText, sideText } from './words'

const SIZE_SELECTIVE: readonly (string | null)[] = ['respirable', 'thoracic', 'inhalable']

/**
 * A flow away from the design flow of the sampler that is worn: a size-selective one cuts right only at its own flow. The
 * method's window is wider, because it holds for several samplers. For other samplers the design flow is a custom: a note.
 */
export const samplerDesignFlow: FindingRule = {
  code: 'sampler-design-flow',
  find(facts) {
    const { sampler } = facts.bundle
    const design = sampler?.designFlowLitresPerMinute
    if (!sampler || !design) return null
    const { designFlowPercent } = facts.settings
    return readFlows(facts).flatMap(({ litresPerMinute, when, part, subject, pumpId }) => {
      const percent = flowChangePercent(design, litresPerMinute)
      if (!isBeyondPercent(percent, designFlowPercent)) return []
      const isSelective = SIZE_SELECTIVE.includes(sampler.fraction)
      return [{
        severity: isSelective ? 'attention' : 'note', part, subject,
        title: `Flow ${when}${facts.ofPump(pumpId)} is ${percentText(percent)} ${sideText(percent)} the ${flowText(design)} of "${sampler.name}".`,
        whatNow: when === 'before' ? `Set the flow to ${flowText(design)} and read it again, or give the reason.` : 'Give the reason; the fraction that was taken may not be the one the sampler is made for.',
        numbers: [
          { name: `flow ${when}`, value: litresPerMinute, unit: 'L/min' },
          { name: 'design flow', value: design, unit: 'L/min' },
          { name: 'away', value: percent, unit: '%' },
          { name: 'threshold', value: designFlowPercent, unit: '%' },
        ],
        rule: `The flow lies within ${designFlowPercent} % of the design flow of this very sampler; exactly that is within.`,
        source: sampler.source ? `${sampler.source}; common practice for the ${designFlowPercent} %` : 'common practice',
      }]
    })
  },
}
