import { eq } from 'drizzle-orm'
import type { Transaction } from '#server/database/client'
import { users } from '#server/database/tables/users'

/** Name of everybody who can or could sign in to the organisation. */
export async function peopleNames(tx: Transaction, organisation: string): Promise<Map<string, string>> {
  const found = await tx.select({ id: users.id, name: users.name }).from(users).where(eq(users.organisation, organisation))
  return new Map(found.map(person => [person.id, person.name]))
}
