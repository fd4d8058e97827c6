import { and, eq } from 'drizzle-orm'
import type { Transaction } from '#server/database/client'
import { sheets } from '#server/database/tables/sheets'
import { surveys } from '#server/database/tables/surveys'

/** State, revision, survey and zone of one sheet, or undefined when the organisation has no such sheet. */
export async function sheetStanding(tx: Transaction, organisation: string, sheetId: string) {
  const [found] = await tx.select({ state: sheets.state, revision: sheets.revision, survey: sheets.survey, zone: surveys.zone }).from(sheets)
    .innerJoin(surveys, and(eq(surveys.organisation, sheets.organisation), eq(surveys.id, sheets.survey)))
    .where(and(eq(sheets.organisation, organisation), eq(sheets.id, sheetId)))
  return found
}
