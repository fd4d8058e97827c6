import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { minutesBetween, runSpans, sampledMinutes, unionMinutes } from '#shared/domain/duration'

const at = (time: string, day = '2026-07-03') => `${day}T${time}:00Z`
const pause = (from: string, to?: string) => ({ fromAt: at(from), toAt: to === undefined ? null : at(to) })
const shift = { startedAt: at('07:00'), stoppedAt: at('15:00') }

describe('sampled minutes', () => {
  it('are the minutes from start to stop without a pause', () => {
    expect(sampledMinutes({ ...shift, pauses: [] })).toBe(480)
    expect(sampledMinutes({ startedAt: at('07:00'), stoppedAt: at('07:00'), pauses: [] })).toBe(0)
  })

  // Source: elapsed 509 min less 34 min, computed by hand.
  it('take a lunch pause off', () => {
    expect(sampledMinutes({ startedAt: at('07:02'), stoppedAt: at('15:31'), pauses: [pause('11:30', '12:04')] })).toBe(475)
  })

  it('count overlapping and touching pauses once', () => {
    expect(sampledMinutes({ ...shift, pauses: [pause('10:00', '11:00'), pause('10:30', '11:30'), pause('11:30', '12:00')] })).toBe(360)
    expect(sampledMinutes({ ...shift, pauses: [pause('10:00', '12:00'), pause('10:30', '11:00')] })).toBe(360)
  })

  it('cut pauses to the run', () => {
    expect(sampledMinutes({ ...shift, pauses: [pause('06:00', '07:30'), pause('14:30', '16:00')] })).toBe(420)
    expect(sampledMinutes({ ...shift, pauses: [pause('05:00', '06:00'), pause('16:00', '17:00')] })).toBe(480)
    expect(sampledMinutes({ ...shift, pauses: [pause('05:00', '17:00')] })).toBe(0)
  })

  it('take a pause that still lasts to reach to the stop', () => {
    expect(sampledMinutes({ ...shift, pauses: [pause('14:00')] })).toBe(420)
    expect(sampledMinutes({ ...shift, pauses: [{ fromAt: at('14:00') }] })).toBe(420)
    expect(sampledMinutes({ ...shift, pauses: [pause('16:00')] })).toBe(480)
  })

  it('keep seconds and milliseconds, not rounded', () => {
    expect(sampledMinutes({ startedAt: '2026-07-03T07:00:00.000Z', stoppedAt: '2026-07-03T07:00:30.600Z', pauses: [] })).toBe(0.51)
  })

  it('go across midnight', () => {
    expect(sampledMinutes({ startedAt: at('22:00'), stoppedAt: at('06:00', '2026-07-04'), pauses: [{ fromAt: at('23:45'), toAt: at('00:15', '2026-07-04') }] })).toBe(450)
  })

  // Source: IANA time zone database; the same wall clock times on the two nights of 2026 in Europe/London.
  it('know nothing of summer time', () => {
    const spring = { startedAt: '2026-03-29T00:30:00+00:00', stoppedAt: '2026-03-29T08:30:00+01:00', pauses: [] }
    const autumn = { startedAt: '2026-10-25T00:30:00+01:00', stoppedAt: '2026-10-25T08:30:00+00:00', pauses: [] }
    expect(sampledMinutes(spring)).toBe(420)
    expect(sampledMinutes(autumn)).toBe(540)
  })

  it('refuse a stop before the start, a pause that ends before it begins, and a text that is no instant', () => {
    expect(() => sampledMinutes({ startedAt: at('09:00'), stoppedAt: at('08:00'), pauses: [] }))
      .toThrow('sampledMinutes: stoppedAt must be at or after 2026-07-03T09:00:00Z, got 2026-07-03T08:00:00Z')
    expect(() => sampledMinutes({ ...shift, pauses: [pause('12:00', '11:00')] })).toThrow('sampledMinutes: the end of a pause must be at or after')
    expect(() => sampledMinutes({ ...shift, pauses: [], startedAt: '2026-07-03T07:00' })).toThrow(RangeError)
    expect(() => runSpans({ ...shift, pauses: [], stoppedAt: 'soon' })).toThrow(RangeError)
  })
})

