import { describe, expect, it } from 'vitest'
import { meanFlow, spreadPercent } from '#shared/domain/calibration'
import { bubbleMeterFlow, rotameterCorrectedFlow } from '#shared/domain/correction'
import { bubbleMeterWorking, rotameterWorking } from '#shared/domain/correction-workings'
import { shiftCoverage } from '#shared/domain/coverage'
import { flowChangePercent } from '#shared/domain/deviation'
import { runSpans, sampledMinutes } from '#shared/domain/duration'
import { flowUsed, type FlowUsedInput } from '#shared/domain/flow-used'
import { flowChangeWorking, flowUsedWorking, indicatorAccuracyWorking, meanFlowWorking, spreadWorking } from '#shared/domain/flow-workings'
import { accuracyPercentAt, COMMON_LAMINAR_FLOW_ACCURACY, COMMON_MECHANICAL_ACCURACY } from '#shared/domain/indicator-accuracy'
import { minutesToVolume } from '#shared/domain/projection'
import { diffusiveVolume, sampledVolume, segmentedVolume } from '#shared/domain/volume'
import { diffusiveVolumeWorking, minutesLeftWorking, sampledMinutesWorking, sampledVolumeWorking, segmentedVolumeWorking, shiftCoverageWorking } from '#shared/domain/volume-workings'
import type { Working } from '#shared/domain/working'

const readings = [2.01, 2.0, 1.96]
const run = {
  startedAt: '2026-07-03T07:02:00Z',
  stoppedAt: '2026-07-03T15:31:00Z',
  pauses: [{ fromAt: '2026-07-03T11:30:00Z', toAt: '2026-07-03T12:04:00Z' }, { fromAt: '2026-07-03T15:00:00Z' }],
}
const shift = { fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T15:00:00Z' }
const segments = [{ litresPerMinute: 2, minutes: 240 }, { litresPerMinute: 1.9, minutes: 210 }]
const rotameter = { indicatedLitresPerMinute: 2, calibrationPressureKilopascals: 101, calibrationTemperatureCelsius: 20, samplingPressureKilopascals: 90, samplingTemperatureCelsius: 35 }
const bubble = { bubbleLitresPerMinute: 2, pressureKilopascals: 99, temperatureCelsius: 22, inletRelativeHumidityPercent: 40 }
const flows: FlowUsedInput = { before: 1.7, after: 1.58, useNominal: false, attentionPercent: 5 }

/** Each working beside the number that the formula itself gives. */
const workings: [string, Working | null, number | undefined, string][] = [
  ['mean flow', meanFlowWorking(readings, 'before'), meanFlow(readings), 'L/min'],
  ['spread', spreadWorking(readings), spreadPercent(readings), '%'],
  ['change of flow', flowChangeWorking(2, 1.94), flowChangePercent(2, 1.94), '%'],
  ['flow used', flowUsedWorking(flows), flowUsed(flows)?.litresPerMinute, 'L/min'],
  ['accuracy of full scale', indicatorAccuracyWorking(COMMON_MECHANICAL_ACCURACY, 2), percentOf(accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 2)), '%'],
  ['accuracy of reading', indicatorAccuracyWorking(COMMON_LAMINAR_FLOW_ACCURACY, 2), percentOf(accuracyPercentAt(COMMON_LAMINAR_FLOW_ACCURACY, 2)), '%'],
  ['sampled minutes', sampledMinutesWorking(run), sampledMinutes(run), 'min'],
  ['sampled volume', sampledVolumeWorking(1.97, 450), sampledVolume(1.97, 450), 'L'],
  ['volume over segments', segmentedVolumeWorking(segments), segmentedVolume(segments).litres, 'L'],
  ['diffusive volume', diffusiveVolumeWorking(35, 480), diffusiveVolume(35, 480), 'L'],
  ['minutes left', minutesLeftWorking(100, 400, 2), minutesToVolume(300, 2), 'min'],
  ['coverage', shiftCoverageWorking(shift, runSpans(run)), shiftCoverage(shift, runSpans(run)).percent, '%'],
  ['rotameter', rotameterWorking(rotameter), rotameterCorrectedFlow(rotameter), 'L/min'],
  ['bubble meter', bubbleMeterWorking(bubble), bubbleMeterFlow(bubble), 'L/min'],
]

describe('shown workings', () => {
  it.each(workings)('of %s give the very number of the formula, with its source', (_, working, value, unit) => {
    expect(working?.result).toEqual({ value, unit })
    expect(working?.title).not.toBe('')
    expect(working?.formula).not.toBe('')
    expect(working?.source).not.toBe('')
    expect(working?.inputs.length).toBeGreaterThan(0)
    for (const { name, value: input } of working?.inputs ?? []) {
      expect(name).not.toBe('')
      if (typeof input === 'number') expect(Number.isFinite(input), name).toBe(true)
    }
  })

  it('show enough to do the sum again by hand', () => {
    const [flow, minutes] = sampledVolumeWorking(1.97, 450).inputs
    expect(Number(flow?.value) * Number(minutes?.value)).toBe(886.5)
    const drawn = sampledMinutesWorking(run).inputs.filter(one => one.name.startsWith('air drawn'))
    expect(drawn.map(one => one.value)).toEqual([268, 176])
    expect(meanFlowWorking(readings, 'before').inputs.slice(0, 3)).toEqual([
      { name: 'reading 1', value: 2.01, unit: 'L/min', from: 'before' },
      { name: 'reading 2', value: 2.0, unit: 'L/min', from: 'before' },
      { name: 'reading 3', value: 1.96, unit: 'L/min', from: 'before' },
    ])
  })

  it('say of a pause that still lasts that it reaches to the stop', () => {
    expect(sampledMinutesWorking(run).inputs.find(one => one.name === 'pause 2')?.value).toBe('2026-07-03T15:00:00Z to the stop')
  })

  it('say which flow is used and why, for every rule', () => {
    const notes = [
      flowUsedWorking({ before: 2, after: 1.94, useNominal: false, attentionPercent: 5 }),
      flowUsedWorking(flows),
      flowUsedWorking({ ...flows, nominal: 1.7, useNominal: true }),
      flowUsedWorking({ ...flows, after: null }),
      flowUsedWorking({ ...flows, before: null }),
    ].map(working => working?.note)
    expect(new Set(notes).size).toBe(5)
    expect(notes).not.toContain(undefined)
  })

  it('are none where there is no number', () => {
    expect(flowUsedWorking({ useNominal: false, attentionPercent: 5 })).toBeNull()
    expect(indicatorAccuracyWorking(COMMON_LAMINAR_FLOW_ACCURACY, 9)).toBeNull()
    expect(minutesLeftWorking(400, 400, 2)).toBeNull()
    expect(minutesLeftWorking(100, 400, 0)).toBeNull()
  })

  it('do not fail on a pump that has died', () => {
    expect(flowUsedWorking({ ...flows, before: 0, after: 0 })?.result.value).toBe(0)
    expect(meanFlowWorking([0, 0, 0]).result.value).toBe(0)
  })
})

function percentOf(at: ReturnType<typeof accuracyPercentAt>): number | undefined {
  return at.outside ? undefined : at.percent
}
