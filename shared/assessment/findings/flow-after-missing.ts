import { EDITABLE_STATES } from '#shared/records/sheet-state'
import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE } from './words'

/** Handed in without flow after. While the sheet is still on the phone this is a gap. */
export const flowAfterMissing: FindingRule = {
  code: 'flow-after-missing',
  find({ air, timeline, pumpsInUse, flows, ofPump, bundle }) {
    if (air !== 'pumped' || timeline.state !== 'stopped' || EDITABLE_STATES.includes(bundle.document.standing.state)) return null
    return pumpsInUse.filter(pumpId => !flows.get(pumpId)?.after).map(pumpId => ({
      severity: 'stop', part: 'flow-after', subject: pumpId,
      title: `No flow after was read${ofPump(pumpId)}.`,
      whatNow: 'Return it to the technician if the reading was made and not entered. Otherwise the sample cannot be used as fit.',
      numbers: [{ name: 'readings after', value: 0, unit: '' }],
      rule: 'The flow is read again after sampling, on the same day and before charging.',
      source: COMMON_PRACTICE,
    }))
  },
}
