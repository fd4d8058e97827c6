import type { SheetEvent } from '#shared/records/sheet-event'
import type { FindingRule } from './finding-rule'
import { HOUSE_RULE, timeText } from './words'

/** The first stop ends the run; what the timer says later stays on record and is not computed with. */
export const timerAfterStop: FindingRule = {
  code: 'timer-after-stop',
  find: ({ timeline, zone }) => timeline.irregular.filter(({ what }) => what === 'after-stop').map(({ placed: { event, at } }) => ({
    severity: 'attention', part: 'air', subject: event.id,
    title: `${eventWord(event)} at ${timeText(at, zone)} stands after the stop and does not count.`,
    whatNow: 'If the stop was a mistake, correct its time or take it back. If not, take this one back with its reason.',
    numbers: [{ name: 'time', value: event.at, unit: '' }],
    rule: 'The first stop ends the run.',
    source: HOUSE_RULE,
  })),
}

export function eventWord(event: SheetEvent): string {
  if (event.type === 'timer') return { start: 'A start', pause: 'A pause', resume: 'A resume', stop: 'A stop' }[event.data.action]
  return event.type === 'pump-swap' ? 'A pump swap' : 'A flow reset'
}
