import { boolean, index, jsonb, pgTable, primaryKey, uuid } from 'drizzle-orm/pg-core'
import type { RowType } from '#shared/sync/rows'
import { byteText, count, organisationColumn } from '../columns'

/** What phones pull: one shape for everything that merges. Made from the ledger, and can be made again. */
export const rowState = pgTable('row_state', {
  organisation: organisationColumn(),
  t: byteText().$type<RowType>().notNull(),
  id: byteText().notNull(),
  scope: uuid().notNull(),
  object: uuid().notNull(),
  ver: count().notNull(),
  gone: boolean().notNull().default(false),
  data: jsonb().$type<Record<string, unknown>>().notNull(),
}, table => [
  primaryKey({ columns: [table.organisation, table.t, table.id] }),
  index('row_feed').on(table.organisation, table.scope, table.ver, table.t, table.id),
  index('row_object').on(table.organisation, table.object, table.t),
])
