import type { FindingRule } from './finding-rule'
import { ENTRY_WORDS, timedEvents } from './timed-events'
import { HOUSE_RULE, timeText } from './words'

/** An entry whose time has not come yet. */
export const eventInFuture: FindingRule = {
  code: 'event-in-future',
  find: facts => timedEvents(facts).filter(({ at }) => at > facts.now + facts.settings.clockOffSeconds * 1000).map(({ event, at }) => ({
    severity: 'attention', part: 'air', subject: event.id,
    title: `A ${ENTRY_WORDS[event.type]} has a time that has not come yet, ${timeText(at, facts.zone)}.`,
    whatNow: 'Compare the phone\'s clock with a good one. Correct the time of the entry.',
    numbers: [{ name: 'time of the entry', value: event.at, unit: '' }, { name: 'looked at', value: facts.nowAt, unit: '' }],
    rule: 'An entry is about something that has happened.',
    source: HOUSE_RULE,
  })),
}
