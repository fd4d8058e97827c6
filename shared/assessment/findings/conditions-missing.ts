import { areKnown, readingConditions } from '../conditions'
import type { PumpFlowFacts } from '../pump-flows'
import type { SheetFacts } from '../sheet-facts'
import type { FindingRule } from './finding-rule'

/** A rotameter's flow depends on pressure and temperature, and they are not all noted. */
export const conditionsMissing: FindingRule = {
  code: 'conditions-missing',
  find: facts => facts.timeline.state === 'not-started'
    ? null
    : [...facts.flows.values()].filter(flows => flows.lacksConditions).map(flows => ({
        severity: 'attention', part: 'air', subject: flows.pumpId,
        title: `Temperature and station pressure are missing ${missingWhere(facts, flows).join(', ')}; the rotameter's flow is not corrected.`,
        whatNow: 'Note temperature and station pressure, not the weather service\'s sea-level value, for the calibration and for the sampling.',
        numbers: missingWhere(facts, flows).map(where => ({ name: where, value: 'not noted', unit: '' })),
        rule: 'The flow of a rotameter is corrected by the square root of (calibration pressure × sampling temperature / (sampling pressure × calibration temperature)).',
        source: 'NIOSH Manual of Analytical Methods, 4th edition, chapter D, section 7a(7)',
      })),
}

function missingWhere(facts: SheetFacts, { before, after }: PumpFlowFacts): string[] {
  return [
    ...(before && !areKnown(readingConditions(before.readings)) ? ['at the flow before'] : []),
    ...(areKnown(facts.conditions) ? [] : ['at the sampling']),
    ...(after && !areKnown(readingConditions(after.readings)) ? ['at the flow after'] : []),
  ]
}
