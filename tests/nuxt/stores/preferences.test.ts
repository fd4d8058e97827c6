import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { usePreferencesStore } from '~/stores/preferences'

beforeEach(() => {
  localStorage.clear()
  delete document.documentElement.dataset.theme
  setActivePinia(createPinia())
})

describe('preferences', () => {
  it('keep the chosen theme for the next time', () => {
    usePreferencesStore().setTheme('sun')
    expect(document.documentElement.dataset.theme).toBe('sun')
    setActivePinia(createPinia())
    const later = usePreferencesStore()
    later.restore()
    expect(later.theme).toBe('sun')
    expect(later.nextTheme).toBe('day')
  })

  it('start with Day, and with Sun where the system asks for more contrast', () => {
    const preferences = usePreferencesStore()
    preferences.restore()
    expect(document.documentElement.dataset.theme).toBe('day')
    vi.stubGlobal('matchMedia', (query: string) => ({ matches: query === '(prefers-contrast: more)' }))
    preferences.restore()
    expect(preferences.theme).toBe('sun')
    vi.unstubAllGlobals()
  })

  it('ignore a kept word that is no theme, and a browser that keeps nothing', () => {
    localStorage.setItem('lapel-theme', 'neon')
    const preferences = usePreferencesStore()
    preferences.restore()
    expect(preferences.theme).toBe('day')
    const refuse = vi.spyOn(Storage.prototype, 'setItem').mockImplementation(() => { throw new Error('no room') })
    preferences.setTheme('sun')
    expect(document.documentElement.dataset.theme).toBe('sun')
    refuse.mockRestore()
  })
})
