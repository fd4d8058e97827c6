import { randomBytes } from 'node:crypto'
import type { Role } from '#shared/records/person'
import type { Transaction } from '#server/database/client'
import { organisations } from '#server/database/tables/organisations'
import { orgClock } from '#server/database/tables/org-clock'
import { users } from '#server/database/tables/users'
import { makePasswordHash } from './password'

/** A new, empty organisation with its counter; runs inside that organisation's transaction. */
export async function createOrganisation(tx: Transaction, organisation: { id: string, name: string }, now: Date): Promise<void> {
  await tx.insert(organisations).values({ ...organisation, createdAt: now.toISOString() })
  await tx.insert(orgClock).values({ organisation: organisation.id, v: 0, epoch: `e_${randomBytes(6).toString('hex')}`, officeN: 0 })
}

/** Somebody who can sign in. The `person` record with the same id is an operation of its own. */
export async function createUser(tx: Transaction, user: { id: string, organisationId: string, email: string, name: string, roles: Role[], password: string }, now: Date): Promise<void> {
  await tx.insert(users).values({
    id: user.id, organisation: user.organisationId, email: user.email, name: user.name, roles: user.roles,
    passwordHash: await makePasswordHash(user.password), createdAt: now.toISOString(),
  })
}
