import { and, eq, getTableColumns, inArray, sql, type SQL } from 'drizzle-orm'
import type { PgTable } from 'drizzle-orm/pg-core'
import type { RecordKind } from '#shared/records/kinds'
import { groupRows, kindOf, recordOf, sheetDocumentOf, type ObjectRows } from '#shared/sync/read-rows'
import type { Row, RowChange, RowType } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'
import { surveys } from '#server/database/tables/surveys'

/**
 * Whether a kind of record has a table of its own for the office's lists, or is read from its rows. A test fails when a
 * new kind has no decision here.
 */
export const PROJECTIONS: Readonly<Record<RecordKind, 'table' | 'rows'>> = {
  'sheet': 'table',
  'survey': 'table',
  'settings': 'rows',
  'person': 'rows',
  'site': 'rows',
  'exposure-group': 'rows',
  'worker': 'rows',
  'plan-line': 'rows',
  'pump': 'rows',
  'calibrator': 'rows',
  'sampler': 'rows',
  'agent': 'rows',
  'method': 'rows',
  'limit': 'rows',
}

/** Writes the projections of every record that changed, in the same transaction as its rows. */
export async function projectRows(tx: Transaction, organisation: string, changed: readonly RowChange[]): Promise<void> {
  const objects = [...new Set(changed.filter(touchesProjection).map(row => row.object))]
  if (objects.length === 0) return
  const rows = await tx.select().from(rowState)
    .where(and(eq(rowState.organisation, organisation), inArray(rowState.object, objects), inArray(rowState.t, SHOWN)))
  await storeProjections(tx, projectionsOf(organisation, rows))
}

export interface Projections { sheets: (typeof sheets.$inferInsert)[], surveys: (typeof surveys.$inferInsert)[] }

/** What the tables for the office's lists say of these rows; all rows of a record must be among them. */
export function projectionsOf(organisation: string, rows: readonly Row[]): Projections {
  const shown = rows.filter(touchesProjection)
  const versions = new Map<string, number>()
  for (const row of shown) versions.set(row.object, Math.max(versions.get(row.object) ?? 0, row.ver))
  const projections: Projections = { sheets: [], surveys: [] }
  for (const [id, group] of groupRows(shown)) {
    const kind = kindOf(group)
    if (kind === 'sheet') projections.sheets.push(sheetRow(organisation, group, versions.get(id)!))
    if (kind === 'survey') projections.surveys.push(surveyRow(organisation, group, versions.get(id)!))
  }
  return projections
}

/** Many statements of a few hundred rows: one statement takes no more than 65,535 values. */
const ROWS_AT_ONCE = 500

export async function storeProjections(tx: Transaction, projections: Projections): Promise<void> {
  for (let from = 0; from < projections.sheets.length; from += ROWS_AT_ONCE) {
    await tx.insert(sheets).values(projections.sheets.slice(from, from + ROWS_AT_ONCE))
      .onConflictDoUpdate({ target: [sheets.organisation, sheets.id], set: excluded(sheets, ['organisation', 'id', 'createdAt']) })
  }
  for (let from = 0; from < projections.surveys.length; from += ROWS_AT_ONCE) {
    await tx.insert(surveys).values(projections.surveys.slice(from, from + ROWS_AT_ONCE))
      .onConflictDoUpdate({ target: [surveys.organisation, surveys.id], set: excluded(surveys, ['organisation', 'id']) })
  }
}

/** Events do not show in a projection; a sheet of a hundred readings is not projected a hundred times. */
const SHOWN: RowType[] = ['obj', 'reg', 'state', 'conflict', 'late']

function touchesProjection(row: RowChange): boolean {
  return SHOWN.includes(row.t)
}

function sheetRow(organisation: string, group: ObjectRows, ver: number): typeof sheets.$inferInsert {
  const document = sheetDocumentOf(group)!
  const { sheet, standing } = document
  return {
    organisation, id: document.id, survey: document.surveyId, number: sheet.number, kind: sheet.kind,
    worker: sheet.workerId, technician: sheet.technicianId, method: sheet.methodId,
    state: standing.state, revision: standing.revision, isFit: standing.isFit,
    handedInAt: standing.state === 'handed-in' ? standing.at : null,
    openConflicts: document.conflicts.filter(conflict => conflict.isOpen).length,
    lateChanges: document.late.length,
    archived: sheet.archived, createdAt: document.createdAt, ver,
  }
}

function surveyRow(organisation: string, group: ObjectRows, ver: number): typeof surveys.$inferInsert {
  const survey = recordOf('survey', group)!
  return { organisation, id: survey.id, title: survey.title, site: survey.siteId, startsOn: survey.startsOn, endsOn: survey.endsOn, zone: survey.zone, archived: survey.archived, ver }
}

/** `column = excluded.column` for every column but the given ones. */
function excluded(table: PgTable, except: readonly string[]): Record<string, SQL> {
  return Object.fromEntries(Object.keys(getTableColumns(table))
    .filter(name => !except.includes(name))
    .map(name => [name, sql`excluded.${sql.identifier(name.replace(/[A-Z]/g, letter => `_${letter.toLowerCase()}`))}`]))
}
