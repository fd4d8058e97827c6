import { instantText } from '#shared/domain/instant'
import type { FindingRule } from './finding-rule'
import { HOUSE_RULE, timeText } from './words'

/** A stop stands before the start: one of the two times is wrong. */
export const stopBeforeStart: FindingRule = {
  code: 'stop-before-start',
  find({ timeline, zone }) {
    const { startedAt, stoppedAt } = timeline
    const early = timeline.irregular.find(({ what }) => what === 'stop-before-start')
    if (!early) return null
    const isOnlyStop = startedAt !== null && stoppedAt !== null && stoppedAt <= startedAt
    return {
      severity: isOnlyStop ? 'stop' : 'attention', part: 'air',
      title: startedAt === null
        ? `Stopped at ${timeText(early.placed.at, zone)} and never started.`
        : `A stop at ${timeText(early.placed.at, zone)} stands before the start at ${timeText(startedAt, zone)}.`,
      whatNow: 'Correct the time that is wrong; the first value stays on record.',
      numbers: [
        { name: 'start', value: startedAt === null ? 'none' : instantText(startedAt), unit: '' },
        { name: 'stop', value: instantText(early.placed.at), unit: '' },
      ],
      rule: 'A run ends after it begins. Nothing is computed from a time below zero.',
      source: HOUSE_RULE,
    }
  },
}
