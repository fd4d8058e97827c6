import { describe, expect, it } from 'vitest'
import { assessSheet } from '#shared/assessment/assess-sheet'
import { aBundle, aDay, aFlowReset, aPump, aPumpSwap, aTimer, anAgent, aMethod, clock, flowReadings, OTHER_PUMP_ID, PUMP_ID, aCondition, aFlowCheck } from '../../../fixtures/builders'

const EVENING = clock('18:00')

describe('a plain day', () => {
  const day = assessSheet(aBundle({ events: aDay() }), EVENING)

  it('draws 450 minutes and 900 litres from 07:00 to 15:00 with half an hour of lunch', () => {
    // By hand: 480 - 30 = 450 min; 450 min × 2 L/min = 900 L. Common practice: V = Q t.
    expect(day.sampledMinutes).toBe(450)
    expect(day.volumeLitres).toBe(900)
    expect(day.progress).toBe('checked')
  })

  it('shows the working of every number it has', () => {
    expect(day.workings.minutes?.result.value).toBe(day.sampledMinutes)
    expect(day.workings.volume?.result.value).toBe(day.volumeLitres)
    expect(day.workings.change?.result.value).toBe(day.change?.percent)
    expect(day.workings['mean-before']?.result.value).toBe(day.flowBefore?.meanLitresPerMinute)
    expect(day.workings['mean-after']?.result.value).toBe(day.flowAfter?.meanLitresPerMinute)
    expect(day.workings['flow-used']?.result.value).toBe(day.flowUsed?.litresPerMinute)
    expect(day.workings.accuracy?.result.value).toBe(day.indicatorAccuracy?.percent)
    expect(day.workings.coverage?.result.value).toBe(day.coverageShare! * 100)
  })

  it('has no gap and can be handed in as fit', () => {
    expect(day.gaps).toEqual([])
    expect(day.canHandInAsFit).toBe(true)
  })

  it('covers 450 of 480 minutes of the shift', () => {
    expect(day.coverageShare).toBe(450 / 480)
  })

  it('says when the volume passed the minimum and where the maximum was not reached', () => {
    // 200 L at 2 L/min are 100 minutes after 07:00.
    expect(day.projection?.minimumAt).toBe(clock('08:40'))
    expect(day.projection?.maximumAt).toBeNull()
  })

  it('says that an electronic pump is not corrected for pressure and temperature', () => {
    expect(day.workings['flow-used']?.note).toContain('electronically')
    expect(day.workings.correction).toBeUndefined()
  })
})

describe('while it runs', () => {
  const running = assessSheet(aBundle({ events: aDay().slice(0, 4) }), clock('07:30'))

  it('counts up to now and projects on', () => {
    expect(running.progress).toBe('running')
    expect(running.sampledMinutes).toBe(30)
    expect(running.volumeLitres).toBe(60)
    // 60 L so far; 450 minutes more at 2 L/min until 15:00.
    expect(running.projection?.litresAtPlannedEnd).toBe(960)
    expect(running.projection?.minimumAt).toBe(clock('08:40'))
    expect(running.projection?.maximumAt).toBe(clock('17:00'))
    expect(running.spans).toEqual([{ fromAt: clock('07:00'), toAt: null, pumpId: PUMP_ID }])
  })

  it('wants the first check 15 minutes after the start and the next two hours after a check', () => {
    const bundle = aBundle({ events: [...flowReadings('before'), aTimer('start', '07:00')] })
    expect(assessSheet(bundle, clock('07:05')).nextCheckDueAt).toBe(clock('07:15'))
    const checked = aBundle({ events: [...bundle.document.events, aFlowCheck('07:20')] })
    expect(assessSheet(checked, clock('07:30')).nextCheckDueAt).toBe(clock('09:20'))
  })

  it('wants the first check anew after a swap or a reset', () => {
    const events = [...flowReadings('before'), aTimer('start', '07:00'), aFlowCheck('07:15'), aPumpSwap('08:00')]
    expect(assessSheet(aBundle({ events }), clock('08:05')).nextCheckDueAt).toBe(clock('08:15'))
    expect(assessSheet(aBundle({ events: [...events, aFlowReset('08:10', { pumpId: OTHER_PUMP_ID })] }), clock('08:20')).nextCheckDueAt).toBe(clock('08:25'))
  })

  it('is never below zero when the clock of the phone was set back', () => {
    const early = assessSheet(aBundle({ events: aDay().slice(0, 4) }), clock('06:00'))
    expect(early.sampledMinutes).toBe(0)
    expect(early.volumeLitres).toBe(0)
  })
})

