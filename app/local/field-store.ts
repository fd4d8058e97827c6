import type { SignedIn } from '#shared/records/office-views'
import { FieldDatabase } from './db'
import { browserSurroundings, type Surroundings } from './surroundings'

/** One person's work on this phone, opened: what every function of this folder is given. */
export interface FieldStore {
  db: FieldDatabase
  person: SignedIn
  surroundings: Surroundings
  /** Told after every commit of this tab. */
  committed: Set<() => void>
}

export function openFieldStore(person: SignedIn, surroundings: Surroundings = browserSurroundings()): FieldStore {
  const db = new FieldDatabase(person.organisationId, person.id)
  return { db, person, surroundings, committed: new Set() }
}
