import { and, eq, getTableColumns, inArray, notInArray, sql, type SQL } from 'drizzle-orm'
import type { PgTable } from 'drizzle-orm/pg-core'
import type { RecordKind } from '#shared/records/kinds'
import { groupRows, kindOf, recordOf, sheetDocumentOf, type ObjectRows } from '#shared/sync/read-rows'
import type { RowChange } from '#shared/sync/rows'
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
export async function projectRows(tx: Transaction, organisation: string, changed: readonly RowChange[], ver: number): Promise<void> {
  const objects = [...new Set(changed.filter(touchesProjection).map(row => row.object))]
  if (objects.length === 0) return
  const rows = await tx.select().from(rowState)
    .where(and(eq(rowState.organisation, organisation), inArray(rowState.object, objects), notInArray(rowState.t, ['ev', 'set'])))
  const sheetRows: (typeof sheets.$inferInsert)[] = []
  const surveyRows: (typeof surveys.$inferInsert)[] = []
  for (const group of groupRows(rows).values()) {
    const kind = kindOf(group)
    if (kind === 'sheet') sheetRows.push(sheetRow(organisation, group, ver))
    if (kind === 'survey') surveyRows.push(surveyRow(organisation, group, ver))
  }
  if (sheetRows.length > 0) {
    await tx.insert(sheets).values(sheetRows).onConflictDoUpdate({ target: [sheets.organisation, sheets.id], set: excluded(sheets, ['organisation', 'id', 'createdAt']) })
  }
  if (surveyRows.length > 0) {
    await tx.insert(surveys).values(surveyRows).onConflictDoUpdate({ target: [surveys.organisation, surveys.id], set: excluded(surveys, ['organisation', 'id']) })
  }
}

/** Events do not show in a projection; a sheet of a hundred readings is not projected a hundred times. */
function touchesProjection(row: RowChange): boolean {
  return row.t !== 'ev' && row.t !== 'set'
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
