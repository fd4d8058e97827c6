import { pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { instant } from '../columns'

export const organisations = pgTable('organisations', {
  id: uuid().primaryKey(),
  name: text().notNull(),
  createdAt: instant().notNull(),
})
