import { pushRequestSchema } from '#shared/sync/protocol'
import { applyPush } from '#server/services/apply-push'
import { defineHandler } from '../../utils/handler'
import { readValidBody } from '../../utils/read-valid'
import { requireUser } from '../../utils/require-user'
import { withOrganisation } from '../../utils/with-organisation'

/** POST /api/sync/push: receives operations from a phone. The answer leaves only after the commit. */
export default defineHandler(async (event) => {
  const user = await requireUser(event)
  const request = await readValidBody(event, pushRequestSchema)
  return withOrganisation(user, tx => applyPush(tx, user, request, new Date()))
})
