import { sql } from 'drizzle-orm'
import type { SheetState } from '#shared/records/sheet-state'
import type { Transaction } from '#server/database/client'

/** What a list of sheets filters, counts and sorts by without looking into the sheets. */
export interface ListedSheet {
  id: string
  survey: string
  technician: string | null
  number: string | null
  state: SheetState
  handedInAt: string | null
  workerCode: string | null
  task: string | null
}

/** Sheets of an organisation that were not put away, in one statement. */
export async function listedSheets(tx: Transaction, organisation: string, filter: { survey?: string, technician?: string }): Promise<ListedSheet[]> {
  const found = await tx.execute<Record<keyof ListedSheet, string | null>>(sql`
    select s.id, s.survey, s.technician, s.number, s.state, s.handed_in_at as "handedInAt",
      case when code.id is null then worker.data -> 'initial' ->> 'code' else code.data ->> 'value' end as "workerCode",
      case when task.id is null then sheet.data -> 'initial' ->> 'task' else task.data ->> 'value' end as task
    from sheets s
    left join row_state worker on worker.organisation = s.organisation and worker.t = 'obj' and worker.id = s.worker::text
    left join row_state code on code.organisation = s.organisation and code.t = 'reg' and code.id = s.worker::text || '/code'
    left join row_state sheet on sheet.organisation = s.organisation and sheet.t = 'obj' and sheet.id = s.id::text
    left join row_state task on task.organisation = s.organisation and task.t = 'reg' and task.id = s.id::text || '/task'
    where s.organisation = ${organisation} and not s.archived
      ${filter.survey ? sql`and s.survey = ${filter.survey}` : sql``}
      ${filter.technician ? sql`and s.technician = ${filter.technician}` : sql``}`)
  return found.rows.map(row => ({ ...row, handedInAt: row.handedInAt && new Date(row.handedInAt).toISOString() }) as ListedSheet)
}
