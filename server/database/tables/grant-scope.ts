import { boolean, pgTable, primaryKey, uuid } from 'drizzle-orm/pg-core'
import { count, organisationColumn } from '../columns'

/** Which surveys a person's phone may see, from the surveys' crews. Reviewers see all. */
export const grantScope = pgTable('grant_scope', {
  organisation: organisationColumn(),
  person: uuid().notNull(),
  scope: uuid().notNull(),
  ver: count().notNull(),
  gone: boolean().notNull().default(false),
}, table => [primaryKey({ columns: [table.organisation, table.person, table.scope] })])
