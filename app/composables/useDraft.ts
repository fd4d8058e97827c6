import type { MaybeRefOrGetter } from 'vue'
import { clearDraft, loadDraft, saveDraft, saveLastBreath } from '~/local/drafts'

const SAVE_AFTER_MILLISECONDS = 400

const flushers = new Set<() => Promise<void>>()

/** Writes every draft of this tab down now; an update of the app waits for it. */
export async function flushDrafts(): Promise<void> {
  await Promise.all([...flushers].map(flush => flush()))
}

/**
 * Text that is typed and not an operation yet: kept on the phone 400 ms after the last key and when the page is hidden or
 * goes away, and given back after a reload, a kill or a crash.
 *
 * @param key names the field for good, e.g. `<sheet id>/task`
 * @param initial what stands in the field when nothing was typed
 */
export function useDraft(key: MaybeRefOrGetter<string>, initial = '') {
  const session = useSessionStore()
  session.followPhone()
  const text = ref(initial)
  const isReady = ref(false)
  let timer: ReturnType<typeof setTimeout> | undefined
  /** What is kept on the phone; the difference to `text` is what is still to be written. */
  let kept = initial
  let keyOfText = toValue(key)

  watch([() => toValue(key), () => session.fieldStore], async ([nextKey, store]) => {
    if (nextKey !== keyOfText) {
      await flush()
      keyOfText = nextKey
      text.value = kept = initial
    }
    isReady.value = false
    if (!store) return
    const before = text.value
    const found = await loadDraft(store, nextKey)
    if (nextKey !== keyOfText) return
    // Whoever typed faster than the phone could read keeps the newer text.
    if (found !== null && text.value === before) text.value = kept = found
    isReady.value = true
  }, { immediate: true })

  watch(text, () => {
    clearTimeout(timer)
    if (text.value !== kept) timer = setTimeout(() => { void flush() }, SAVE_AFTER_MILLISECONDS)
  })

  async function flush() {
    clearTimeout(timer)
    const store = session.fieldStore
    if (!store || text.value === kept) return
    const writing = text.value
    await saveDraft(store, keyOfText, writing)
    kept = writing
  }

  async function clear() {
    clearTimeout(timer)
    text.value = kept = initial
    if (session.fieldStore) await clearDraft(session.fieldStore, keyOfText)
  }

  function leave() {
    const store = session.fieldStore
    if (!store || text.value === kept) return
    saveLastBreath(store, keyOfText, text.value)
    void flush()
  }
  const hide = () => { if (document.visibilityState === 'hidden') leave() }

  if (import.meta.client) {
    flushers.add(flush)
    window.addEventListener('pagehide', leave)
    document.addEventListener('visibilitychange', hide)
    if (getCurrentScope()) {
      onScopeDispose(() => {
        void flush()
        flushers.delete(flush)
        window.removeEventListener('pagehide', leave)
        document.removeEventListener('visibilitychange', hide)
      })
    }
  }
  return { text, isReady, clear }
}
