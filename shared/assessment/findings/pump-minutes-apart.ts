import { instantText } from '#shared/domain/instant'
import { drawnMinutesUntil } from '../run-timeline'
import type { FindingRule, Found } from './finding-rule'
import { minutesText, SETTINGS_RULE, timeText } from './words'

/**
 * The pump's own minutes against the sheet's, at the instant of each check: a pump that stopped by itself, or a pause that
 * nobody wrote down. Said where the two first part, and again only where they part further since the check before, so that a
 * counter that was not set to zero raises one finding and not one at every check.
 */
export const pumpMinutesApart: FindingRule = {
  code: 'pump-minutes-apart',
  find(facts) {
    const threshold = facts.settings.pumpMinutesApart
    const apartBefore = new Map<string, number>()
    return facts.events.of('flow-check').flatMap(({ event, at }): Found[] => {
      const { pumpId, pumpMinutes } = event.data
      if (facts.air !== 'pumped' || pumpMinutes === null || !facts.pump(pumpId)?.hasElapsedTimer) return []
      const sheetMinutes = drawnMinutesUntil(facts.timeline, at, pumpId)
      const apart = pumpMinutes - sheetMinutes
      const before = apartBefore.get(pumpId) ?? 0
      apartBefore.set(pumpId, apart)
      const isFirst = Math.abs(apart) > threshold && Math.abs(before) <= threshold
      if (!isFirst && Math.abs(apart - before) <= threshold) return []
      return [{
        severity: 'attention', part: 'air', subject: event.id,
        title: `At ${timeText(at, facts.zone)} the pump had run ${minutesText(pumpMinutes)}, the sheet ${minutesText(sheetMinutes)}.`,
        whatNow: apart < 0 ? 'Did the pump stop by itself? Note the fault with its time, or correct the timer.' : 'Was the timer started late, paused too long, or the pump\'s counter not set to zero? Correct the timer or give the reason.',
        numbers: [
          { name: 'minutes of the pump', value: pumpMinutes, unit: 'min' },
          { name: `minutes of the sheet until ${instantText(at)}`, value: sheetMinutes, unit: 'min' },
          { name: 'apart', value: apart, unit: 'min' },
          { name: 'apart since the check before', value: apart - before, unit: 'min' },
          { name: 'threshold', value: threshold, unit: 'min' },
        ],
        rule: `The pump's own minutes and the sheet's are not more than ${threshold} minutes apart.`,
        source: SETTINGS_RULE,
      }]
    })
  },
}
