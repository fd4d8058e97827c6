import { describe, expect, it } from 'vitest'
import type { RibbonInput } from '#shared/assessment/ribbon'
import { describeRibbon } from '#shared/assessment/ribbon-words'

const nothing: RibbonInput = {
  shift: { fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T14:00:00Z' },
  nowAt: '2026-07-03T10:34:00Z',
  spans: [],
  pauses: [],
  checks: [],
  faults: [],
  plannedEndAt: null,
  minimumAt: null,
  maximumAt: null,
}

describe('the words of a ribbon', () => {
  it('say in local time what is running', () => {
    const running: RibbonInput = {
      ...nothing,
      spans: [{ fromAt: '2026-07-03T06:02:00Z', toAt: '2026-07-03T09:00:00Z' }, { fromAt: '2026-07-03T09:34:00Z', toAt: null }],
      pauses: [{ fromAt: '2026-07-03T09:00:00Z', toAt: '2026-07-03T09:34:00Z', reason: 'lunch' }],
      checks: [{ at: '2026-07-03T06:20:00Z', verdict: 'within' }, { at: '2026-07-03T08:20:00Z', verdict: 'attention' }],
      faults: [{ at: '2026-07-03T08:19:00Z' }],
      minimumAt: '2026-07-03T08:40:00Z',
      maximumAt: '2026-07-03T13:40:00Z',
      plannedEndAt: '2026-07-03T13:30:00Z',
    }
    expect(describeRibbon(running, 'Europe/London')).toBe(
      'Air drawn since 07:02, paused 34 minutes (lunch), running, 2 flow checks, 1 of them beyond what is allowed, '
      + 'pump fault 09:19, minimum volume reached 09:40, maximum volume expected 14:40, planned to 14:30',
    )
  })

  it('say when it was stopped, and nothing of a volume it did not reach', () => {
    const stopped: RibbonInput = {
      ...nothing,
      spans: [{ fromAt: '2026-07-03T06:02:00Z', toAt: '2026-07-03T10:30:00Z' }],
      minimumAt: '2026-07-03T12:40:00Z',
      plannedEndAt: '2026-07-03T13:30:00Z',
    }
    expect(describeRibbon(stopped, 'UTC')).toBe('Air drawn 06:02 to 10:30')
  })

  it('count a pause that still lasts up to now', () => {
    const paused: RibbonInput = {
      ...nothing,
      spans: [{ fromAt: '2026-07-03T06:02:00Z', toAt: '2026-07-03T10:33:00Z' }],
      pauses: [{ fromAt: '2026-07-03T10:33:00Z', toAt: null, reason: null }],
    }
    expect(describeRibbon(paused, 'UTC')).toBe('Air drawn 06:02 to 10:33, paused now, so far 1 minute')
  })

  it('say that nothing has begun, and survive times that are none', () => {
    expect(describeRibbon(nothing, 'Europe/London')).toBe('No air drawn yet, shift 07:00 to 15:00')
    expect(describeRibbon({ ...nothing, shift: { fromAt: 'x', toAt: 'y' } }, 'UTC')).toContain('unknown time')
  })
})
