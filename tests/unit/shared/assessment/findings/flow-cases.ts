import {
  aBundle, aCalibrator, aCondition, aDay, aFlowReading, aFlowReset, aMethod, anId, aPump, aSampler, aTimer, CALIBRATOR_ID, flowReadings, OPEN,
} from '../../../../fixtures/builders'
import type { FindingCase } from './finding-case'

const started = () => aTimer('start', '07:00')
const withoutAfter = () => aDay().filter(event => event.type !== 'flow-reading' || event.data.when === 'before')
const rotameter = [aPump({ indicator: 'rotameter' })]
const conditions = { temperatureCelsius: 20, stationPressureKilopascals: 101 }
const OTHER_CALIBRATOR_ID = anId('calibrator', 2)

export const FLOW_CASES = {
  'flow-before-missing': {
    finds: 'a pump that draws without a flow before', severity: 'stop', in: () => aBundle({ events: [started()] }),
    passes: 'a sheet that is not started, where it is a gap', not: () => aBundle(),
  },
  'flow-after-missing': {
    finds: 'a sheet handed in without flow after', severity: 'stop', in: () => aBundle({ events: withoutAfter(), document: { standing: { ...OPEN, state: 'handed-in' } } }),
    passes: 'one that is still on the phone, where it is a gap', not: () => aBundle({ events: withoutAfter() }),
  },
  'sampler-not-in-line': {
    finds: 'a reading with nothing in line', severity: 'attention', in: () => aBundle({ events: [...flowReadings('before', [2, 2]), aFlowReading({ samplerInLine: null })] }),
    passes: 'readings with the sampler in line', not: () => aBundle({ events: flowReadings('before') }),
  },
  'few-readings': {
    finds: 'two readings where three are wanted', severity: 'attention', in: () => aBundle({ events: flowReadings('before', [2, 2]) }),
    passes: 'two readings where the organisation wants two', not: () => aBundle({ events: flowReadings('before', [2, 2]), settings: { minimumReadings: 2 } }),
  },
  'reading-away': {
    finds: 'a reading more than 5 % from the mean', severity: 'attention', in: () => aBundle({ events: flowReadings('before', [1.89, 2, 2.11]) }),
    passes: 'readings exactly 5 % from the mean', not: () => aBundle({ events: flowReadings('before', [1.9, 2, 2.1]) }),
  },
  'reading-misplaced': {
    finds: 'a flow before that was read after the start', severity: 'attention', in: () => aBundle({ events: [started(), ...flowReadings('before', 2, {}, { at: '07:30' })] }),
    passes: 'a flow before the start', not: () => aBundle({ events: [started(), ...flowReadings('before')] }),
  },
  'calibrator-missing': {
    finds: 'a reading without a calibrator', severity: 'attention', in: () => aBundle({ events: [aFlowReading({ calibratorId: null })] }),
    passes: 'a reading with one', not: () => aBundle({ events: [aFlowReading()] }),
  },
  'calibrator-overdue': {
    finds: 'a calibrator that was due the day before', severity: 'attention',
    in: () => aBundle({ events: flowReadings('before'), calibrators: { [CALIBRATOR_ID]: aCalibrator({ dueOn: '2026-03-02' }) } }),
    passes: 'a calibrator on its due day', not: () => aBundle({ events: flowReadings('before'), calibrators: { [CALIBRATOR_ID]: aCalibrator({ dueOn: '2026-03-03' }) } }),
  },
  'calibrator-date-missing': {
    finds: 'a calibrator without a due date', severity: 'note',
    in: () => aBundle({ events: flowReadings('before'), calibrators: { [CALIBRATOR_ID]: aCalibrator({ dueOn: null }) } }),
    passes: 'one with its date', not: () => aBundle({ events: flowReadings('before') }),
  },
  'calibrator-differs': {
    finds: 'another calibrator after than before', severity: 'attention',
    in: () => aBundle({ events: [...flowReadings('before'), ...flowReadings('after', 2, { calibratorId: OTHER_CALIBRATOR_ID })] }),
    passes: 'the same one', not: () => aBundle({ events: [...flowReadings('before'), ...flowReadings('after')] }),
  },
  'flow-outside-method': {
    finds: 'a flow above the method\'s largest', severity: 'attention', in: () => aBundle({ events: flowReadings('before', 3.01) }),
    passes: 'a flow exactly at it', not: () => aBundle({ events: flowReadings('before', 3) }),
  },
  'sampler-design-flow': {
    finds: 'a cyclone at the flow of another one, inside the method\'s wide window', severity: 'attention',
    // NIOSH NMAM 0600: nylon 1.7, Higgins-Dewell 2.2, aluminium 2.5 L/min.
    in: () => aBundle({
      events: flowReadings('before', 2.2), sampler: aSampler({ name: 'Nylon cyclone', fraction: 'respirable', designFlowLitresPerMinute: 1.7 }),
      method: aMethod({ flowMinimumLitresPerMinute: 1.7, flowMaximumLitresPerMinute: 2.5 }),
    }),
    passes: 'a cyclone exactly 5 % from its own flow',
    not: () => aBundle({ events: flowReadings('before', 1.785), sampler: aSampler({ fraction: 'respirable', designFlowLitresPerMinute: 1.7 }) }),
  },
  'pump-flow-range': {
    finds: 'a flow the pump is not made for', severity: 'attention', in: () => aBundle({ events: flowReadings('before', 0.4) }),
    passes: 'its least flow', not: () => aBundle({ events: flowReadings('before', 0.5) }),
  },
  'indicator-accuracy-unstated': {
    finds: 'a flow the maker says nothing about', severity: 'note', in: () => aBundle({ events: flowReadings('before', 3.5) }),
    passes: 'a flow within the stated range', not: () => aBundle({ events: flowReadings('before', 3) }),
  },
  'flow-change': {
    finds: 'a change beyond 5 %', severity: 'attention', in: () => aBundle({ events: aDay({ before: 2, after: 1.89 }) }),
    passes: 'a change of exactly 5 %', not: () => aBundle({ events: aDay({ before: 2, after: 1.9 }) }),
  },
  'flow-used': {
    finds: 'out and says which flow stands', severity: 'note', in: () => aBundle({ events: aDay() }),
    passes: 'a sheet that is not stopped', not: () => aBundle({ events: flowReadings('before') }),
  },
  'conditions-missing': {
    finds: 'a rotameter without its conditions', severity: 'attention', in: () => aBundle({ events: [...flowReadings('before'), started()], pumps: rotameter }),
    passes: 'an electronic pump without them', not: () => aBundle({ events: [...flowReadings('before'), started()] }),
  },
  'rotameter-corrected': {
    finds: 'out and says that a rotameter was corrected', severity: 'note',
    in: () => aBundle({ events: [...flowReadings('before', 2, conditions), aCondition('08:00', { ...conditions, temperatureCelsius: 30 })], pumps: rotameter }),
    passes: 'an electronic pump with the same conditions',
    not: () => aBundle({ events: [...flowReadings('before', 2, conditions), aCondition('08:00', { ...conditions, temperatureCelsius: 30 }), aFlowReset('08:05')] }),
  },
} as const satisfies Record<string, FindingCase>
