import { sheetParamsSchema } from '#shared/records/office-views'
import { openSheet } from '#server/services/open-sheet'
import { defineHandler } from '../../../utils/handler'
import { readValidParams } from '../../../utils/read-valid'
import { requireOffice } from '../../../utils/require-user'
import { readOrganisation } from '../../../utils/with-organisation'

/** GET /api/sheets/:sheetId: the sheet's rows and everything its assessment looks at, names, and its history. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  const { sheetId } = readValidParams(event, sheetParamsSchema)
  return readOrganisation(user, tx => openSheet(tx, user, sheetId))
})
