import type { FindingRule } from './finding-rule'
import { flowText, percentText, SETTINGS_RULE, sideText, timeText } from './words'

/** A flow check found the flow away from the one that was set. */
export const flowCheckAway: FindingRule = {
  code: 'flow-check-away',
  find: facts => facts.checks.flatMap(({ event, percent, verdict, litresPerMinute, setLitresPerMinute }) => {
    if (percent === null || litresPerMinute === null || setLitresPerMinute === null || verdict === null || verdict === 'within') return []
    const { flowCheckAttentionPercent, flowCheckStopPercent } = facts.settings
    return [{
      severity: verdict, part: 'air', subject: event.id,
      title: `At ${timeText(Date.parse(event.at), facts.zone)} the flow was ${percentText(percent)} ${sideText(percent)} the ${flowText(setLitresPerMinute)} that was set.`,
      whatNow: 'Look at tubing, inlet and load. Set the flow anew and note it as a reset, or change the medium. Then give the reason.',
      numbers: [
        { name: 'flow found', value: litresPerMinute, unit: 'L/min' },
        { name: 'flow set', value: setLitresPerMinute, unit: 'L/min' },
        { name: 'away', value: percent, unit: '% of the flow set' },
        { name: 'attention beyond', value: flowCheckAttentionPercent, unit: '%' },
        { name: 'stop beyond', value: flowCheckStopPercent, unit: '%' },
      ],
      rule: `A flow check lies within ${flowCheckAttentionPercent} % of the flow that was set; beyond ${flowCheckStopPercent} % it stops; exactly on a threshold is the milder one.`,
      source: SETTINGS_RULE,
    }]
  }),
}
