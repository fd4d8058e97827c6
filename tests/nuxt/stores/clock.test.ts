import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { useClockStore } from '~/stores/clock'

function hide(isHidden: boolean) {
  Object.defineProperty(document, 'visibilityState', { value: isHidden ? 'hidden' : 'visible', configurable: true })
  document.dispatchEvent(new Event('visibilitychange'))
}

beforeEach(() => {
  vi.useFakeTimers({ now: Date.parse('2026-07-03T06:00:00Z') })
  setActivePinia(createPinia())
})

afterEach(() => {
  hide(false)
  vi.useRealTimers()
})

describe('the clock', () => {
  it('ticks once a second, with one interval for all', () => {
    const clock = useClockStore()
    expect(useClockStore()).toBe(clock)
    expect(vi.getTimerCount()).toBe(1)
    vi.advanceTimersByTime(3000)
    expect(clock.nowAt).toBe('2026-07-03T06:00:03.000Z')
    clock.$dispose()
  })

  it('rests while the page is hidden and is right at once when it is shown again', () => {
    const clock = useClockStore()
    hide(true)
    expect(vi.getTimerCount()).toBe(0)
    vi.setSystemTime(Date.parse('2026-07-03T09:30:00Z'))
    expect(clock.nowAt).toBe('2026-07-03T06:00:00.000Z')
    hide(false)
    expect(clock.nowAt).toBe('2026-07-03T09:30:00.000Z')
    vi.advanceTimersByTime(1000)
    expect(clock.nowAt).toBe('2026-07-03T09:30:01.000Z')
    clock.$dispose()
  })

  it('is right after the browser brings the page back from its cache', () => {
    const clock = useClockStore()
    vi.setSystemTime(Date.parse('2026-07-03T12:00:00Z'))
    window.dispatchEvent(new Event('pageshow'))
    expect(clock.nowMs).toBe(Date.parse('2026-07-03T12:00:00Z'))
    clock.$dispose()
  })
})
