import { createHash, randomBytes } from 'node:crypto'
import { and, eq, isNull, sql } from 'drizzle-orm'
import type { SignedIn } from '#shared/records/office-views'
import type { Role } from '#shared/records/person'
import type { Database, Transaction } from '#server/database/client'
import { outsideOrganisation } from '#server/database/with-organisation'
import { organisations } from '#server/database/tables/organisations'
import { sessions } from '#server/database/tables/sessions'
import { signInAttempts } from '#server/database/tables/sign-in-attempts'
import { users } from '#server/database/tables/users'
import { checkPassword } from './password'
import { Refusal } from './refusal'

const MINUTE = 60_000
const DAY = 86_400_000

/** A phone that syncs: thirty days, or seven without being heard of. The office: twelve hours, or one without a request. */
export const SESSION_LIFE = {
  field: { absolute: 30 * DAY, idle: 7 * DAY },
  office: { absolute: 12 * 60 * MINUTE, idle: 60 * MINUTE },
} as const

const ATTEMPTS = 10
const ATTEMPT_WINDOW = 15 * MINUTE

export interface SessionUser { id: string, organisationId: string, organisationName: string, name: string, email: string, roles: Role[], sessionId: string }

/** Roles that work in the office have the office's short session, whoever else they are. */
function lifeOf(roles: readonly Role[]): { absolute: number, idle: number } {
  return roles.some(role => role !== 'technician') ? SESSION_LIFE.office : SESSION_LIFE.field
}

const hashOf = (sessionId: string) => createHash('sha256').update(sessionId).digest()

/**
 * Signs a person in: a new session row with a random id of 256 bits.
 *
 * @throws Refusal `wrong-sign-in` with the same words and work for an unknown and a known account; `too-many-attempts` with `retryAfterSeconds`
 */
export async function signIn(database: Database, input: { email: string, password: string, address: string, userAgent: string }, now: Date): Promise<SessionUser> {
  const email = input.email.trim().toLowerCase()
  const key = `${email} ${input.address}`
  const retryAfterSeconds = await outsideOrganisation(database, tx => countAttempt(tx, key, now))
  if (retryAfterSeconds !== null) throw new Refusal('too-many-attempts', 429, { retryAfterSeconds })

  const found = await outsideOrganisation(database, async tx => (await tx
    .select({ user: users, organisationName: organisations.name }).from(users)
    .innerJoin(organisations, eq(organisations.id, users.organisation))
    .where(and(eq(sql`lower(${users.email})`, email), isNull(users.disabledAt))))[0])
  if (!await checkPassword(found?.user.passwordHash ?? null, input.password) || !found) throw new Refusal('wrong-sign-in', 401)

  const { user, organisationName } = found
  const sessionId = randomBytes(32).toString('base64url')
  await outsideOrganisation(database, async (tx) => {
    await tx.delete(signInAttempts).where(eq(signInAttempts.key, key))
    await tx.insert(sessions).values({
      idHash: hashOf(sessionId), organisation: user.organisation, user: user.id,
      createdAt: now.toISOString(), lastSeenAt: now.toISOString(), expiresAt: new Date(now.getTime() + lifeOf(user.roles).absolute).toISOString(),
      userAgent: input.userAgent.slice(0, 300),
    })
  })
  return { id: user.id, organisationId: user.organisation, organisationName, name: user.name, email: user.email, roles: user.roles, sessionId }
}

/** Who a session belongs to, or null when it is unknown, revoked, expired, idle for too long, or its person disabled. Checked on every request. */
export async function findSession(database: Database, sessionId: string, now: Date): Promise<SessionUser | null> {
  return outsideOrganisation(database, async (tx) => {
    const [found] = await tx.select({ session: sessions, user: users, organisationName: organisations.name }).from(sessions)
      .innerJoin(users, eq(users.id, sessions.user))
      .innerJoin(organisations, eq(organisations.id, sessions.organisation))
      .where(and(eq(sessions.idHash, hashOf(sessionId)), isNull(sessions.revokedAt), isNull(users.disabledAt)))
    if (!found) return null
    const { session, user } = found
    const idleSince = now.getTime() - Date.parse(session.lastSeenAt)
    if (now.getTime() >= Date.parse(session.expiresAt) || idleSince >= lifeOf(user.roles).idle) return null
    // Once a minute is enough to tell idle from busy, and spares a write on every request.
    if (idleSince > MINUTE) await tx.update(sessions).set({ lastSeenAt: now.toISOString() }).where(eq(sessions.idHash, session.idHash))
    return { id: user.id, organisationId: user.organisation, organisationName: found.organisationName, name: user.name, email: user.email, roles: user.roles, sessionId }
  })
}

export async function endSession(database: Database, sessionId: string, now: Date): Promise<void> {
  await outsideOrganisation(database, tx => tx.update(sessions).set({ revokedAt: now.toISOString() }).where(and(eq(sessions.idHash, hashOf(sessionId)), isNull(sessions.revokedAt))))
}

/** What the browser may know of the person who is signed in. */
export function signedInOf(user: SessionUser): SignedIn {
  const { sessionId: _sessionId, ...signedIn } = user
  return signedIn
}

/** Counts one attempt of this account from this address; seconds to wait when there were too many, else null. */
async function countAttempt(tx: Transaction, key: string, now: Date): Promise<number | null> {
  const windowStart = new Date(now.getTime() - ATTEMPT_WINDOW).toISOString()
  const [row] = await tx.insert(signInAttempts).values({ key, attempts: 1, windowStartsAt: now.toISOString() })
    .onConflictDoUpdate({
      target: signInAttempts.key,
      set: {
        attempts: sql`case when ${signInAttempts.windowStartsAt} < ${windowStart}::timestamptz then 1 else ${signInAttempts.attempts} + 1 end`,
        windowStartsAt: sql`case when ${signInAttempts.windowStartsAt} < ${windowStart}::timestamptz then ${now.toISOString()}::timestamptz else ${signInAttempts.windowStartsAt} end`,
      },
    }).returning()
  if (row!.attempts <= ATTEMPTS) return null
  return Math.max(1, Math.ceil((Date.parse(row!.windowStartsAt) + ATTEMPT_WINDOW - now.getTime()) / 1000))
}
