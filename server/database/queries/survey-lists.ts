import { and, count, desc, eq, inArray, sql } from 'drizzle-orm'
import type { Row } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'
import { surveys } from '#server/database/tables/surveys'
import { ROW_COLUMNS } from './assessment-rows'

/** The surveys that were not put away, the latest first; or the one that is asked for, whatever became of it. */
export async function surveysOf(tx: Transaction, organisation: string, surveyId?: string): Promise<(typeof surveys.$inferSelect)[]> {
  const which = surveyId === undefined ? eq(surveys.archived, false) : eq(surveys.id, surveyId)
  return tx.select().from(surveys).where(and(eq(surveys.organisation, organisation), which)).orderBy(desc(surveys.startsOn), surveys.title, surveys.id)
}

/** How many sheets stand in each state, by survey. */
export async function sheetCounts(tx: Transaction, organisation: string): Promise<Map<string, Record<string, number>>> {
  const found = await tx.select({ survey: sheets.survey, state: sheets.state, count: count() }).from(sheets)
    .where(and(eq(sheets.organisation, organisation), eq(sheets.archived, false))).groupBy(sheets.survey, sheets.state)
  const bySurvey = new Map<string, Record<string, number>>()
  for (const { survey, state, count } of found) bySurvey.set(survey, { ...bySurvey.get(survey), [state]: count })
  return bySurvey
}

/** Rows of every plan line of these surveys. */
export async function planLineRows(tx: Transaction, organisation: string, surveyIds: readonly string[]): Promise<Row[]> {
  if (surveyIds.length === 0) return []
  return tx.select(ROW_COLUMNS).from(rowState).where(and(
    eq(rowState.organisation, organisation), inArray(rowState.scope, [...surveyIds]), inArray(rowState.t, ['obj', 'reg']),
    sql`${rowState.object} in (select r.object from row_state r where r.organisation = ${organisation} and r.t = 'obj'
      and r.scope = any(${sql.param([...surveyIds])}::uuid[]) and r.data ->> 'type' = 'plan-line')`,
  ))
}

/** Every row of the given records. */
export async function recordRows(tx: Transaction, organisation: string, ids: readonly string[]): Promise<Row[]> {
  if (ids.length === 0) return []
  return tx.select(ROW_COLUMNS).from(rowState).where(and(eq(rowState.organisation, organisation), inArray(rowState.object, [...ids])))
}
