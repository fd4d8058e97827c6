import { pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { count } from '../columns'

/** The organisation's one counter: locked until commit, so that order of versions is order of visibility (PULL1). */
export const orgClock = pgTable('org_clock', {
  organisation: uuid().primaryKey(),
  v: count().notNull(),
  epoch: text().notNull(),
  /** Number of the office's own last operation. */
  officeN: count().notNull(),
})
