import { askForPersistence, readStorageState, type StorageState } from '~/local/storage-state'

/** How safe this phone's storage is, and the question to the browser to keep it. */
export function useStorageState() {
  const state = shallowRef<StorageState>({ isPersistent: null, usedBytes: null, availableBytes: null })
  const isReady = ref(false)

  async function refresh() {
    state.value = await readStorageState()
    isReady.value = true
  }

  async function ask(): Promise<boolean> {
    const isPersistent = await askForPersistence()
    await refresh()
    return isPersistent
  }

  if (import.meta.client) void refresh()
  return { state, isReady, refresh, ask }
}
