import type { FindingRule } from './finding-rule'
import { flowText, HOUSE_RULE } from './words'

/** The sampler's design flow was not read from its publication yet. */
export const samplerFromMemory: FindingRule = {
  code: 'sampler-from-memory',
  find({ air, bundle: { sampler } }) {
    if (air !== 'pumped' || sampler?.status !== 'memory' || sampler.designFlowLitresPerMinute === null) return null
    return {
      severity: 'note', part: 'set-up',
      title: `The design flow of "${sampler.name}", ${flowText(sampler.designFlowLitresPerMinute)}, is not confirmed.`,
      whatNow: 'Read the sampler\'s own instructions, then confirm or correct its row.',
      numbers: [{ name: 'design flow', value: sampler.designFlowLitresPerMinute, unit: 'L/min' }],
      rule: 'A value from memory is shown as such until a person has read the source.',
      source: HOUSE_RULE,
    }
  },
}