describe('progress', () => {
  const at = (count: number) => assessSheet(aBundle({ events: aDay().slice(0, count) }), EVENING).progress

  it('follows the events of the day', () => {
    expect([at(0), at(3), at(4), at(8), at(9), at(12), at(15)]).toEqual(['planned', 'ready', 'running', 'paused', 'running', 'stopped', 'checked'])
  })
})

describe('segments', () => {
  it('sums a swapped pump by hand: 240 min × 2.0 + 210 min × 1.8 = 858 L', () => {
    const assessment = assessSheet(aBundle({
      events: [
        ...flowReadings('before', 2), ...flowReadings('before', 1.8, { pumpId: OTHER_PUMP_ID }),
        aTimer('start', '07:00'), aPumpSwap('11:00'),
        aTimer('pause', '12:00', { pumpId: OTHER_PUMP_ID, reason: 'Lunch' }), aTimer('resume', '12:30', { pumpId: OTHER_PUMP_ID }),
        aTimer('stop', '15:00', { pumpId: OTHER_PUMP_ID }),
        ...flowReadings('after', 2), ...flowReadings('after', 1.8, { pumpId: OTHER_PUMP_ID }),
      ],
    }), EVENING)
    expect(assessment.segments.map(({ pumpId, minutes, litres }) => ({ pumpId, minutes, litres }))).toEqual([
      { pumpId: PUMP_ID, minutes: 240, litres: 480 },
      { pumpId: OTHER_PUMP_ID, minutes: 210, litres: 378 },
    ])
    expect(assessment.volumeLitres).toBeCloseTo(858, 9)
    expect(assessment.workings.volume?.result.value).toBe(assessment.volumeLitres)
    expect(assessment.currentPumpId).toBe(OTHER_PUMP_ID)
    expect(assessment.progress).toBe('checked')
  })

  it('splits at a reset: mean of 2.0 and 1.9 until then, mean of 2.0 and 1.96 after', () => {
    const assessment = assessSheet(aBundle({
      events: [...flowReadings('before', 2), aTimer('start', '07:00'), aFlowReset('10:00'), aTimer('stop', '15:00'), ...flowReadings('after', 1.96)],
    }), EVENING)
    // By hand: 180 min × 1.95 + 300 min × 1.98 = 351 + 594 = 945 L.
    expect(assessment.segments.map(segment => segment.litresPerMinute)).toEqual([1.95, 1.98])
    expect(assessment.volumeLitres).toBeCloseTo(945, 9)
    expect(assessment.change?.percent).toBeCloseTo(-2, 9)
    expect(assessment.spans).toHaveLength(1)
  })

  it('has no volume, and no invented flow, when nothing was read of a pump that drew air', () => {
    const assessment = assessSheet(aBundle({
      events: [...flowReadings('before', 2), aTimer('start', '07:00'), aPumpSwap('11:00'), aTimer('stop', '15:00', { pumpId: OTHER_PUMP_ID }), ...flowReadings('after', 2)],
    }), EVENING)
    expect(assessment.volumeLitres).toBeNull()
    expect(assessment.segments[1]?.litresPerMinute).toBeNull()
    expect(assessment.gaps.map(gap => gap.code)).toEqual(['flow-before', 'flow-after'])
    expect(assessment.gaps[0]?.title).toContain('0034')
  })
})

describe('which flow stands', () => {
  const withFlows = (before: number, after: number, method = aMethod()) => assessSheet(aBundle({ events: aDay({ before, after }), method }), EVENING).flowUsed

  it('takes the mean within 5 %, exactly 5 % included, and the lower beyond', () => {
    // Common practice. 2.0 to 1.9 is exactly -5 %.
    expect(withFlows(2, 1.9)).toMatchObject({ rule: 'mean', litresPerMinute: 1.95 })
    expect(withFlows(2, 1.89)).toMatchObject({ rule: 'lower', litresPerMinute: 1.89 })
    expect(withFlows(2, 2.2)).toMatchObject({ rule: 'lower', litresPerMinute: 2 })
  })

  it('takes the design flow of the sampler where the method says so', () => {
    // NIOSH NMAM 0600: the nominal flow is used even after a known shift.
    expect(withFlows(2.1, 2.1, aMethod({ usesNominalFlow: true }))).toMatchObject({ rule: 'nominal', litresPerMinute: 2 })
  })
})

