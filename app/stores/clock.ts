const TICK_MILLISECONDS = 1000

/**
 * The time now, once a second, for everything on screen: one interval however many timers are shown. What is elapsed is always
 * computed from stored instants, so a tick that never came (locked phone, hidden tab) changes nothing.
 */
export const useClockStore = defineStore('clock', () => {
  const nowMs = ref(Date.now())
  const nowAt = computed(() => new Date(nowMs.value).toISOString())

  let interval: ReturnType<typeof setInterval> | undefined

  function recompute() {
    nowMs.value = Date.now()
  }

  function follow() {
    clearInterval(interval)
    interval = undefined
    if (document.visibilityState === 'hidden') return
    recompute()
    interval = setInterval(recompute, TICK_MILLISECONDS)
  }

  if (import.meta.client) {
    document.addEventListener('visibilitychange', follow)
    window.addEventListener('pageshow', follow)
    onScopeDispose(() => {
      clearInterval(interval)
      document.removeEventListener('visibilitychange', follow)
      window.removeEventListener('pageshow', follow)
    })
    // Not at once: a page from the server wakes up with the server's time first.
    if (document.visibilityState !== 'hidden') interval = setInterval(recompute, TICK_MILLISECONDS)
  }

  return { nowMs, nowAt, recompute }
})
