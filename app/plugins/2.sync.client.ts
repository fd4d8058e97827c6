import { watchClock } from '~/local/clock-watch'

/** Sends and fetches while a page of the field is open, for the person who is at work on this phone. */
export default defineNuxtPlugin(() => {
  const session = useSessionStore()
  const router = useRouter()
  const isInField = ref(false)
  router.afterEach((to) => { isInField.value = isFieldPath(to.path) })
  isInField.value = isFieldPath(router.currentRoute.value.path)

  let endWatch = () => {}
  watch([isInField, () => session.fieldStore], ([inField, store]) => {
    endWatch()
    endWatch = () => {}
    if (inField) session.followPhone()
    useSyncStore().follow(inField ? store : null)
    if (inField && store) endWatch = watchClock(store, runningSheets)
  }, { immediate: true })

  function runningSheets(): string[] {
    const { sheets } = session
    if (!sheets) return []
    const nowAt = new Date().toISOString()
    return sheets.sheetIds.filter(id => sheets.assess(id, nowAt)?.progress === 'running')
  }
})

function isFieldPath(path: string): boolean {
  return path === '/field' || path.startsWith('/field/')
}
