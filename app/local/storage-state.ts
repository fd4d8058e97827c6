/** How safe the phone's own storage is. */
export interface StorageState {
  /** The browser has promised not to clear the app's data by itself; null where it cannot say. */
  isPersistent: boolean | null
  usedBytes: number | null
  availableBytes: number | null
}

/** Reads how safe the storage is; never throws, an unknown answer is null. */
export async function readStorageState(storage: StorageManager | undefined = globalThis.navigator?.storage): Promise<StorageState> {
  const isPersistent = await attempt(() => storage?.persisted?.())
  const estimate = await attempt(() => storage?.estimate?.())
  const used = estimate?.usage ?? null
  return { isPersistent: isPersistent ?? null, usedBytes: used, availableBytes: estimate?.quota === undefined ? null : estimate.quota - (used ?? 0) }
}

/** Asks the browser to keep the app's data. It may say no, and may ask the person. */
export async function askForPersistence(storage: StorageManager | undefined = globalThis.navigator?.storage): Promise<boolean> {
  return await attempt(() => storage?.persist?.()) ?? false
}

async function attempt<T>(ask: () => Promise<T> | undefined): Promise<T | undefined> {
  try {
    return await ask()
  }
  catch {
    // A browser without the function, or one that forbids it in this window: the answer is "not known".
    return undefined
  }
}
