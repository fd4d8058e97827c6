import { sheetListQuerySchema } from '#shared/records/office-views'
import { listSheets } from '#server/services/list-sheets'
import { defineHandler } from '../../utils/handler'
import { readValidQuery } from '../../utils/read-valid'
import { requireOffice } from '../../utils/require-user'
import { readOrganisation } from '../../utils/with-organisation'

/** GET /api/sheets: a page of the sheets that the filters let through, as assessed now, with counts by state. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  const query = readValidQuery(event, sheetListQuerySchema)
  return readOrganisation(user, tx => listSheets(tx, user, query, new Date()))
})
