import { deviationsPercent } from '#shared/domain/calibration'
import { isBeyondPercent } from '#shared/domain/percent'
import type { FindingRule, Found } from './finding-rule'
import { readFlows } from './read-flows'
import { flowText, percentText, SETTINGS_RULE, sideText } from './words'

/** One reading lies away from the mean of its set. */
export const readingAway: FindingRule = {
  code: 'reading-away',
  find: facts => readFlows(facts).flatMap(({ summary, when, part }): Found[] => {
    const deviations = deviationsPercent(summary.readings.map(reading => reading.data.litresPerMinute))
    return summary.readings.flatMap((reading, place): Found[] => {
      const deviation = deviations[place] ?? 0
      if (!isBeyondPercent(deviation, facts.settings.readingAwayPercent)) return []
      return [{
        severity: 'attention', part, subject: reading.id,
        title: `Reading ${flowText(reading.data.litresPerMinute)} ${when} is ${percentText(deviation)} ${sideText(deviation)} the mean.`,
        whatNow: 'Wait until the flow is steady and read again. Take the wrong reading back with its reason.',
        numbers: [
          { name: 'reading', value: reading.data.litresPerMinute, unit: 'L/min' },
          { name: 'mean', value: summary.meanLitresPerMinute, unit: 'L/min' },
          { name: 'away from the mean', value: deviation, unit: '%' },
          { name: 'threshold', value: facts.settings.readingAwayPercent, unit: '%' },
        ],
        rule: `Each reading lies within ${facts.settings.readingAwayPercent} % of the mean; exactly that is within.`,
        source: SETTINGS_RULE,
      }]
    })
  }),
}
