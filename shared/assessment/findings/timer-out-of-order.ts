import type { Irregularity } from '../run-timeline'
import type { FindingRule, Found } from './finding-rule'
import { eventWord } from './timer-after-stop'
import { HOUSE_RULE, timeText } from './words'

const WHY: Partial<Record<Irregularity, string>> = {
  'start-again': 'comes when the sheet was started already',
  'pause-while-paused': 'comes when the sheet was paused already',
  'resume-without-pause': 'comes without a pause',
  'before-start': 'stands before the start',
}

/** Timer events that do not follow each other. They stay on record and change nothing. */
export const timerOutOfOrder: FindingRule = {
  code: 'timer-out-of-order',
  find: ({ timeline, zone }) => timeline.irregular.flatMap(({ what, placed: { event, at } }): Found[] => {
    const why = WHY[what]
    if (why === undefined) return []
    return [{
      severity: 'attention', part: 'air', subject: event.id,
      title: `${eventWord(event)} at ${timeText(at, zone)} ${why} and changes nothing.`,
      whatNow: 'Look whether a start, pause or resume is missing or has a wrong time. Correct it, or take this one back with its reason.',
      numbers: [{ name: 'time', value: event.at, unit: '' }],
      rule: 'Start, then pause and resume in turn, then stop; by their times.',
      source: HOUSE_RULE,
    }]
  }),
}
