/** Shows the kept theme before the first paint of the field, and before the office wakes up. */
export default defineNuxtPlugin({
  name: 'theme',
  dependsOn: ['pinia'],
  setup(nuxtApp) {
    const preferences = usePreferencesStore()
    // A page drawn by the server comes in Day: the store changes after it has woken, so that both agree while it wakes.
    if (nuxtApp.payload.serverRendered) nuxtApp.hook('app:suspense:resolve', () => preferences.restore())
    else preferences.restore()
  },
})
