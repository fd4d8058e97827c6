import { listSurveys } from '#server/services/list-surveys'
import { defineHandler } from '../../utils/handler'
import { requireOffice } from '../../utils/require-user'
import { readOrganisation } from '../../utils/with-organisation'

/** GET /api/surveys: the organisation's surveys with their crew, plan and counts of sheets. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  return readOrganisation(user, tx => listSurveys(tx, user))
})
