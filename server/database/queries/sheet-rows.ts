import { and, eq, inArray, or, sql } from 'drizzle-orm'
import type { Row, RowType } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { ROW_COLUMNS } from './assessment-rows'

/** What a sheet tells the others of its survey: late changes and conflicts stay its own. */
const TOLD_TO_SIBLINGS: RowType[] = ['obj', 'reg', 'ev', 'state']

/** A survey's sheets and the survey itself; of the sheet that is asked for, every row. */
export async function surveyRowsFor(tx: Transaction, organisation: string, sheetId: string, surveyId: string): Promise<Row[]> {
  return tx.select(ROW_COLUMNS).from(rowState).where(and(eq(rowState.organisation, organisation), or(
    eq(rowState.object, sheetId),
    and(eq(rowState.scope, surveyId), inArray(rowState.t, TOLD_TO_SIBLINGS), sql`${rowState.object} in (select id from sheets where organisation = ${organisation} and survey = ${surveyId})`),
    eq(rowState.object, surveyId),
  )))
}

/** The organisation's records that are named, its settings and the limits of the agents that are named. */
export async function namedRecordRows(tx: Transaction, organisation: string, ids: readonly string[]): Promise<Row[]> {
  const named = sql`${sql.param([...ids])}::uuid[]`
  return tx.select(ROW_COLUMNS).from(rowState).where(and(eq(rowState.organisation, organisation), eq(rowState.gone, false), or(
    sql`${rowState.object} = any(${named})`,
    sql`${rowState.object} in (select r.object from row_state r where r.organisation = ${organisation} and r.scope = ${organisation} and r.t = 'obj'
      and (r.data ->> 'type' = 'settings' or (r.data ->> 'type' = 'limit' and (r.data -> 'initial' ->> 'agentId')::uuid = any(${named}))))`,
  )))
}
