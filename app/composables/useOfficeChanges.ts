import { useDocumentVisibility, useIntervalFn } from '@vueuse/core'

/** So that what was sent is on the screen within five seconds, loading included. */
const POLL_MILLISECONDS = 4000

export interface OfficeChangesOptions {
  /** The version that the screen shows, or null before anything came. */
  shownVer: () => number | null | undefined
  /** Loads what is shown anew. */
  refresh: () => Promise<unknown>
  pollMilliseconds?: number
}

/**
 * Keeps an office page up to date while it is in sight: asks for the organisation's version every few seconds and
 * refreshes when it has moved on. A page that nobody sees asks nothing; it asks at once when it is seen again.
 */
export function useOfficeChanges({ shownVer, refresh, pollMilliseconds = POLL_MILLISECONDS }: OfficeChangesOptions) {
  const visibility = useDocumentVisibility()
  const isReachable = shallowRef(true)
  let isAsking = false

  async function ask() {
    const ver = shownVer()
    if (isAsking || ver === null || ver === undefined || visibility.value === 'hidden') return
    isAsking = true
    try {
      const answer = await $fetch<{ ver: number }>('/api/changes', { timeout: pollMilliseconds })
      isReachable.value = true
      if (answer.ver !== ver) await refresh()
    }
    catch {
      // The page says that it may be old; the next poll tries again.
      isReachable.value = false
    }
    finally {
      isAsking = false
    }
  }

  const { pause, resume } = useIntervalFn(ask, pollMilliseconds, { immediate: false })

  onMounted(resume)
  watch(visibility, (now) => {
    if (now === 'visible') void ask()
  })

  return { isReachable, ask, pause }
}
