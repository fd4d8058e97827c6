import type { FieldStore } from './field-store'
import { instantOf } from './surroundings'

/** Keeps text that is typed and not an operation yet. Empty text takes the draft away. */
export async function saveDraft(store: FieldStore, key: string, text: string): Promise<void> {
  const { db, surroundings } = store
  if (text === '') await db.drafts.delete(key)
  else await db.drafts.put({ key, text, changedAt: instantOf(surroundings.now()) })
  forgetLastBreath(store, key)
}

/** What was typed before the page was closed or killed, or null. */
export async function loadDraft(store: FieldStore, key: string): Promise<string | null> {
  const breath = readLastBreath(store, key)
  const kept = await store.db.drafts.get(key)
  if (breath && (!kept || breath.changedAt > kept.changedAt)) {
    await store.db.drafts.put({ key, ...breath })
    forgetLastBreath(store, key)
    return breath.text
  }
  return kept?.text ?? null
}

export async function clearDraft(store: FieldStore, key: string): Promise<void> {
  forgetLastBreath(store, key)
  await store.db.drafts.delete(key)
}

/**
 * A page that is going away may not live until a database write has completed: the one place that writes at once
 * is local storage. It is read back, put into the database and taken away by the next `loadDraft`.
 */
export function saveLastBreath(store: FieldStore, key: string, text: string): void {
  try {
    localStorage.setItem(breathKey(store, key), JSON.stringify({ text, changedAt: instantOf(store.surroundings.now()) }))
  }
  catch {
    // Local storage may be full or forbidden; the database write that runs beside this one is then all there is.
  }
}

function readLastBreath(store: FieldStore, key: string): { text: string, changedAt: string } | null {
  try {
    const kept = JSON.parse(localStorage.getItem(breathKey(store, key)) ?? 'null') as { text?: unknown, changedAt?: unknown } | null
    return kept && typeof kept.text === 'string' && typeof kept.changedAt === 'string' ? { text: kept.text, changedAt: kept.changedAt } : null
  }
  catch {
    return null
  }
}

function forgetLastBreath(store: FieldStore, key: string): void {
  try {
    localStorage.removeItem(breathKey(store, key))
  }
  catch {
    // As above: nothing was kept there then.
  }
}

const breathKey = (store: FieldStore, key: string) => `draft:${store.db.name}:${key}`
