import { THEME_KEY, THEMES } from '~/stores/preferences'

/**
 * Shows the kept theme before the first paint. The server cannot know it, so the page carries a few words of script in its
 * head (with the nonce or hash of the page's policy); where that is refused, the store does the same a moment later.
 */
export default defineNuxtPlugin({
  name: 'theme',
  dependsOn: ['pinia'],
  setup(nuxtApp) {
    if (import.meta.server) {
      useHead({ script: [{ innerHTML: firstPaintScript(), tagPosition: 'head', tagPriority: 'critical' }] })
      return
    }
    const preferences = usePreferencesStore()
    // A page drawn by the server wakes up in Day first, so that both agree; the document itself already shows the theme.
    if (nuxtApp.payload.serverRendered) nuxtApp.hook('app:suspense:resolve', () => preferences.restore())
    else preferences.restore()
  },
})

function firstPaintScript(): string {
  const names = JSON.stringify(THEMES)
  return `try{var t=localStorage.getItem('${THEME_KEY}');document.documentElement.dataset.theme=${names}.indexOf(t)>=0?t:matchMedia('(prefers-contrast: more)').matches?'sun':'day'}catch(e){}`
}
