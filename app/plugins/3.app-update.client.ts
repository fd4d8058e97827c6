/** Lets a new version of the app in without losing a letter: drafts first, then the new worker, then each tab loads anew. */
export default defineNuxtPlugin((nuxtApp) => {
  const sync = useSyncStore()
  // The worker's own plugin comes after this one.
  nuxtApp.hook('app:created', () => nuxtApp.runWithContext(() => {
    const { isReady } = useAppUpdate()
    watchEffect(() => { sync.updateReady = isReady.value })
  }))

  if (typeof BroadcastChannel !== 'undefined') {
    const channel = new BroadcastChannel(UPDATE_CHANNEL)
    channel.addEventListener('message', (message) => { if (message.data === 'about-to-update') void flushDrafts() })
  }

  // The first worker that takes a page over is no update.
  const worker = 'serviceWorker' in navigator ? navigator.serviceWorker : undefined
  if (worker?.controller) worker.addEventListener('controllerchange', () => { void reload() }, { once: true })

  // A part of the app that an older page asks for may be gone after an update: keep the text, then load the page it was for.
  const broken = new Set<unknown>()
  nuxtApp.hook('app:chunkError', ({ error }) => { broken.add(error) })
  useRouter().onError((error, to) => { if (broken.has(error)) void reload(to.fullPath) })

  async function reload(path?: string) {
    await flushDrafts()
    reloadNuxtApp({ path, persistState: false })
  }
})
