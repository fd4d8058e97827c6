/** The channel on which the tabs of one phone tell each other that the app is about to be replaced. */
export const UPDATE_CHANNEL = 'lapel-update'
const WAIT_FOR_TABS_MILLISECONDS = 1500

/**
 * A new version of the app waits until the person takes it. Before it takes over, every open tab writes down what is being
 * typed; then all of them load anew.
 */
export function useAppUpdate() {
  const { $pwa } = useNuxtApp()
  const isReady = computed(() => $pwa?.needRefresh ?? false)

  async function apply(): Promise<void> {
    await flushDrafts()
    await tellOtherTabs()
    // The new worker takes over; `3.app-update` loads each tab anew when it has.
    await $pwa?.updateServiceWorker(true)
  }

  return { isReady, apply }
}

/** Asks the other tabs to write down what is being typed, and gives them a moment to do so. */
async function tellOtherTabs(): Promise<void> {
  if (typeof BroadcastChannel === 'undefined') return
  const channel = new BroadcastChannel(UPDATE_CHANNEL)
  channel.postMessage('about-to-update')
  await new Promise(resolve => setTimeout(resolve, WAIT_FOR_TABS_MILLISECONDS))
  channel.close()
}
