import { fixed } from '#shared/domain/rounding'
import type { SheetState } from '#shared/records/sheet-state'
import { dayAt } from '../place-time'
import type { FindingRule } from './finding-rule'

const MILLISECONDS_IN_DAY = 86_400_000
const NOT_RESULTED: readonly SheetState[] = ['open', 'handed-in', 'returned', 'accepted']

/** The time the sample keeps, counted from the end of sampling, runs out or has run out without a result. */
export const holdTime: FindingRule = {
  code: 'hold-time',
  find({ bundle: { method, document }, timeline, now, zone }) {
    if (!method || method.holdDays === null || timeline.stoppedAt === null || !NOT_RESULTED.includes(document.standing.state)) return null
    const untilAt = timeline.stoppedAt + method.holdDays * MILLISECONDS_IN_DAY
    const daysLeft = (untilAt - now) / MILLISECONDS_IN_DAY
    if (daysLeft > Math.min(3, method.holdDays / 4)) return null
    const until = dayAt(untilAt, zone)
    return {
      severity: daysLeft < 0 ? 'attention' : 'note', part: 'close',
      title: daysLeft < 0 ? `The sample kept until ${until}: ${fixed(-daysLeft, 1)} days ago.` : `The sample keeps until ${until}, ${fixed(daysLeft, 1)} days more.`,
      whatNow: daysLeft < 0 ? 'Ask the laboratory whether it was analysed in time, and note the answer.' : 'Send it to the laboratory now and tell them the date.',
      numbers: [{ name: 'hold time', value: method.holdDays, unit: 'days' }, { name: 'left', value: daysLeft, unit: 'days' }],
      rule: `${method.code}: ${method.stabilityAsPrinted || `${method.holdDays} days`}, from the end of sampling.`,
      source: method.source || method.code,
    }
  },
}
