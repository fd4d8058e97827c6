import { endSession } from '#server/services/sign-in'
import { useDatabase } from '../../utils/database'
import { defineHandler } from '../../utils/handler'

/** DELETE /api/session: signs out; the session's row is ended, so that a kept cookie is worth nothing. */
export default defineHandler(async (event) => {
  const sessionId = (await getUserSession(event)).secure?.sessionId
  if (sessionId !== undefined) await endSession(useDatabase(), sessionId, new Date())
  await clearUserSession(event)
  return { ok: true }
})
