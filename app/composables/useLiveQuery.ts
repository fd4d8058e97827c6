import type { ShallowRef, WatchSource } from 'vue'
import { followQuery } from '~/local/live'

/**
 * A query of the phone's database that answers again whenever what it read has changed, in this tab or in another one.
 *
 * @param query reads Dexie; runs again when `source` changes
 * @param initial the value until the first answer
 * @param source what the query depends on beside the database
 * @param failed told when the query fails; the value stays what it was
 */
export function useLiveQuery<T>(query: () => T | Promise<T>, initial: T, source: WatchSource<unknown> = () => null, failed: (error: unknown) => void = error => console.error(error)): ShallowRef<T> {
  const value = shallowRef(initial) as ShallowRef<T>
  if (import.meta.server) return value
  let end = () => {}
  watch(source, () => {
    end()
    end = followQuery(query, (answer) => { value.value = answer }, failed)
  }, { immediate: true })
  if (getCurrentScope()) onScopeDispose(() => end())
  return value
}
