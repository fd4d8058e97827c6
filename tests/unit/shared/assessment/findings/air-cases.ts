import {
  aBundle, aDay, aFlowCheck, AGENT_ID, anActivity, anEvent, anId, aMethod, aPump, aPumpSwap, aSibling, aTimer, blanks, clock, flowReadings, OTHER_PUMP_ID, PUMP_ID, WORKER_ID,
} from '../../../../fixtures/builders'
import type { FindingCase } from './finding-case'

const before = () => flowReadings('before')
const running = () => [...before(), aTimer('start', '07:00')]
const noon = clock('12:00')
const withSibling = (changes: Parameters<typeof aSibling>[0]) => [...blanks(), aSibling(changes)]
const spans = [{ pumpId: PUMP_ID, fromAt: clock('10:00'), toAt: clock('12:00') }]

export const AIR_CASES = {
  'stop-before-start': {
    finds: 'a stop before the only start', severity: 'stop', in: () => aBundle({ events: [...before(), aTimer('stop', '06:50'), aTimer('start', '07:00')] }),
    passes: 'a start before the stop', not: () => aBundle({ events: aDay() }),
  },
  'no-minutes': {
    finds: 'a stop at the instant of the start', severity: 'stop', in: () => aBundle({ events: [...running(), aTimer('stop', '07:00')] }),
    passes: 'one second of air', not: () => aBundle({ events: [...running(), aTimer('stop', '07:00:01')] }),
  },
  'timer-after-stop': {
    finds: 'a second stop', severity: 'attention', in: () => aBundle({ events: [...aDay(), aTimer('stop', '15:05')] }),
    passes: 'one stop', not: () => aBundle({ events: aDay() }),
  },
  'timer-out-of-order': {
    finds: 'a resume without a pause', severity: 'attention', in: () => aBundle({ events: [...running(), aTimer('resume', '08:00')] }),
    passes: 'pause and resume in turn', not: () => aBundle({ events: aDay() }),
  },
  'pump-differs': {
    finds: 'a pause that names another pump', severity: 'attention', in: () => aBundle({ events: [...running(), aTimer('pause', '08:00', { pumpId: OTHER_PUMP_ID, reason: 'Lunch' })] }),
    passes: 'the same after a swap', not: () => aBundle({ events: [...running(), aPumpSwap('07:30'), aTimer('pause', '08:00', { pumpId: OTHER_PUMP_ID, reason: 'Lunch' })] }),
  },
  'time-unreadable': {
    finds: 'a time that is none', severity: 'attention', in: () => aBundle({ events: [{ ...anActivity('07:20'), at: 'soon' }] }),
    passes: 'a time without milliseconds', not: () => aBundle({ events: [{ ...anActivity('07:20'), at: '2026-03-03T07:20:00Z' }] }),
  },
  'event-in-future': {
    finds: 'a stop that has not come yet', severity: 'attention', at: noon, in: () => aBundle({ events: [...running(), aTimer('stop', '12:02')] }),
    passes: 'one within the minute that clocks may differ', notAt: noon, not: () => aBundle({ events: [...running(), aTimer('stop', '12:01')] }),
  },
  'time-entered-apart': {
    finds: 'a start that was written down eleven minutes later', severity: 'attention', in: () => aBundle({ events: [...before(), aTimer('start', '07:00', {}, { enteredAt: '07:11' })] }),
    passes: 'a correction, which says why', not: () => aBundle({ events: [...before(), aTimer('start', '07:00', {}, { enteredAt: '07:11', corrects: anId('event', 99_999), reason: 'Tapped late' })] }),
  },
  'pause-without-reason': {
    finds: 'a pause without a word', severity: 'attention', in: () => aBundle({ events: [...running(), aTimer('pause', '09:00', { reason: ' ' })] }),
    passes: 'a pause for lunch', not: () => aBundle({ events: [...running(), aTimer('pause', '09:00', { reason: 'Lunch' })] }),
  },
  'long-pause': {
    finds: 'a pause that lasts 61 minutes', severity: 'attention', at: clock('10:01'), in: () => aBundle({ events: [...running(), aTimer('pause', '09:00', { reason: 'Lunch' })] }),
    passes: 'one of exactly 60', notAt: clock('10:00'), not: () => aBundle({ events: [...running(), aTimer('pause', '09:00', { reason: 'Lunch' })] }),
  },
  'paused-at-stop': {
    finds: 'a stop out of a pause', severity: 'attention', in: () => aBundle({ events: [...running(), aTimer('pause', '11:00', { reason: 'Lunch' }), aTimer('stop', '11:30')] }),
    passes: 'a resume before the stop', not: () => aBundle({ events: aDay() }),
  },
  'past-planned-end': {
    finds: 'a pump that runs on', severity: 'attention', at: clock('15:01'), in: () => aBundle({ events: running() }),
    passes: 'a stop a quarter of an hour after the plan', not: () => aBundle({ events: aDay({ stop: '15:15' }) }),
  },
  'flow-check-away': {
    finds: 'a check more than 5 % away', severity: 'attention', in: () => aBundle({ events: [...running(), aFlowCheck('09:00', { litresPerMinute: 1.89 })] }),
    passes: 'a check exactly 5 % away', not: () => aBundle({ events: [...running(), aFlowCheck('09:00', { litresPerMinute: 1.9 })] }),
  },
  'flow-check-missing': {
    finds: 'four hours without a check', severity: 'note', in: () => aBundle({ events: [...running(), aTimer('stop', '11:00')] }),
    passes: 'two hours without one', not: () => aBundle({ events: [...running(), aTimer('stop', '09:00')] }),
  },
  'pump-minutes-apart': {
    finds: 'a pump that ran six minutes less than the sheet', severity: 'attention', in: () => aBundle({ events: [...running(), aFlowCheck('09:00', { pumpMinutes: 114 })] }),
    passes: 'five minutes apart', not: () => aBundle({ events: [...running(), aFlowCheck('09:00', { pumpMinutes: 115 })] }),
  },
  'pump-fault': {
    finds: 'a fault', severity: 'attention', in: () => aBundle({ events: [...running(), anEvent('pump-fault', { pumpId: PUMP_ID, fault: 'stopped', note: null }, { at: '09:00' })] }),
    passes: 'a day without', not: () => aBundle({ events: aDay() }),
  },
  'volume-under-minimum': {
    finds: '198 litres where 200 are needed', severity: 'attention', in: () => aBundle({ events: [...running(), aTimer('stop', '08:39')] }),
    passes: 'exactly 200', not: () => aBundle({ events: [...running(), aTimer('stop', '08:40')] }),
  },
  'volume-over-maximum': {
    finds: 'more than the maximum while it runs', severity: 'attention', at: clock('17:01'), in: () => aBundle({ events: running() }),
    passes: 'exactly the maximum', notAt: clock('17:00'), not: () => aBundle({ events: running() }),
  },
  'volume-projected-under': {
    finds: 'a planned end that comes before the minimum', severity: 'attention', at: clock('07:30'), in: () => aBundle({ events: running(), sheet: { plannedEndAt: clock('08:30') } }),
    passes: 'a planned end at the minimum', notAt: clock('07:30'), not: () => aBundle({ events: running(), sheet: { plannedEndAt: clock('08:40') } }),
  },
  'volume-projected-over': {
    finds: 'a maximum that comes before the planned end', severity: 'attention', at: clock('07:30'), in: () => aBundle({ events: running(), method: aMethod({ volumeMaximumLitres: 900 }) }),
    passes: 'a planned end within the maximum', notAt: clock('07:30'), not: () => aBundle({ events: running() }),
  },
  'shift-coverage': {
    finds: 'less than 7 of 8 hours', severity: 'attention', in: () => aBundle({ events: [...running(), aTimer('stop', '13:59')] }),
    passes: 'exactly 7 of 8 hours', not: () => aBundle({ events: [...running(), aTimer('stop', '14:00')] }),
  },
  'no-activities': {
    finds: 'a day on which nobody noted the work', severity: 'attention', in: () => aBundle({ events: aDay().filter(event => event.type !== 'activity') }),
    passes: 'one activity', not: () => aBundle({ events: aDay() }),
  },
  'pump-on-two-sheets': {
    finds: 'one pump on two sheets, marked on one only', severity: 'attention', in: () => aBundle({ events: aDay(), sheet: { sharesPump: true }, siblings: withSibling({ spans }) }),
    passes: 'a splitter that is marked on both', not: () => aBundle({ events: aDay(), sheet: { sharesPump: true }, siblings: withSibling({ spans, sharesPump: true }) }),
  },
  'two-trains-one-agent': {
    finds: 'two trains on one person for one substance', severity: 'note',
    in: () => aBundle({ events: aDay(), siblings: withSibling({ workerId: WORKER_ID, agentIds: [AGENT_ID], spans: [{ ...spans[0]!, pumpId: OTHER_PUMP_ID }] }) }),
    passes: 'the medium changed at one instant', not: () => aBundle({
      events: aDay(), pumps: [aPump()],
      siblings: withSibling({ workerId: WORKER_ID, spans: [{ pumpId: PUMP_ID, fromAt: clock('15:00'), toAt: clock('16:00') }] }),
    }),
  },
} as const satisfies Record<string, FindingCase>
