import type { Page } from '@playwright/test'

/** Reads a store of the signed-in person's database on the phone, as any page of this origin could. */
export async function readStore<T>(page: Page, store: string): Promise<T[]> {
  return page.evaluate(async (name) => {
    const found = (await indexedDB.databases()).find(one => one.name?.startsWith('f:'))
    if (!found?.name) return []
    const open = indexedDB.open(found.name)
    const db = await new Promise<IDBDatabase>((resolve, reject) => { open.onsuccess = () => resolve(open.result); open.onerror = () => reject(open.error!) })
    try {
      const request = db.transaction(name).objectStore(name).getAll()
      return await new Promise<unknown[]>((resolve, reject) => { request.onsuccess = () => resolve(request.result); request.onerror = () => reject(request.error!) })
    }
    finally {
      db.close()
    }
  }, store) as Promise<T[]>
}

/** The identities of what waits to be sent, in the order it was written. */
export async function waitingOperations(page: Page): Promise<string[]> {
  return (await readStore<{ id: string }>(page, 'outbox')).map(entry => entry.id)
}

/** What the server has said about what was sent. */
export async function acknowledged(page: Page): Promise<{ id: string, outcome: string }[]> {
  return (await readStore<{ id: string, outcome: string }>(page, 'acked')).map(({ id, outcome }) => ({ id, outcome }))
}
