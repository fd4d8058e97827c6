import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, timeText } from './words'

const FAULTS = { 'stopped': 'stopped by itself', 'flow-blocked': 'had its flow blocked', 'battery': 'had a weak battery', 'tubing-off': 'had its tubing off', 'other': 'had a fault' }

/** A fault of the pump that somebody noted: what it means for the sample is a person's answer. */
export const pumpFault: FindingRule = {
  code: 'pump-fault',
  find: facts => facts.air !== 'pumped'
    ? null
    : facts.events.of('pump-fault').map(({ event, at }) => ({
        severity: 'attention', part: 'air', subject: event.id,
        title: `At ${timeText(at, facts.zone)} the pump ${FAULTS[event.data.fault]}${event.data.note ? `: ${event.data.note}` : ''}.`,
        whatNow: 'Say how long no air was drawn and what was done. Pause the sheet for that time if it is not paused.',
        numbers: [{ name: 'fault', value: event.data.fault, unit: '' }],
        rule: 'A fault is recorded with its time and its effect on the sampled minutes.',
        source: COMMON_PRACTICE,
      })),
}
