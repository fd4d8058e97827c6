import type { H3Event } from 'h3'
import { can } from '#shared/access/policy'
import { findSession, type SessionUser } from '#server/services/sign-in'
import { useDatabase } from './database'
import { httpError } from './http-error'
import { sessionIdOf } from './session-cookie'

/** Who asks, by the session's row; null when nobody is signed in. */
export async function findUser(event: H3Event): Promise<SessionUser | null> {
  const sessionId = await sessionIdOf(event)
  return sessionId === undefined ? null : findSession(useDatabase(), sessionId, new Date())
}

/** @throws 401 when nobody is signed in, or the session was ended, expired or idle for too long */
export async function requireUser(event: H3Event): Promise<SessionUser> {
  const user = await findUser(event)
  if (!user) throw httpError('sign-in', 401)
  return user
}

/** @throws 403 for somebody who does not work in the office */
export async function requireOffice(event: H3Event): Promise<SessionUser> {
  const user = await requireUser(event)
  if (!can(user, { do: 'see-office' })) throw httpError('not-allowed', 403)
  return user
}
