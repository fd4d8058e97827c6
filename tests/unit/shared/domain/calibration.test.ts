import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { deviationsPercent, flowFromBuret, isCalibratorInDate, meanFlow, spreadPercent } from '#shared/domain/calibration'
import { expectRefused } from './refuses'

const flow = fc.double({ min: 0.001, max: 30, noNaN: true })
const readings = fc.array(flow, { minLength: 1, maxLength: 10 })

describe('flow readings', () => {
  it('averages three readings', () => {
    expect(meanFlow([2.01, 2.0, 1.99])).toBeCloseTo(2, 12)
    expect(meanFlow([1.7])).toBe(1.7)
  })

  it('gives the reading itself back when all are equal', () => {
    fc.assert(fc.property(flow, fc.integer({ min: 1, max: 12 }), (reading, count) => {
      const equal = Array.from({ length: count }, () => reading)
      expect(meanFlow(equal)).toBe(reading)
      expect(spreadPercent(equal)).toBe(0)
    }))
  })

  it('keeps the mean between the smallest and the largest reading', () => {
    fc.assert(fc.property(readings, (list) => {
      expect(meanFlow(list)).toBeGreaterThanOrEqual(Math.min(...list) - 1e-12)
      expect(meanFlow(list)).toBeLessThanOrEqual(Math.max(...list) + 1e-12)
    }))
  })

  it('does not care in which unit or order the readings came', () => {
    fc.assert(fc.property(readings, (list) => {
      expect(meanFlow(list.map(one => one * 1000)) / 1000).toBeCloseTo(meanFlow(list), 9)
      expect(spreadPercent(list.map(one => one * 1000))).toBeCloseTo(spreadPercent(list), 6)
      expect(meanFlow([...list].reverse())).toBeCloseTo(meanFlow(list), 9)
    }))
  })

  it('gives each deviation with its sign, and the spread as the largest of them', () => {
    const deviations = deviationsPercent([1.8, 2.0, 2.05, 2.15])
    expect(deviations.map(one => Number(one.toFixed(9)))).toEqual([-10, 0, 2.5, 7.5])
    expect(spreadPercent([1.8, 2.0, 2.05, 2.15])).toBeCloseTo(10, 12)
  })

  it('takes the readings of a pump that has died', () => {
    expect(meanFlow([0, 0, 0])).toBe(0)
    expect(deviationsPercent([0, 0, 0])).toEqual([0, 0, 0])
    expect(spreadPercent([0, 0, 0])).toBe(0)
  })

  it('leaves the readings as they were', () => {
    const typed = Object.freeze([2.1, 2.0, 1.9])
    expect(spreadPercent(typed)).toBeCloseTo(5, 12)
    expect(typed).toEqual([2.1, 2.0, 1.9])
  })

  it('refuses no readings and impossible readings', () => {
    for (const run of [meanFlow, spreadPercent, deviationsPercent]) {
      expect(() => run([])).toThrow('meanFlow: readings must hold at least one value, got none')
    }
    expectRefused('meanFlow', value => meanFlow([2, value]), [-0.01])
    expect(() => meanFlow([2, -1])).toThrow('meanFlow: readings[1] must be 0 or more, got -1')
  })
})

describe('flow from a buret', () => {
  // Source: NIOSH NMAM, 4th edition, chapter D, 7a(5): average the times, then divide. Numbers computed by hand: mean time 20 s.
  it('averages the times, not the flows', () => {
    expect(flowFromBuret(500, [10, 30])).toBeCloseTo(1.5, 12)
    expect((flowFromBuret(500, [10]) + flowFromBuret(500, [30])) / 2).toBeCloseTo(2, 12)
  })

  it('refuses a volume or a time that is not above 0', () => {
    expectRefused('flowFromBuret', value => flowFromBuret(value, [15]), [0, -1])
    expectRefused('flowFromBuret', value => flowFromBuret(500, [15, value]), [0, -1])
    expect(() => flowFromBuret(500, [])).toThrow('flowFromBuret: seconds must hold at least one value, got none')
  })
})

describe('calibrator in date', () => {
  it('still counts on the due day and no longer the day after', () => {
    expect(isCalibratorInDate('2026-07-03', '2026-07-02')).toBe(true)
    expect(isCalibratorInDate('2026-07-03', '2026-07-03')).toBe(true)
    expect(isCalibratorInDate('2026-07-03', '2026-07-04')).toBe(false)
    expect(isCalibratorInDate('2026-12-31', '2027-01-01')).toBe(false)
  })

  it.each(['2026-02-30', '2026-2-3', '03.07.2026', '', '2026-07-03T00:00:00Z', '2026-13-01', '2026-00-10', '2026-04-31', '2026-01-00'])('refuses %j as a day', (day) => {
    expect(() => isCalibratorInDate(day, '2026-07-03')).toThrow('isCalibratorInDate: dueOn must be a day written YYYY-MM-DD')
    expect(() => isCalibratorInDate('2026-07-03', day)).toThrow('isCalibratorInDate: onDay must be a day written YYYY-MM-DD')
  })

  it('knows leap days', () => {
    expect(isCalibratorInDate('2028-02-29', '2028-02-29')).toBe(true)
    expect(isCalibratorInDate('2000-02-29', '2000-02-29')).toBe(true)
    expect(() => isCalibratorInDate('2100-02-29', '2100-02-28')).toThrow(RangeError)
  })
})
