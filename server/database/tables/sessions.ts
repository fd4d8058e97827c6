import { index, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { bytes, instant, organisationColumn } from '../columns'
import { users } from './users'

/** A session is this row, not its cookie: without the row the cookie is worth nothing. Only the SHA-256 of its id is kept. */
export const sessions = pgTable('sessions', {
  idHash: bytes().primaryKey(),
  organisation: organisationColumn(),
  user: uuid().notNull().references(() => users.id),
  createdAt: instant().notNull(),
  lastSeenAt: instant().notNull(),
  expiresAt: instant().notNull(),
  revokedAt: instant(),
  userAgent: text().notNull().default(''),
}, table => [index('sessions_user').on(table.user)])
