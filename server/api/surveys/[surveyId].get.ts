import { surveyParamsSchema } from '#shared/records/office-views'
import { openSurvey } from '#server/services/list-surveys'
import { defineHandler } from '../../utils/handler'
import { readValidParams } from '../../utils/read-valid'
import { requireOffice } from '../../utils/require-user'
import { readOrganisation } from '../../utils/with-organisation'

/** GET /api/surveys/:surveyId: one survey with its plan. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  const { surveyId } = readValidParams(event, surveyParamsSchema)
  return readOrganisation(user, tx => openSurvey(tx, user, surveyId))
})
