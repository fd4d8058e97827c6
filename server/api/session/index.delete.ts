import { endSession } from '#server/services/sign-in'
import { useDatabase } from '../../utils/database'
import { defineHandler } from '../../utils/handler'
import { sessionIdOf } from '../../utils/session-cookie'

/** DELETE /api/session: signs out; the session's row is ended, so that a kept cookie is worth nothing. */
export default defineHandler(async (event) => {
  const sessionId = await sessionIdOf(event)
  if (sessionId !== undefined) await endSession(useDatabase(), sessionId, new Date())
  await clearUserSession(event)
  return { ok: true }
})