describe('spans in which air was drawn', () => {
  it('lie between the pauses, as UTC instants', () => {
    expect(runSpans({ startedAt: '2026-07-03T09:00:00+02:00', stoppedAt: at('15:00'), pauses: [pause('13:00', '13:30'), pause('10:00', '10:15')] })).toEqual([
      { fromAt: '2026-07-03T07:00:00.000Z', toAt: '2026-07-03T10:00:00.000Z' },
      { fromAt: '2026-07-03T10:15:00.000Z', toAt: '2026-07-03T13:00:00.000Z' },
      { fromAt: '2026-07-03T13:30:00.000Z', toAt: '2026-07-03T15:00:00.000Z' },
    ])
  })

  it('are none when the whole run was paused or lasted no time', () => {
    expect(runSpans({ ...shift, pauses: [pause('07:00', '15:00')] })).toEqual([])
    expect(runSpans({ ...shift, pauses: [pause('07:00')] })).toEqual([])
    expect(runSpans({ startedAt: at('07:00'), stoppedAt: at('07:00'), pauses: [] })).toEqual([])
  })

  it('are not split by a pause of no length', () => {
    expect(runSpans({ ...shift, pauses: [pause('10:00', '10:00')] })).toHaveLength(1)
    expect(sampledMinutes({ ...shift, pauses: [pause('10:00', '10:00')] })).toBe(480)
  })
})

describe('any run', () => {
  const minute = fc.integer({ min: -120, max: 720 })
  const pauses = fc.array(fc.tuple(minute, fc.nat(200)).map(([from, length]) => ({ fromAt: after(from), toAt: after(from + length) })), { maxLength: 8 })

  it('gives the same minutes whatever the order of the pauses', () => {
    fc.assert(fc.property(pauses.chain(list => fc.tuple(fc.constant(list), fc.shuffledSubarray(list, { minLength: list.length }))), ([list, shuffled]) => {
      expect(sampledMinutes(run(shuffled))).toBe(sampledMinutes(run(list)))
      expect(runSpans(run(shuffled))).toEqual(runSpans(run(list)))
    }))
  })

  it('does not change when a pause is written down twice', () => {
    fc.assert(fc.property(pauses, (list) => {
      expect(sampledMinutes(run([...list, ...list]))).toBe(sampledMinutes(run(list)))
    }))
  })

  it('agrees with counting minute by minute', () => {
    fc.assert(fc.property(pauses, (list) => {
      let drawn = 0
      for (let minute = 0; minute < 480; minute += 1) {
        if (!list.some(one => one.fromAt <= after(minute) && after(minute) < one.toAt)) drawn += 1
      }
      expect(sampledMinutes(run(list))).toBe(drawn)
    }))
  })

  it('has spans that add up to its minutes, in order and apart from each other', () => {
    fc.assert(fc.property(pauses, (list) => {
      const spans = runSpans(run(list))
      expect(spans.reduce((sum, span) => sum + minutesBetween(span.fromAt, span.toAt), 0)).toBe(sampledMinutes(run(list)))
      spans.forEach((span, place) => {
        expect(span.fromAt < span.toAt).toBe(true)
        const next = spans[place + 1]
        if (next) expect(span.toAt < next.fromAt).toBe(true)
      })
    }))
  })

  function run(list: readonly { fromAt: string, toAt: string }[]) {
    return { startedAt: after(0), stoppedAt: after(480), pauses: list }
  }

  function after(minutes: number): string {
    return new Date(Date.UTC(2026, 6, 3, 20) + minutes * 60_000).toISOString()
  }
})

describe('minutes between two instants', () => {
  it('are negative when the second lies before the first', () => {
    expect(minutesBetween(at('23:50'), '2026-07-04T00:05:30Z')).toBe(15.5)
    expect(minutesBetween(at('08:00'), at('07:00'))).toBe(-60)
    expect(() => minutesBetween('yesterday', at('07:00'))).toThrow('minutesBetween: an instant must be')
  })
})

describe('minutes of several spans together', () => {
  it('count once where they overlap', () => {
    expect(unionMinutes([])).toBe(0)
    expect(unionMinutes([
      { fromAt: at('09:00'), toAt: at('10:00') },
      { fromAt: at('07:00'), toAt: at('08:30') },
      { fromAt: at('08:00'), toAt: at('08:45') },
    ])).toBe(165)
    expect(() => unionMinutes([{ fromAt: at('09:00'), toAt: at('08:00') }])).toThrow('unionMinutes: span must be at or after')
  })
})
