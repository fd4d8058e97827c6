import { integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { count, instant, organisationColumn } from '../columns'

/** One person on one phone: when it was last heard of and what it still owes. */
export const device = pgTable('device', {
  organisation: organisationColumn(),
  dev: text().notNull(),
  phone: text().notNull(),
  label: text().notNull(),
  person: uuid().notNull(),
  lastSeenAt: instant().notNull(),
  maxN: count().notNull(),
  received: count().notNull(),
  lastHlc: text().notNull(),
  pending: integer().notNull(),
  oldestAt: instant(),
  blobs: integer().notNull(),
  sv: integer().notNull(),
  clockOffsetMilliseconds: count(),
}, table => [primaryKey({ columns: [table.organisation, table.dev] })])
