import { inject } from 'vitest'
import type { Actor } from '#shared/access/policy'
import { openDatabase, type Database, type Transaction } from '#server/database/client'
import { inOrganisation } from '#server/database/with-organisation'
import { demoIds } from '../../../drizzle/seeds/demo-organisation'
import { namedId } from '../../../drizzle/seeds/ids'
import { seedDemo } from '../../../drizzle/seeds/seed-demo'
import signIns from '../../../drizzle/seeds/demo-sign-ins.json'

/** An organisation like the demo, with its people by first name. */
export interface SeededOrganisation {
  id: string
  people: Record<string, Actor & { email: string, password: string, name: string }>
  /** One transaction of this organisation, as the app runs it. */
  run: <T>(work: (tx: Transaction) => Promise<T>) => Promise<T>
  read: <T>(work: (tx: Transaction) => Promise<T>) => Promise<T>
}

export function openTestDatabase(connections = 4): Database {
  return openDatabase(inject('databaseUrl'), connections)
}

/** Seeds a whole organisation under its own name; the people's addresses end in `mailDomain`. */
export async function aSeededOrganisation(database: Database, name: string, mailDomain: string, now: Date): Promise<SeededOrganisation> {
  await seedDemo(database, now, name, mailDomain)
  const id = namedId('lapel', 'organisation', name)
  const ids = demoIds(id)
  const people = Object.fromEntries(signIns.map((person) => {
    const firstName = person.name.split(' ')[0]!.toLowerCase()
    return [firstName, {
      id: ids.person(person.email), organisationId: id, roles: [person.role] as Actor['roles'], name: person.name, password: person.password,
      email: person.email.replace(/@.*$/, `@${mailDomain}`),
    }]
  }))
  return {
    id, people,
    run: work => inOrganisation(database, id, work),
    read: work => inOrganisation(database, id, work, { readOnly: true }),
  }
}
