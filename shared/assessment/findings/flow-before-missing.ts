import type { FindingRule } from './finding-rule'
import { NMAM_D } from './words'

/** A pump drew air and nobody read its flow before: from the start on that is more than a gap. */
export const flowBeforeMissing: FindingRule = {
  code: 'flow-before-missing',
  find({ air, timeline, pumpsInUse, flows, hasSetting, ofPump }) {
    if (air !== 'pumped' || timeline.state === 'not-started') return null
    return pumpsInUse.filter(pumpId => !flows.get(pumpId)?.before && !hasSetting(pumpId)).map(pumpId => ({
      severity: 'stop', part: 'flow-before', subject: pumpId,
      title: `Air is drawn and no flow before was read${ofPump(pumpId)}.`,
      whatNow: 'If the flow was read, enter it with the time it was read. If not, read it now as a flow check and say so in the reason.',
      numbers: [{ name: 'readings before', value: 0, unit: '' }],
      rule: 'The flow of each pump is read with the sampler in line before it draws air.',
      source: NMAM_D,
    }))
  },
}
