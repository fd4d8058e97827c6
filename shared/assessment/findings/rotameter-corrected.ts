import type { FindingRule } from './finding-rule'
import { flowText } from './words'

/** A rotameter's flow was brought to the conditions of sampling: said, because the number differs from what was typed. */
export const rotameterCorrected: FindingRule = {
  code: 'rotameter-corrected',
  find: facts => [...facts.flows.values()].flatMap(({ pumpId, before, beforeLitresPerMinute, calibration, sampling }) => {
    if (!before || beforeLitresPerMinute === null || !calibration || !sampling || beforeLitresPerMinute === before.meanLitresPerMinute) return []
    return [{
      severity: 'note', part: 'flow-before', subject: pumpId,
      title: `The rotameter's ${flowText(before.meanLitresPerMinute)} is ${flowText(beforeLitresPerMinute)} at the conditions of sampling.`,
      whatNow: 'Nothing to do. The working shows the correction.',
      numbers: [
        { name: 'mean as read', value: before.meanLitresPerMinute, unit: 'L/min' },
        { name: 'at the conditions of sampling', value: beforeLitresPerMinute, unit: 'L/min' },
        { name: 'calibration pressure', value: calibration.stationPressureKilopascals, unit: 'kPa' },
        { name: 'sampling pressure', value: sampling.stationPressureKilopascals, unit: 'kPa' },
      ],
      rule: 'Only a pump whose flow is set by a rotameter is corrected; an electronic one never is.',
      source: 'NIOSH Manual of Analytical Methods, 4th edition, chapter D, section 7a(7)',
    }]
  }),
}
