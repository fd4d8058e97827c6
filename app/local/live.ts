import { liveQuery } from 'dexie'

/**
 * Answers a query of the phone's database now and whenever what it read has changed, in this tab or in another one.
 *
 * @returns the function that ends it
 */
export function followQuery<T>(query: () => T | Promise<T>, next: (answer: T) => void, failed: (error: unknown) => void): () => void {
  const subscription = liveQuery(query).subscribe({ next, error: failed })
  return () => subscription.unsubscribe()
}
