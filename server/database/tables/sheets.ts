import { boolean, index, integer, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import type { SheetState } from '#shared/records/sheet-state'
import { count, instant, organisationColumn } from '../columns'

/** Projection of a sheet for the office's lists: what they filter and sort by. */
export const sheets = pgTable('sheets', {
  organisation: organisationColumn(),
  id: uuid().notNull(),
  survey: uuid().notNull(),
  number: text(),
  kind: text().notNull(),
  worker: uuid(),
  technician: uuid(),
  method: uuid(),
  state: text().$type<SheetState>().notNull(),
  revision: integer().notNull(),
  isFit: boolean(),
  handedInAt: instant(),
  openConflicts: integer().notNull(),
  lateChanges: integer().notNull(),
  archived: boolean().notNull(),
  createdAt: instant().notNull(),
  ver: count().notNull(),
}, table => [
  primaryKey({ columns: [table.organisation, table.id] }),
  index('sheets_state').on(table.organisation, table.state),
  index('sheets_survey').on(table.organisation, table.survey),
])
