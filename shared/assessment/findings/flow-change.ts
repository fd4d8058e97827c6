import type { FindingRule } from './finding-rule'
import { flowText, percentText } from './words'

/** The flow changed by more than the organisation allows, in percent of the flow before. */
export const flowChange: FindingRule = {
  code: 'flow-change',
  find: facts => facts.flowSettings.flatMap(({ change, startLitresPerMinute, endLitresPerMinute, pumpId, settingId, startFrom, endFrom }) => {
    if (!change || change.verdict === 'within' || startLitresPerMinute === null || endLitresPerMinute === null) return []
    const { flowChangeAttentionPercent, flowChangeStopPercent } = facts.settings
    return [{
      severity: change.verdict, part: endFrom === 'reset' ? 'air' : 'flow-after', subject: settingId === '' ? pumpId : `${pumpId}/${settingId}`,
      title: `Flow${facts.ofPump(pumpId)} ${change.percent < 0 ? 'fell' : 'rose'} by ${percentText(change.percent)}, from ${flowText(startLitresPerMinute)} to ${flowText(endLitresPerMinute)}.`,
      whatNow: change.verdict === 'stop'
        ? 'Read the flow again to be sure. If it stays, hand the sample in as not fit with the reason.'
        : 'Read the flow again to be sure, then give the reason. The lower flow is used.',
      numbers: [
        { name: startFrom === 'reset' ? 'flow set in mid-run' : 'flow before', value: startLitresPerMinute, unit: 'L/min' },
        { name: endFrom === 'reset' ? 'flow found at the reset' : 'flow after', value: endLitresPerMinute, unit: 'L/min' },
        { name: 'change', value: change.percent, unit: '% of before' },
        { name: 'attention beyond', value: flowChangeAttentionPercent, unit: '%' },
        { name: 'stop beyond', value: flowChangeStopPercent, unit: '%' },
      ],
      rule: `(after - before) / before: attention beyond ${flowChangeAttentionPercent} %, stop beyond ${flowChangeStopPercent} %; exactly on a threshold is the milder one.`,
      source: 'common practice; both thresholds are settings of the organisation',
    }]
  }),
}
