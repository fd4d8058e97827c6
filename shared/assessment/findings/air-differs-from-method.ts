import type { FindingRule } from './finding-rule'

const WORDS = { pumped: 'a pump', diffusive: 'a diffusive sampler', none: 'no air' }

/** The sheet draws air in another way than its method. */
export const airDiffersFromMethod: FindingRule = {
  code: 'air-differs-from-method',
  find({ air, bundle: { method } }) {
    if (!method || air === 'none' || method.air === air) return null
    return {
      severity: 'attention', part: 'set-up',
      title: `Method ${method.code} is for ${WORDS[method.air]}, this sheet for ${WORDS[air]}.`,
      whatNow: 'Choose the method that fits, or give the reason.',
      numbers: [{ name: 'method', value: method.air, unit: '' }, { name: 'sheet', value: air, unit: '' }],
      rule: 'The sample is taken in the way its method describes.',
      source: method.source || method.code,
    }
  },
}
