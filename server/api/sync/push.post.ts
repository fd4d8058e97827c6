import { pushAtTheDoorSchema, receivePush } from '#server/services/receive-push'
import { defineHandler } from '../../utils/handler'
import { readPushBody } from '../../utils/read-valid'
import { requireUser } from '../../utils/require-user'
import { withOrganisation } from '../../utils/with-organisation'

/** POST /api/sync/push: receives operations from a phone. The answer leaves only after the commit. */
export default defineHandler(async (event) => {
  const user = await requireUser(event)
  const request = await readPushBody(event, pushAtTheDoorSchema)
  return receivePush(work => withOrganisation(user, work), user, request, new Date())
})
