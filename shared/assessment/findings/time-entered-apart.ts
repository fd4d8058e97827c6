import type { FindingRule, Found } from './finding-rule'
import { ENTRY_WORDS, timedEvents } from './timed-events'
import { HOUSE_RULE, minutesText, timeText } from './words'

/** From here on an entry was written down at another time than the one it tells of. House rule. */
export const ENTERED_APART_MINUTES = 10

/**
 * An entry that was written down long after, or before, the time it tells of. A correction says why and is none. A start or
 * stop without a reason is asked for one: these two make the volume.
 */
export const timeEnteredApart: FindingRule = {
  code: 'time-entered-apart',
  find: facts => timedEvents(facts).flatMap(({ event, at }): Found[] => {
    const minutes = (Date.parse(event.enteredAt) - Date.parse(event.at)) / 60_000
    if (event.corrects !== null || Number.isNaN(minutes) || Math.abs(minutes) <= ENTERED_APART_MINUTES) return []
    const hasReason = !!event.reason?.trim() || (event.type === 'timer' && !!event.data.reason?.trim())
    return [{
      severity: event.type === 'timer' && !hasReason ? 'attention' : 'note', part: 'air', subject: event.id,
      title: `A ${ENTRY_WORDS[event.type]} for ${timeText(at, facts.zone)} was written down ${minutesText(Math.abs(minutes))} ${minutes > 0 ? 'later' : 'before'}.`,
      whatNow: 'Say where the time comes from: a watch, the pump, a paper.',
      numbers: [{ name: 'time told', value: event.at, unit: '' }, { name: 'written down', value: event.enteredAt, unit: '' }],
      rule: `Entries are written down when they happen; more than ${ENTERED_APART_MINUTES} minutes apart is said.`,
      source: HOUSE_RULE,
    }]
  }),
}