describe('a rotameter pump', () => {
  const rotameter = [aPump({ indicator: 'rotameter' })]
  // 760 mmHg and 630 mmHg. NIOSH NMAM chapter D: 2.0 L/min shown is 2.197 true at the same temperature.
  const sea = { temperatureCelsius: 25, stationPressureKilopascals: 101.325 }
  const mountain = { temperatureCelsius: 25, stationPressureKilopascals: 101.325 * 630 / 760 }
  const events = [
    ...flowReadings('before', 2, sea), aTimer('start', '07:00'), aCondition('08:00', mountain), aFlowCheck('09:00'), aTimer('stop', '15:00'), ...flowReadings('after', 2, sea),
  ]

  it('is corrected when every condition is known, its checks by the indicator too', () => {
    const assessment = assessSheet(aBundle({ events, pumps: rotameter }), EVENING)
    expect(assessment.flowUsed?.litresPerMinute).toBeCloseTo(2.197, 3)
    expect(assessment.volumeLitres).toBeCloseTo(480 * 2.19672, 1)
    expect(assessment.checks[0]).toMatchObject({ isCorrected: true })
    expect(assessment.checks[0]?.percent).toBeCloseTo(0, 9)
    expect(assessment.workings.correction?.result.value).toBeCloseTo(2.197, 3)
    expect(assessment.flowBefore?.meanLitresPerMinute).toBe(2)
  })

  it('stands as read when a condition is missing', () => {
    const assessment = assessSheet(aBundle({ events: events.filter(event => event.type !== 'condition'), pumps: rotameter }), EVENING)
    expect(assessment.flowUsed?.litresPerMinute).toBe(2)
    expect(assessment.workings.correction).toBeUndefined()
  })

  it('is never corrected when the pump is electronic', () => {
    expect(assessSheet(aBundle({ events }), EVENING).flowUsed?.litresPerMinute).toBe(2)
  })
})

describe('other airs', () => {
  it('reads a diffusive sampler by its uptake rate: 30 mL/min × 480 min = 14.4 L', () => {
    const assessment = assessSheet(aBundle({
      sheet: { air: 'diffusive', pumpId: null, uptakeMillilitresPerMinute: 30 }, method: aMethod({ air: 'diffusive' }),
      events: [aTimer('start', '07:00', { pumpId: null }), aTimer('stop', '15:00', { pumpId: null })],
    }), EVENING)
    expect(assessment.volumeLitres).toBeCloseTo(14.4, 9)
    expect(assessment.workings.volume?.title).toBe('Equivalent volume')
    expect(assessment.progress).toBe('checked')
    expect(assessment.gaps).toEqual([])
  })

  it('asks a blank for its number and nothing of a pump', () => {
    const blank = assessSheet(aBundle({ sheet: { kind: 'field-blank', number: null, workerId: null, agentIds: [], pumpId: null } }), EVENING)
    expect(blank.gaps.map(gap => gap.code)).toEqual(['sample-number'])
    expect(blank.progress).toBe('planned')
  })
})

describe('the volume range', () => {
  it('is the narrower one of the agents on the sheet', () => {
    const method = aMethod({
      code: 'M 9', volumeMinimumLitres: 1, volumeMaximumLitres: 10,
      agentVolumes: [{ agent: 'Acetone', volumeMinimumLitres: 0.5, volumeMaximumLitres: 3, status: 'memory' }],
    })
    const { volumeRange } = assessSheet(aBundle({ method, agents: [anAgent({ name: 'acetone' })] }), EVENING)
    expect(volumeRange).toEqual({ minimumLitres: 1, maximumLitres: 3, from: 'M 9, Acetone', status: 'memory' })
  })

  it('says that none is stored', () => {
    const { volumeRange } = assessSheet(aBundle({ method: aMethod({ code: 'M 9', volumeMinimumLitres: null, volumeMaximumLitres: null }) }), EVENING)
    expect(volumeRange.from).toBe('No volume range stored for M 9')
  })
})
