import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, minutesText, timeText } from './words'

/** Stopped out of a pause: was the pump forgotten, or did nobody press resume? */
export const pausedAtStop: FindingRule = {
  code: 'paused-at-stop',
  find({ timeline, zone }) {
    const pause = timeline.pauses.at(-1)
    if (!timeline.wasPausedAtStop || !pause || pause.to === null) return null
    const minutes = (pause.to - pause.from) / 60_000
    return {
      severity: 'attention', part: 'air', subject: pause.eventId,
      title: `Stopped while paused: no air counted from ${timeText(pause.from, zone)} on, ${minutesText(minutes)}.`,
      whatNow: 'If the pump was running again, enter the resume with its time. If not, give the reason.',
      numbers: [{ name: 'length of the pause', value: minutes, unit: 'min' }],
      rule: 'A pause ends with a resume before the stop, or the reason is given.',
      source: COMMON_PRACTICE,
    }
  },
}
