const MINUTE_MILLISECONDS = 60_000

/**
 * The time now to the minute, for "since" and "ago" on office pages: whole tables are not drawn anew every second. Never
 * before the instant at which the page was made, so that nothing just written seems to lie ahead.
 */
export function useOfficeNow() {
  const clock = useClockStore()
  const madeMs = useState('office-page-made', () => Date.now())
  const minuteMs = computed(() => Math.floor(clock.nowMs / MINUTE_MILLISECONDS) * MINUTE_MILLISECONDS)
  const nowMs = computed(() => Math.max(minuteMs.value, madeMs.value))
  const nowAt = computed(() => new Date(nowMs.value).toISOString())

  /** Something fresh was loaded: what it says may be younger than the minute. */
  function touch() {
    madeMs.value = Date.now()
  }

  return { nowMs, nowAt, touch }
}
