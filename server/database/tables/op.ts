import { sql } from 'drizzle-orm'
import { index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { bytes, count, instant, organisationColumn } from '../columns'

/** The ledger: every operation as it was received. Append-only; the truth that everything else is made from. */
export const op = pgTable('op', {
  organisation: organisationColumn(),
  id: uuid().notNull(),
  dev: text().notNull(),
  phone: text().notNull(),
  n: count().notNull(),
  author: uuid().notNull(),
  sv: integer().notNull(),
  kind: text().notNull(),
  object: uuid(),
  sheet: uuid(),
  hlcClaimed: text().notNull(),
  hlcEffective: text().notNull(),
  /** The whole operation as it came, less `personal`. */
  body: jsonb().$type<Record<string, unknown>>().notNull(),
  bodyHash: bytes().notNull(),
  /** Names and contacts only; outside the hash, so that one person can be erased. */
  personal: jsonb().$type<Record<string, string>>(),
  /** The id that was claimed, when another operation has it already (PUSH3). */
  claimedId: uuid(),
  receivedAt: instant().notNull(),
  ver: count().notNull(),
  outcome: text().notNull(),
  reason: text(),
  detail: text(),
}, table => [
  primaryKey({ columns: [table.organisation, table.id] }),
  // Not unique: a phone whose storage went back in time sends the same number twice, and both are kept.
  index('op_device').on(table.organisation, table.dev, table.n),
  // Partial: an id is hardly ever used twice, and every push asks whether one was.
  index('op_claimed').on(table.organisation, table.claimedId).where(sql`${table.claimedId} is not null`),
  index('op_sheet').on(table.organisation, table.sheet, table.ver),
])
