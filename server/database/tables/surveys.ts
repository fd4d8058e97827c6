import { boolean, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { count, organisationColumn } from '../columns'

/** Projection of a survey for the office's lists. */
export const surveys = pgTable('surveys', {
  organisation: organisationColumn(),
  id: uuid().notNull(),
  title: text().notNull(),
  site: uuid().notNull(),
  startsOn: text().notNull(),
  endsOn: text().notNull(),
  zone: text().notNull(),
  archived: boolean().notNull(),
  ver: count().notNull(),
}, table => [primaryKey({ columns: [table.organisation, table.id] })])
