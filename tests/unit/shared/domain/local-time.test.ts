import { describe, expect, it } from 'vitest'
import { minutesBetween } from '#shared/domain/duration'
import { isZone, localInstant, localParts } from '#shared/domain/local-time'

/** Source of every change of the clocks here: IANA time zone database, 2026. */
const changes = [
  {
    zone: 'Europe/London',
    springs: { before: ['2026-03-29T00:59:59', '2026-03-29T00:59:59.000Z'], missing: ['2026-03-29T01:00', '2026-03-29T01:30', '2026-03-29T01:59:59'], after: ['2026-03-29T02:00', '2026-03-29T01:00:00.000Z'] },
    falls: { before: ['2026-10-25T00:59:59', '2026-10-24T23:59:59.000Z'], twice: '2026-10-25T01:30', first: '2026-10-25T00:30:00.000Z', second: '2026-10-25T01:30:00.000Z', after: ['2026-10-25T02:00', '2026-10-25T02:00:00.000Z'] },
    minutes: 60,
  },
  {
    zone: 'America/New_York',
    springs: { before: ['2026-03-08T01:59:59', '2026-03-08T06:59:59.000Z'], missing: ['2026-03-08T02:00', '2026-03-08T02:30', '2026-03-08T02:59:59'], after: ['2026-03-08T03:00', '2026-03-08T07:00:00.000Z'] },
    falls: { before: ['2026-11-01T00:59:59', '2026-11-01T04:59:59.000Z'], twice: '2026-11-01T01:30', first: '2026-11-01T05:30:00.000Z', second: '2026-11-01T06:30:00.000Z', after: ['2026-11-01T02:00', '2026-11-01T07:00:00.000Z'] },
    minutes: 60,
  },
  {
    // Half an hour, and the seasons the other way round.
    zone: 'Australia/Lord_Howe',
    springs: { before: ['2026-10-04T01:59:59', '2026-10-03T15:29:59.000Z'], missing: ['2026-10-04T02:00', '2026-10-04T02:15', '2026-10-04T02:29:59'], after: ['2026-10-04T02:30', '2026-10-03T15:30:00.000Z'] },
    falls: { before: ['2026-04-05T01:29:59', '2026-04-04T14:29:59.000Z'], twice: '2026-04-05T01:45', first: '2026-04-04T14:45:00.000Z', second: '2026-04-04T15:15:00.000Z', after: ['2026-04-05T02:00', '2026-04-04T15:30:00.000Z'] },
    minutes: 30,
  },
] as const

describe.each(changes)('local time in $zone', ({ zone, springs, falls, minutes }) => {
  it('asks back a time that does not exist when the clocks go forward', () => {
    for (const missing of springs.missing) {
      expect(localInstant(missing, zone), missing).toEqual({ ok: false, reason: 'missing' })
      expect(localInstant(missing, zone, 'first')).toEqual({ ok: false, reason: 'missing' })
    }
  })

  it('takes the last second before and the first time after the gap', () => {
    for (const [local, utc] of [springs.before, springs.after]) expect(localInstant(local, zone), local).toEqual({ ok: true, at: utc })
  })

  it('asks back a time that comes twice when the clocks go back, with both choices', () => {
    expect(localInstant(falls.twice, zone)).toEqual({ ok: false, reason: 'ambiguous', choices: { first: falls.first, second: falls.second } })
    expect(minutesBetween(falls.first, falls.second)).toBe(minutes)
  })

  it('takes the choice that was made', () => {
    expect(localInstant(falls.twice, zone, 'first')).toEqual({ ok: true, at: falls.first })
    expect(localInstant(falls.twice, zone, 'second')).toEqual({ ok: true, at: falls.second })
  })

  it('takes the last second before and the first time after the doubled stretch', () => {
    for (const [local, utc] of [falls.before, falls.after]) expect(localInstant(local, zone), local).toEqual({ ok: true, at: utc })
  })

  it('shows the same wall clock for both instants of a doubled time', () => {
    for (const instant of [falls.first, falls.second]) {
      const parts = localParts(instant, zone)
      expect(`${parts.dayOn}T${parts.time}`).toBe(falls.twice)
    }
    expect(localParts(falls.first, zone).offsetMinutes - localParts(falls.second, zone).offsetMinutes).toBe(minutes)
  })

  it('comes back all through the year', () => {
    for (let instant = Date.UTC(2026, 0, 1); instant < Date.UTC(2027, 0, 1); instant += 150 * 60_000) {
      const at = new Date(instant).toISOString()
      const { dayOn, time } = localParts(at, zone)
      const back = localInstant(`${dayOn}T${time}`, zone)
      if (back.ok) expect(back.at).toBe(at)
      else expect(back.reason === 'ambiguous' && Object.values(back.choices)).toContain(at)
    }
  })
})

describe('local time', () => {
  it('takes a choice for a plain time without harm', () => {
    expect(localInstant('2026-07-03T07:02', 'Europe/London', 'second')).toEqual({ ok: true, at: '2026-07-03T06:02:00.000Z' })
  })

  it('knows zones without summer time and with odd offsets', () => {
    expect(localInstant('2026-07-03T07:02:30', 'UTC')).toEqual({ ok: true, at: '2026-07-03T07:02:30.000Z' })
    expect(localInstant('2026-07-03T05:45', 'Asia/Kathmandu')).toEqual({ ok: true, at: '2026-07-03T00:00:00.000Z' })
  })

  // Source: IANA time zone database; Samoa went over the date line, and 30 December 2011 did not exist there.
  it('knows that a whole day can be missing', () => {
    expect(localInstant('2011-12-30T12:00', 'Pacific/Apia')).toEqual({ ok: false, reason: 'missing' })
    expect(localInstant('2011-12-31T12:00', 'Pacific/Apia').ok).toBe(true)
  })

  it('gives every part of the wall clock', () => {
    expect(localParts('2026-12-31T23:30:59.900Z', 'Europe/Berlin')).toEqual({
      dayOn: '2027-01-01', time: '00:30', year: 2027, month: 1, day: 1, hour: 0, minute: 30, second: 59, offsetMinutes: 60,
    })
    expect(localParts('2026-07-03T00:00:00Z', 'America/New_York')).toMatchObject({ dayOn: '2026-07-02', time: '20:00', offsetMinutes: -240 })
    expect(localParts('1969-12-31T23:59:59.500Z', 'UTC')).toMatchObject({ dayOn: '1969-12-31', second: 59 })
  })

  it('makes a shift across the change of the clocks as long as it was', () => {
    const start = localInstant('2026-03-08T00:30', 'America/New_York')
    const stop = localInstant('2026-03-08T08:30', 'America/New_York')
    expect(start.ok && stop.ok && minutesBetween(start.at, stop.at)).toBe(420)
  })

  it.each(['2026-02-30T10:00', '2026-07-03T24:00', '2026-07-03T10:60', '2026-07-03', '2026-07-03T10:00Z', '3.7.2026 10:00', ''])('refuses %j as a local time', (text) => {
    expect(() => localInstant(text, 'Europe/London')).toThrow('localInstant: localText must be a time of the calendar')
  })

  it('refuses a zone that does not exist', () => {
    expect(() => localInstant('2026-07-03T10:00', 'Europe/Nowhere')).toThrow('zone must be a name of the IANA time zone database, got Europe/Nowhere')
    expect(() => localParts('2026-07-03T10:00:00Z', 'Moon/Base')).toThrow(RangeError)
    expect(isZone('Europe/Nowhere')).toBe(false)
    expect(isZone('Europe/London')).toBe(true)
  })
})
