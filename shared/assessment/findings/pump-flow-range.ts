import type { FindingRule } from './finding-rule'
import { isOutside, readFlows } from './read-flows'
import { flowText } from './words'

/** A flow the pump is not made for. */
export const pumpFlowRange: FindingRule = {
  code: 'pump-flow-range',
  find: facts => readFlows(facts).flatMap(({ summary, when, part, subject, pumpId }) => {
    const pump = facts.pump(pumpId)
    const flow = summary.meanLitresPerMinute
    if (!pump || !isOutside(flow, pump.flowMinimumLitresPerMinute, pump.flowMaximumLitresPerMinute)) return []
    return [{
      severity: 'attention', part, subject,
      title: `Flow ${when}, ${flowText(flow)}, is outside what pump ${pump.serial} is made for.`,
      whatNow: 'Take a pump made for this flow, or give the reason.',
      numbers: [
        { name: `flow ${when}`, value: flow, unit: 'L/min' },
        { name: 'least flow of the pump', value: pump.flowMinimumLitresPerMinute, unit: 'L/min' },
        { name: 'largest flow of the pump', value: pump.flowMaximumLitresPerMinute, unit: 'L/min' },
      ],
      rule: `The pump holds its flow from ${flowText(pump.flowMinimumLitresPerMinute)} to ${flowText(pump.flowMaximumLitresPerMinute)}.`,
      source: 'the maker\'s statement, as stored with the pump',
    }]
  }),
}
