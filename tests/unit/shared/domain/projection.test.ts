import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { minutesToVolume, projectVolume } from '#shared/domain/projection'
import { expectRefused } from './refuses'

const nowAt = '2026-07-03T08:00:00Z'

describe('minutes to a volume', () => {
  it('are the volume over the flow', () => {
    expect(minutesToVolume(8, 0.05)).toBe(160)
    expect(minutesToVolume(0, 2)).toBe(0)
  })

  it('refuse a pump that draws nothing', () => {
    expectRefused('minutesToVolume', value => minutesToVolume(8, value), [0, -1])
    expectRefused('minutesToVolume', value => minutesToVolume(value, 2), [-1])
  })
})

describe('projection of a running sample', () => {
  it('says when the minimum and the maximum are reached and what the planned end brings', () => {
    expect(projectVolume({ litresSoFar: 100, litresPerMinute: 2, minimumLitres: 400, maximumLitres: 1000, nowAt, plannedEndAt: '2026-07-03T14:00:00Z' })).toEqual({
      minimum: { litres: 400, reached: false, minutesLeft: 150, at: '2026-07-03T10:30:00.000Z' },
      maximum: { litres: 1000, reached: false, minutesLeft: 450, at: '2026-07-03T15:30:00.000Z' },
      litresAtPlannedEnd: 820,
    })
  })

  it('says that a volume is reached from the very litre on', () => {
    expect(projectVolume({ litresSoFar: 400, litresPerMinute: 2, minimumLitres: 400, nowAt }).minimum).toEqual({ litres: 400, reached: true })
    expect(projectVolume({ litresSoFar: 399.99, litresPerMinute: 2, minimumLitres: 400, nowAt }).minimum?.reached).toBe(false)
  })

  it('keeps the volume so far when the planned end is past', () => {
    expect(projectVolume({ litresSoFar: 400, litresPerMinute: 2, nowAt, plannedEndAt: '2026-07-03T07:00:00Z' }).litresAtPlannedEnd).toBe(400)
  })

  it('says nothing about what was not asked', () => {
    expect(projectVolume({ litresSoFar: 0, litresPerMinute: 2, minimumLitres: null, maximumLitres: null, nowAt, plannedEndAt: null }))
      .toEqual({ minimum: null, maximum: null, litresAtPlannedEnd: null })
  })

  it('says never for a pump that draws nothing, and for a time that no calendar holds', () => {
    expect(projectVolume({ litresSoFar: 1, litresPerMinute: 0, minimumLitres: 400, nowAt, plannedEndAt: '2026-07-03T14:00:00Z' }))
      .toEqual({ minimum: { litres: 400, reached: false, minutesLeft: null, at: null }, maximum: null, litresAtPlannedEnd: 1 })
    expect(projectVolume({ litresSoFar: 0, litresPerMinute: 1e-9, minimumLitres: 4000, nowAt }).minimum).toMatchObject({ reached: false, at: null })
  })

  it('counts real minutes over the night the clocks go back', () => {
    expect(projectVolume({ litresSoFar: 0, litresPerMinute: 1, nowAt: '2026-10-25T00:30:00+01:00', plannedEndAt: '2026-10-25T08:30:00+00:00' }).litresAtPlannedEnd).toBe(540)
  })

  it('reaches the minimum before the maximum', () => {
    fc.assert(fc.property(fc.double({ min: 0.01, max: 20, noNaN: true }), fc.integer({ min: 1, max: 1000 }), fc.integer({ min: 1, max: 1000 }), (flow, least, more) => {
      const { minimum, maximum } = projectVolume({ litresSoFar: 0, litresPerMinute: flow, minimumLitres: least, maximumLitres: least + more, nowAt })
      expect(minimum?.reached === false && maximum?.reached === false && Number(minimum.minutesLeft) < Number(maximum.minutesLeft)).toBe(true)
    }))
  })

  it('refuses impossible numbers', () => {
    const plain = { litresSoFar: 1, litresPerMinute: 2, nowAt }
    expectRefused('projectVolume', litresSoFar => projectVolume({ ...plain, litresSoFar }), [-1])
    expectRefused('projectVolume', litresPerMinute => projectVolume({ ...plain, litresPerMinute }), [-1])
    expectRefused('projectVolume', minimumLitres => projectVolume({ ...plain, minimumLitres }), [-1])
    expectRefused('projectVolume', maximumLitres => projectVolume({ ...plain, maximumLitres }), [0, -1])
    expect(() => projectVolume({ ...plain, nowAt: '08:00' })).toThrow('projectVolume: an instant must be')
    expect(() => projectVolume({ ...plain, plannedEndAt: '08:00' })).toThrow('projectVolume: an instant must be')
  })
})
