import type { FindingRule } from './finding-rule'
import { eventWord } from './timer-after-stop'
import { HOUSE_RULE, timeText } from './words'

/** An event names another pump than the one that drew: a swap that nobody wrote down, or the wrong pump picked. */
export const pumpDiffers: FindingRule = {
  code: 'pump-differs',
  find: facts => facts.air !== 'pumped'
    ? null
    : facts.timeline.irregular.filter(({ what }) => what === 'other-pump').map(({ placed: { event, at } }) => ({
        severity: 'attention', part: 'air', subject: event.id,
        title: `${eventWord(event)} at ${timeText(at, facts.zone)} names another pump than the one that drew.`,
        whatNow: 'If the pump was swapped, enter the swap with its time. If the wrong pump was picked, correct it.',
        numbers: [{ name: 'pump named', value: facts.pump(pumpNamed(event.data))?.serial ?? 'not known here', unit: '' }],
        rule: 'Every reading, check and timer event names the pump that drew at that moment.',
        source: HOUSE_RULE,
      })),
}

function pumpNamed(data: { pumpId: string | null } | { fromPumpId: string }): string | null {
  return 'fromPumpId' in data ? data.fromPumpId : data.pumpId
}
