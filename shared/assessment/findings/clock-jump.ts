import { fixed } from '#shared/domain/rounding'
import type { FindingRule } from './finding-rule'
import { HOUSE_RULE, timeText } from './words'

/** The phone's clock was moved while the page was open: times before and after are not of one clock. */
export const clockJump: FindingRule = {
  code: 'clock-jump',
  find: facts => facts.events.of('clock-jump').map(({ event, at }) => {
    const seconds = (event.data.wallMilliseconds - event.data.monotonicMilliseconds) / 1000
    return {
      severity: Math.abs(seconds) > facts.settings.clockOffSeconds ? 'attention' : 'note', part: 'air', subject: event.id,
      title: `The phone's clock went ${seconds < 0 ? 'back' : 'forward'} by ${fixed(Math.abs(seconds), 0)} s at ${timeText(at, facts.zone)}.`,
      whatNow: 'Compare the times on the sheet with a watch. Correct those that are wrong; the first values stay.',
      numbers: [
        { name: 'by the clock', value: event.data.wallMilliseconds / 1000, unit: 's' },
        { name: 'really passed', value: event.data.monotonicMilliseconds / 1000, unit: 's' },
        { name: 'moved', value: seconds, unit: 's' },
        { name: 'threshold', value: facts.settings.clockOffSeconds, unit: 's' },
      ],
      rule: 'Raw times are never rewritten; a jump of the clock is said.',
      source: HOUSE_RULE,
    }
  }),
}
