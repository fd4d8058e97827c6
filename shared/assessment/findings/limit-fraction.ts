import type { FindingRule, Found } from './finding-rule'

/** The sampler takes another fraction than any stored limit of the substance is meant for. */
export const limitFraction: FindingRule = {
  code: 'limit-fraction',
  find({ bundle: { agents, limits, sampler } }) {
    const taken = sampler?.fraction
    if (!taken) return null
    return agents.flatMap((agent): Found[] => {
      const fractions = [...new Set(limits.filter(limit => limit.agentId === agent.id).map(limit => limit.fraction.trim().toLowerCase()))]
      if (fractions.length === 0 || fractions.includes('') || fractions.includes(taken)) return []
      return [{
        severity: 'note', part: 'set-up', subject: agent.id,
        title: `The sampler takes the ${taken} fraction; limits of ${agent.name} are for ${fractions.join(', ')}.`,
        whatNow: 'Choose the sampler that fits the limit, or compare with a limit for this fraction.',
        numbers: [{ name: 'fraction taken', value: taken, unit: '' }, { name: 'fraction of the limits', value: fractions.join(', '), unit: '' }],
        rule: 'A sample is compared only with a limit for the same fraction.',
        source: 'definition of the limit; EN 481 for the fractions, from memory',
      }]
    })
  },
}
