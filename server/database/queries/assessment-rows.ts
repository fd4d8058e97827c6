import { and, eq, inArray, notInArray, or, sql } from 'drizzle-orm'
import type { Row } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'

/** A row as it travels. */
export const ROW_COLUMNS = { t: rowState.t, id: rowState.id, scope: rowState.scope, object: rowState.object, ver: rowState.ver, gone: rowState.gone, data: rowState.data }

/** Kinds of record that no finding looks at. */
const NOT_LOOKED_AT = ['limit', 'person', 'exposure-group', 'site', 'plan-line']

/**
 * Every row that the assessment of any sheet of these surveys looks at: the surveys' own rows and the organisation's records,
 * in one statement.
 */
export async function assessmentRows(tx: Transaction, organisation: string, surveyIds: readonly string[]): Promise<Row[]> {
  if (surveyIds.length === 0) return []
  return tx.select(ROW_COLUMNS).from(rowState).where(and(eq(rowState.organisation, organisation), or(
    inArray(rowState.scope, [...surveyIds]),
    and(eq(rowState.scope, organisation), or(
      eq(rowState.t, 'reg'),
      and(eq(rowState.t, 'obj'), notInArray(sql`${rowState.data} ->> 'type'`, NOT_LOOKED_AT)),
    )),
  )))
}

/** The greatest version in each scope: while it stands still, nothing that was computed from the scope's rows is out of date. */
export async function latestVersions(tx: Transaction, organisation: string, scopes: readonly string[]): Promise<Map<string, number>> {
  const found = await tx.execute<{ scope: string, ver: string }>(sql`
    select s.scope, coalesce((select max(r.ver) from row_state r where r.organisation = ${organisation} and r.scope = s.scope), 0) as ver
    from unnest(${sql.param([...scopes])}::uuid[]) as s(scope)`)
  return new Map(found.rows.map(row => [row.scope, Number(row.ver)]))
}
