import { integer, pgTable, text } from 'drizzle-orm/pg-core'
import { instant } from '../columns'

/** Failed sign-ins by account and address in the running quarter of an hour. */
export const signInAttempts = pgTable('sign_in_attempts', {
  key: text().primaryKey(),
  attempts: integer().notNull(),
  windowStartsAt: instant().notNull(),
})
