import { isSample } from '../sample-kind'
import type { FindingRule, Found } from './finding-rule'
import { OVERLAP_TOLERANCE_MINUTES, overlapMinutes } from './overlap'
import { COMMON_PRACTICE, minutesText } from './words'

/** One person wears two trains for one substance: allowed, said, because both results are of the same exposure. */
export const twoTrainsOneAgent: FindingRule = {
  code: 'two-trains-one-agent',
  find: ({ sheet, bundle, spans, now }) => sheet.kind !== 'personal' || sheet.workerId === null
    ? null
    : bundle.siblings.flatMap((sibling): Found[] => {
        if (sibling.state === 'void' || sibling.workerId !== sheet.workerId || !isSample(sibling.kind)) return []
        const shared = bundle.agents.filter(agent => sheet.agentIds.includes(agent.id) && sibling.agentIds.includes(agent.id))
        const minutes = shared.length === 0 ? 0 : overlapMinutes(spans, sibling.spans, now)
        if (minutes <= OVERLAP_TOLERANCE_MINUTES) return []
        return [{
          severity: 'note', part: 'set-up', subject: sibling.id,
          title: `The same person also wore sheet ${sibling.number ?? 'without a number'} for ${shared.map(agent => agent.name).join(', ')}, ${minutesText(minutes)} at once.`,
          whatNow: 'Nothing to do if it is meant so. The two results are not added.',
          numbers: [{ name: 'minutes at once', value: minutes, unit: 'min' }, { name: 'other sheet', value: sibling.number ?? '', unit: '' }],
          rule: 'Two samples of one person, one time and one substance are one exposure.',
          source: COMMON_PRACTICE,
        }]
      }),
}
