import { accuracyPercentAt } from '#shared/domain/indicator-accuracy'
import { indicatedFlow } from '../sheet-workings'
import type { FindingRule } from './finding-rule'
import { flowText } from './words'

/** The maker says nothing about the accuracy of the pump's indicator at this flow. */
export const indicatorAccuracyUnstated: FindingRule = {
  code: 'indicator-accuracy-unstated',
  find(facts) {
    const pump = facts.air === 'pumped' ? facts.pump(facts.pumpId) : null
    const flow = indicatedFlow(facts)
    if (!pump || flow === null || !accuracyPercentAt(pump.accuracy, flow).outside) return null
    return {
      severity: 'note', part: 'air',
      title: `How accurate pump ${pump.serial} shows ${flowText(flow)} is not stated by its maker.`,
      whatNow: 'Make flow checks with a calibrator, or complete the pump\'s record from its papers.',
      numbers: [{ name: 'flow', value: flow, unit: 'L/min' }],
      rule: 'The indicator\'s accuracy holds only for the flows its maker states.',
      source: 'the maker\'s statement, as stored with the pump',
    }
  },
}
