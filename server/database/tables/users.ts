import { sql } from 'drizzle-orm'
import { index, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import type { Role } from '#shared/records/person'
import { instant, organisationColumn } from '../columns'

/** Who can sign in. The name that colleagues see travels as a `person` record with the same id. */
export const users = pgTable('users', {
  id: uuid().primaryKey(),
  organisation: organisationColumn(),
  email: text().notNull(),
  name: text().notNull(),
  roles: text().array().$type<Role[]>().notNull(),
  passwordHash: text().notNull(),
  disabledAt: instant(),
  createdAt: instant().notNull(),
}, table => [
  uniqueIndex('users_email').on(sql`lower(${table.email})`),
  index('users_organisation').on(table.organisation),
])
