/** The themes in the order the switch goes through them. A new one also needs its block in `tailwind.css`. */
export const THEMES = ['day', 'sun'] as const
export type Theme = typeof THEMES[number]

/** Each theme's name, as its switch says it. */
export const THEME_WORDS: Readonly<Record<Theme, string>> = { day: 'Day', sun: 'Sun' }

export const THEME_KEY = 'lapel-theme'

/** How this person likes Lapel on this device. */
export const usePreferencesStore = defineStore('preferences', () => {
  const theme = ref<Theme>('day')
  const nextTheme = computed<Theme>(() => THEMES[(THEMES.indexOf(theme.value) + 1) % THEMES.length] ?? 'day')

  /** Takes up what was kept, or what the system asks for. Only in a browser, before anything is drawn. */
  function restore() {
    const kept = readKept()
    const isMoreContrast = window.matchMedia?.('(prefers-contrast: more)').matches
    show(kept ?? (isMoreContrast ? 'sun' : 'day'))
  }

  function setTheme(chosen: Theme) {
    show(chosen)
    try {
      localStorage.setItem(THEME_KEY, chosen)
    }
    catch {
      // A browser that keeps nothing still shows the theme until it is closed.
    }
  }

  function show(chosen: Theme) {
    theme.value = chosen
    document.documentElement.dataset.theme = chosen
  }

  return { theme, nextTheme, restore, setTheme }
})

function readKept(): Theme | undefined {
  try {
    const kept = localStorage.getItem(THEME_KEY)
    return THEMES.find(one => one === kept)
  }
  catch {
    return undefined
  }
}
