import type { FlowSummary } from '../sheet-assessment'
import type { SheetFacts } from '../sheet-facts'
import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE } from './words'

/** Before and after were read with different calibrators: their difference is not the pump's alone. */
export const calibratorDiffers: FindingRule = {
  code: 'calibrator-differs',
  find: facts => [...facts.flows.values()].flatMap(({ pumpId, before, after }) => {
    const first = calibratorIds(before)
    const second = calibratorIds(after)
    if (first.length === 0 || second.length === 0 || (first.length === 1 && second.length === 1 && first[0] === second[0])) return []
    return [{
      severity: 'attention', part: 'flow-after', subject: pumpId,
      title: `Flow before and after${facts.ofPump(pumpId)} were not read with the same calibrator.`,
      whatNow: 'Read the flow after with the calibrator of before, or give the reason.',
      numbers: [
        { name: 'calibrator before', value: serials(facts, first), unit: '' },
        { name: 'calibrator after', value: serials(facts, second), unit: '' },
      ],
      rule: 'One calibrator reads the flow before and after.',
      source: COMMON_PRACTICE,
    }]
  }),
}

function calibratorIds(summary: FlowSummary | null): string[] {
  return [...new Set(summary?.readings.flatMap(reading => reading.data.calibratorId ?? []))]
}

function serials(facts: SheetFacts, ids: readonly string[]): string {
  return ids.map(id => facts.bundle.calibrators[id]?.serial ?? 'not known here').join(', ')
}
