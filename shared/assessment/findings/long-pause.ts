import type { FindingRule, Found } from './finding-rule'
import { minutesText, SETTINGS_RULE, timeText } from './words'

/** A pause that lasts, or lasted, longer than a break does: the resume may have been forgotten. */
export const longPause: FindingRule = {
  code: 'long-pause',
  find: ({ timeline, zone, now, settings }) => timeline.pauses.flatMap((pause): Found[] => {
    const minutes = ((pause.to ?? now) - pause.from) / 60_000
    if (minutes <= settings.longPauseMinutes) return []
    return [{
      severity: 'attention', part: 'air', subject: pause.eventId,
      title: `${pause.to === null ? 'Paused since' : 'The pause from'} ${timeText(pause.from, zone)}${pause.to === null ? ',' : ' lasted'} ${minutesText(minutes)}.`,
      whatNow: pause.to === null ? 'Look at the pump now. If it draws air again, resume with the time it began.' : 'Correct the resume if it was entered late, or give the reason.',
      numbers: [{ name: 'length', value: minutes, unit: 'min' }, { name: 'threshold', value: settings.longPauseMinutes, unit: 'min' }],
      rule: `A pause over ${settings.longPauseMinutes} minutes is looked at.`,
      source: SETTINGS_RULE,
    }]
  }),
}
