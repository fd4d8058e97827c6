import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, timeText } from './words'

/** A pause that does not say why. */
export const pauseWithoutReason: FindingRule = {
  code: 'pause-without-reason',
  find: ({ timeline, zone }) => timeline.pauses.filter(pause => !pause.reason?.trim()).map(pause => ({
    severity: 'attention', part: 'air', subject: pause.eventId,
    title: `The pause at ${timeText(pause.from, zone)} has no reason.`,
    whatNow: 'Say why no air was drawn: a break, the worker left the area, a fault.',
    numbers: pause.to === null ? [] : [{ name: 'length', value: (pause.to - pause.from) / 60_000, unit: 'min' }],
    rule: 'Time without air is logged with its reason.',
    source: COMMON_PRACTICE,
  })),
}
