import { randomUUID } from 'node:crypto'
import { getCookie, unsealSession, type H3Event } from 'h3'
import type { SessionUser } from '#server/services/sign-in'

/**
 * The session that the cookie of a request names; undefined when there is none, or the cookie is none of ours or too old.
 * It only reads: asking who somebody is gives nobody a cookie.
 */
export async function sessionIdOf(event: H3Event): Promise<string | undefined> {
  const { name, password, maxAge } = useRuntimeConfig(event).session
  const sealed = getCookie(event, name ?? '')
  if (!sealed) return undefined
  const session = await unsealSession(event, { password, maxAge }, sealed).catch(() => null)
  const sessionId: unknown = (session?.data as { secure?: { sessionId?: unknown } } | undefined)?.secure?.sessionId
  return typeof sessionId === 'string' ? sessionId : undefined
}

/** Gives the browser the cookie of a session that has just begun; nothing of a cookie that it sent goes into it. */
export async function giveSession(event: H3Event, user: SessionUser): Promise<void> {
  const { name } = useRuntimeConfig(event).session
  // Without this the new cookie would inherit the old one's age, and end before its session does.
  event.context.sessions = { [name ?? '']: { id: randomUUID(), createdAt: Date.now(), data: {} } }
  await setUserSession(event, { user: { id: user.id, organisationId: user.organisationId }, secure: { sessionId: user.sessionId } })
}
