import { fixed } from '#shared/domain/rounding'
import type { FindingRule, Found } from './finding-rule'
import { timedEvents } from './timed-events'

/** The clock of a phone that wrote on the sheet was off from the server's. */
export const clockOff: FindingRule = {
  code: 'clock-off',
  find(facts) {
    const worst = new Map<string, number>()
    for (const { event } of timedEvents(facts)) {
      const offset = event.clockOffsetMilliseconds
      if (offset !== null && Math.abs(offset) > Math.abs(worst.get(event.dev) ?? 0)) worst.set(event.dev, offset)
    }
    return [...worst].flatMap(([dev, offset]): Found[] => {
      const seconds = offset / 1000
      if (Math.abs(seconds) <= facts.settings.clockOffSeconds) return []
      return [{
        severity: 'attention', part: 'air', subject: dev,
        title: `The clock of a phone was ${fixed(Math.abs(seconds), 0)} s ${seconds < 0 ? 'ahead' : 'behind'}.`,
        whatNow: facts.events.phones.size > 1
          ? 'Nothing is rewritten. Differences between the phones are computed on the server\'s clock; compare the times with a watch.'
          : 'Nothing is rewritten. The minutes are right, because one clock made them; the times of day are off by this much.',
        numbers: [{ name: 'server minus phone', value: seconds, unit: 's' }, { name: 'threshold', value: facts.settings.clockOffSeconds, unit: 's' }],
        rule: `A phone's clock is within ${facts.settings.clockOffSeconds} s of the server's.`,
        source: 'house rule; the threshold is a setting of the organisation',
      }]
    })
  },
}
