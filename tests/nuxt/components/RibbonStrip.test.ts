import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import type { RibbonInput } from '#shared/assessment/ribbon'
import RibbonStrip from '~/components/RibbonStrip.vue'

const running: RibbonInput = {
  shift: { fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T14:00:00Z' },
  nowAt: '2026-07-03T10:34:00Z',
  spans: [{ fromAt: '2026-07-03T06:02:00Z', toAt: '2026-07-03T09:00:00Z' }, { fromAt: '2026-07-03T09:34:00Z', toAt: null }],
  pauses: [{ fromAt: '2026-07-03T09:00:00Z', toAt: '2026-07-03T09:34:00Z', reason: null }],
  checks: [],
  faults: [],
  plannedEndAt: null,
  minimumAt: '2026-07-03T08:40:00Z',
  maximumAt: null,
}

describe('RibbonStrip', () => {
  it('is one image whose name tells what it shows', async () => {
    const ribbon = await mountSuspended(RibbonStrip, { props: { input: running, zone: 'Europe/London', name: 'W-03' } })
    const image = ribbon.get('svg')
    expect(image.attributes('role')).toBe('img')
    expect(image.attributes('aria-label')).toBe('W-03: Air drawn since 07:02, paused 34 minutes, running, minimum volume reached 09:40')
  })

  it('shows hours in the zone of the place, and none when there is no room for them', async () => {
    const tall = await mountSuspended(RibbonStrip, { props: { input: running, zone: 'Europe/London', height: 40 } })
    expect(tall.findAll('text').map(one => one.text())).toContain('08:00')
    const low = await mountSuspended(RibbonStrip, { props: { input: running, zone: 'Europe/London', height: 28, compact: true } })
    expect(low.findAll('text')).toHaveLength(0)
  })

  it('follows the clock: the next second moves what is drawn', async () => {
    const ribbon = await mountSuspended(RibbonStrip, { props: { input: running, zone: 'UTC' } })
    const before = ribbon.html()
    await ribbon.setProps({ input: { ...running, nowAt: '2026-07-03T11:34:00Z' } })
    expect(ribbon.html()).not.toBe(before)
  })
})
