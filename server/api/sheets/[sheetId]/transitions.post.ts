import { decisionSchema, sheetParamsSchema } from '#shared/records/office-views'
import { decideSheet } from '#server/services/decide-sheet'
import { defineHandler } from '../../../utils/handler'
import { readValidBody, readValidParams } from '../../../utils/read-valid'
import { requireOffice } from '../../../utils/require-user'
import { withOrganisation } from '../../../utils/with-organisation'

/** POST /api/sheets/:sheetId/transitions: accepts, returns, voids or reopens a sheet as it was shown. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  const { sheetId } = readValidParams(event, sheetParamsSchema)
  const decision = await readValidBody(event, decisionSchema)
  return withOrganisation(user, tx => decideSheet(tx, user, sheetId, decision, new Date()))
})
