import { getRequestHeader } from 'h3'
import { signInSchema } from '#shared/records/office-views'
import { endSession, signedInOf, signIn } from '#server/services/sign-in'
import { remoteAddress, useDatabase } from '../../utils/database'
import { defineHandler } from '../../utils/handler'
import { readValidBody } from '../../utils/read-valid'
import { giveSession, sessionIdOf } from '../../utils/session-cookie'

/** POST /api/session: signs in with e-mail and password; any session before it ends. */
export default defineHandler(async (event) => {
  const body = await readValidBody(event, signInSchema)
  const user = await signIn(useDatabase(), { ...body, address: remoteAddress(event), userAgent: getRequestHeader(event, 'user-agent') ?? '' }, new Date())
  const before = await sessionIdOf(event)
  if (before !== undefined) await endSession(useDatabase(), before, new Date())
  await giveSession(event, user)
  return signedInOf(user)
})
