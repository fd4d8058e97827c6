import { describe, expect, it } from 'vitest'
import { formatAgo, formatClockOff, formatCount, formatDays, formatDuration, formatFlow, formatInstant, formatPercent, formatQuantity, formatTime, formatVolume, formatWeekday, formatZone, inWords, withLocalTimes } from '../../../app/utils/format'

describe('numbers for eyes', () => {
  it('shows a flow to four figures in the unit that was asked for', () => {
    expect(inWords(formatFlow(2.0333333))).toBe('2.033 L/min')
    expect(inWords(formatFlow(0.05, 'mL/min'))).toBe('50.00 mL/min')
  })

  it('shows litres with a tenth up to a thousand and whole beyond', () => {
    expect(formatVolume(984.25).value).toBe('984.3')
    expect(formatVolume(1023.4).value).toBe('1023')
    expect(formatVolume(2.4).value).toBe('2.400')
  })

  it('never hides that a threshold was crossed by rounding', () => {
    expect(formatPercent(5.04).value).toBe('5.04')
    expect(formatPercent(5).value).toBe('5.0')
    expect(formatPercent(4.96).value).toBe('4.96')
    expect(formatPercent(5.26).value).toBe('5.3')
  })

  it('writes a change with its sign and a real minus', () => {
    expect(formatPercent(3.21, { sign: true }).value).toBe('+3.2')
    expect(formatPercent(-3.21, { sign: true }).value).toBe('\u22123.2')
    expect(formatPercent(0, { sign: true }).value).toBe('0.0')
  })

  it('says what is not known in words', () => {
    expect(inWords(null)).toBe('not known yet')
    expect(formatQuantity(474.96, 'min').value).toBe('475')
    expect(formatQuantity(3, '').value).toBe('3')
  })

  it('counts with the right noun', () => {
    expect(formatCount(1, 'sheet')).toBe('1 sheet')
    expect(formatCount(0, 'sheet')).toBe('0 sheets')
  })
})

describe('times for eyes', () => {
  it('shows the wall clock of the place, in summer and in winter', () => {
    expect(formatTime('2026-07-03T06:02:09Z', 'Europe/London')).toBe('07:02')
    expect(formatInstant('2026-12-03T06:02:09Z', 'Europe/London', { seconds: true })).toBe('3 Dec 2026, 06:02:09')
  })

  it('names the zone and its offset at that instant', () => {
    expect(formatZone('Europe/London', '2026-07-03T06:02:00Z')).toBe('Europe/London, UTC+1')
    expect(formatZone('America/St_Johns', '2026-01-03T06:02:00Z')).toBe('America/St_Johns, UTC\u22123:30')
    expect(formatZone('UTC', '2026-01-03T06:02:00Z')).toBe('UTC')
  })

  it('says nothing twice in a range of days', () => {
    expect(formatDays('2026-03-03', '2026-03-05')).toBe('3 to 5 Mar 2026')
    expect(formatDays('2026-02-27', '2026-03-01')).toBe('27 Feb to 1 Mar 2026')
    expect(formatDays('2025-12-31', '2026-01-02')).toBe('31 Dec 2025 to 2 Jan 2026')
    expect(formatWeekday('2026-03-03')).toBe('Tue 3 Mar 2026')
  })

  it('says durations as people do', () => {
    expect(formatDuration(475)).toBe('7 h 55 min')
    expect(formatDuration(0.4)).toBe('under 1 min')
    expect(formatDuration(1500)).toBe('1 d 1 h')
    expect(formatAgo('2026-03-03T07:00:00Z', Date.parse('2026-03-03T09:59:00Z'))).toBe('2 h ago')
    expect(formatAgo('2026-03-03T07:05:00Z', Date.parse('2026-03-03T07:00:00Z'))).toBe('in 5 min')
  })

  it('says which way a clock is off: server minus phone above 0 is a phone behind', () => {
    expect(formatClockOff(47_000)).toBe('47 s behind')
    expect(formatClockOff(-300_000)).toBe('5 min ahead')
  })

  it('puts every instant of a sentence into the zone', () => {
    expect(withLocalTimes('2026-07-03T06:02:00Z to 2026-07-03T07:00:00.500Z', 'Europe/London')).toBe('3 Jul 2026, 07:02:00 to 3 Jul 2026, 08:00:00')
  })
})
