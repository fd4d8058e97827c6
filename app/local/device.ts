import Dexie, { type Table } from 'dexie'
import { uuidv7 } from 'uuidv7'
import type { SignedIn } from '#shared/records/office-views'
import { FieldDatabase, fieldDatabaseName } from './db'

/** Somebody who has signed in on this phone. The entry stays after signing out: there may be work of theirs here. */
export interface KnownPerson { key: string, person: SignedIn, signedInAt: string }

interface PhoneEntry { k: 'phone' | 'current', value: string | null }

/** What belongs to the phone and to nobody on it. */
class PhoneDatabase extends Dexie {
  declare phone: Table<PhoneEntry, string>
  declare people: Table<KnownPerson, string>

  constructor() {
    super('lapel-phone', { chromeTransactionDurability: 'strict' })
    this.version(1).stores({ phone: '&k', people: '&key' })
  }
}

let opened: PhoneDatabase | undefined
const phoneDatabase = () => opened ??= new PhoneDatabase()

/** Closes the phone's database; the next call opens it again. */
export function closePhoneDatabase(): void {
  opened?.close()
  opened = undefined
}

const keyOf = (person: SignedIn) => fieldDatabaseName(person.organisationId, person.id)

/** The phone's own id, the same for everybody on it, and apart from each person's `dev`. */
export async function phoneId(): Promise<string> {
  const db = phoneDatabase()
  return db.transaction('rw', db.phone, async () => {
    const known = (await db.phone.get('phone'))?.value
    if (known) return known
    const made = `p_${uuidv7()}`
    await db.phone.put({ k: 'phone', value: made })
    return made
  })
}

/** The person who signed in is the one this phone works for from now on, with or without a network. */
export async function rememberPerson(person: SignedIn): Promise<void> {
  const db = phoneDatabase()
  const plain = JSON.parse(JSON.stringify(person)) as SignedIn
  await db.transaction('rw', db.phone, db.people, async () => {
    await db.people.put({ key: keyOf(plain), person: plain, signedInAt: new Date().toISOString() })
    await db.phone.put({ k: 'current', value: keyOf(plain) })
  })
}

/** Who signed in last on this phone and has not signed out; never asks the network. */
export async function currentPerson(): Promise<SignedIn | null> {
  const db = phoneDatabase()
  const key = (await db.phone.get('current'))?.value
  return key ? (await db.people.get(key))?.person ?? null : null
}

/** After signing out nobody is at work on this phone. Every database stays as it is. */
export async function leavePerson(): Promise<void> {
  await phoneDatabase().phone.put({ k: 'current', value: null })
}

export async function knownPeople(): Promise<SignedIn[]> {
  const all = await phoneDatabase().people.orderBy('key').toArray()
  return all.sort((a, b) => (a.signedInAt < b.signedInAt ? 1 : -1)).map(known => known.person)
}

/** People whose changes wait on this phone, with the count of each. */
export async function peopleWithUnsentWork(except?: SignedIn | null): Promise<{ person: SignedIn, name: string, waiting: number }[]> {
  const found: { person: SignedIn, name: string, waiting: number }[] = []
  for (const person of await knownPeople()) {
    if (except && keyOf(person) === keyOf(except)) continue
    const waiting = await unsentOf(person)
    if (waiting > 0) found.push({ person, name: person.name, waiting })
  }
  return found
}

/** How many changes of a person wait on this phone. */
export async function unsentOf(person: SignedIn): Promise<number> {
  if (!await Dexie.exists(keyOf(person))) return 0
  const db = new FieldDatabase(person.organisationId, person.id)
  try {
    return await db.outbox.count()
  }
  finally {
    db.close()
  }
}

/** What the office's list calls this phone, e.g. "Chrome on Android": the kind of browser and of machine, nothing that identifies a person. */
export function phoneLabel(userAgent: string): string {
  const browser = /Firefox\//.test(userAgent) ? 'Firefox' : /Edg\//.test(userAgent) ? 'Edge' : /Chrom(e|ium)\//.test(userAgent) ? 'Chrome' : /Safari\//.test(userAgent) ? 'Safari' : 'Browser'
  const machine = /Android/.test(userAgent) ? 'Android' : /iPhone|iPad|iPod/.test(userAgent) ? 'iOS' : /Windows/.test(userAgent) ? 'Windows' : /Mac OS X/.test(userAgent) ? 'macOS' : /Linux/.test(userAgent) ? 'Linux' : 'unknown system'
  return `${browser} on ${machine}`
}
