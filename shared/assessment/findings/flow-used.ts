import { flowRuleInWords } from '../flow-segments'
import type { FindingRule } from './finding-rule'
import { flowText } from './words'

const RULES = { 'mean': 'the mean', 'lower': 'the lower flow', 'nominal': 'the nominal flow', 'before-only': 'the flow before', 'after-only': 'the flow after' }

/** Which flow the volume is computed with, and why: said once the sample is stopped, for each segment. */
export const flowUsedNote: FindingRule = {
  code: 'flow-used',
  find: ({ timeline, segments, ofPump, settings }) => timeline.state !== 'stopped'
    ? null
    : segments.flatMap(({ used, choice, pumpId, settingId }, place) => {
        if (!used) return []
        return [{
          severity: 'note', part: 'flow-after', subject: segments.length === 1 ? '' : `${place}/${pumpId ?? ''}/${settingId}`,
          title: `Computed with ${RULES[used.rule]}${ofPump(pumpId)}, ${flowText(used.litresPerMinute)}. ${flowRuleInWords(choice) ?? ''}`.trim(),
          whatNow: 'Nothing to do. The working shows how it was chosen.',
          numbers: [{ name: 'flow used', value: used.litresPerMinute, unit: 'L/min' }],
          rule: `The mean of before and after; the lower beyond ${settings.flowChangeAttentionPercent} %; the nominal one where the method says so.`,
          source: used.rule === 'nominal' ? 'NIOSH Manual of Analytical Methods, method 0600' : 'common practice',
        }]
      }),
}
