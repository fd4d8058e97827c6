import {
  aBundle, aDay, anActivity, anEvent, anId, aMethod, aSibling, aTimer, blanks, clock, PHONE, takenBack, TECHNICIAN_ID, CALIBRATOR_ID, aFlowReading,
} from '../../../../fixtures/builders'
import type { FindingCase } from './finding-case'

const jump = (seconds: number) => anEvent('clock-jump', { wallMilliseconds: 1000 + seconds * 1000, monotonicMilliseconds: 1000 }, { at: '09:00' })
const conflict = (isOpen: boolean) => ({
  conflicts: [{ field: 'task', isOpen, values: [{ opId: anId('op'), value: 'Sanding', author: TECHNICIAN_ID, at: clock('07:00'), dev: PHONE, isCurrent: true }] }],
})
const stopped = clock('15:00')

export const CLOSE_CASES = {
  'blanks-too-few': {
    finds: 'one blank where the method wants two', severity: 'attention', in: () => aBundle({ events: aDay(), siblings: blanks().slice(0, 1) }),
    passes: 'two blanks', not: () => aBundle({ events: aDay() }),
  },
  'lot-without-blanks': {
    finds: 'blanks of another lot only', severity: 'attention', in: () => aBundle({ events: aDay(), sheet: { mediumLot: 'L-2' } }),
    passes: 'a blank of its lot, whatever the capitals', not: () => aBundle({ events: aDay(), sheet: { mediumLot: 'l-1' } }),
  },
  'hold-time': {
    finds: 'a sample that kept for seven days and is eight days old', severity: 'attention', at: '2026-03-11T15:00:00.000Z',
    in: () => aBundle({ events: aDay(), method: aMethod({ holdDays: 7 }) }),
    passes: 'one that keeps for more than a quarter of them', notAt: '2026-03-06T15:00:00.000Z', not: () => aBundle({ events: aDay(), method: aMethod({ holdDays: 7 }) }),
  },
  'clock-jump': {
    finds: 'a clock that went forward by 61 seconds', severity: 'attention', in: () => aBundle({ events: [jump(61)] }),
    passes: 'a day without a jump', not: () => aBundle({ events: aDay() }),
  },
  'clock-off': {
    finds: 'a phone 61 seconds behind', severity: 'attention', in: () => aBundle({ events: [aTimer('start', '07:00', {}, { clockOffsetMilliseconds: 61_000 })] }),
    passes: 'a phone one minute behind', not: () => aBundle({ events: [aTimer('start', '07:00', {}, { clockOffsetMilliseconds: 60_000 })] }),
  },
  'two-phones': {
    finds: 'two phones on one sheet', severity: 'note', in: () => aBundle({ events: [aTimer('start', '07:00'), anActivity('07:20', 'Sanding', { dev: 'phone-b' })] }),
    passes: 'one phone', not: () => aBundle({ events: aDay() }),
  },
  'open-conflict': {
    finds: 'two values for one field', severity: 'attention', in: () => aBundle({ document: conflict(true) }),
    passes: 'a conflict that was settled', not: () => aBundle({ document: conflict(false) }),
  },
  'late-change': {
    finds: 'a change beside the sheet', severity: 'note',
    in: () => aBundle({ document: { late: [{ opId: anId('op'), reason: 'locked', author: TECHNICIAN_ID, dev: PHONE, at: stopped, kind: 'ev.add', body: {} }] } }),
    passes: 'a sheet with nothing beside it', not: () => aBundle(),
  },
  'values-corrected': {
    finds: 'an entry that was taken back', severity: 'note', in: () => aBundle({ events: [takenBack(aFlowReading({ calibratorId: CALIBRATOR_ID }))] }),
    passes: 'entries as first written', not: () => aBundle({ events: aDay(), siblings: [...blanks(), aSibling()] }),
  },
} as const satisfies Record<string, FindingCase>
