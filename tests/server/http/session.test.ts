import { createHash } from 'node:crypto'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import type { Database } from '#server/database/client'
import { aSeededOrganisation, openTestDatabase, type SeededOrganisation } from '../support/office'
import { App, cookieOf, START_LIMIT_MILLISECONDS, type Answer } from './support/app'

let database: Database
let organisation: SeededOrganisation
let app: App
let owner: pg.Client

beforeAll(async () => {
  database = openTestDatabase()
  organisation = await aSeededOrganisation(database, 'Sessions', 'sessions.example', new Date())
  owner = new pg.Client({ connectionString: inject('ownerUrl') })
  await owner.connect()
  app = await App.start(inject('databaseUrl'))
}, START_LIMIT_MILLISECONDS)
afterAll(async () => {
  await app.stop()
  await owner.end()
  await database.$client.end()
})

const signIn = (email: string, password: string, cookie?: string) => app.ask('/api/session', { method: 'POST', body: { email, password }, cookie })
const who = (cookie?: string) => app.ask('/api/session', { cookie })
/** What a stranger can compare: everything but the request's own name and the clock. */
const told = ({ status, headers, text }: Answer) => {
  const { 'x-request-id': _id, date: _date, ...rest } = headers
  return { status, headers: rest, text }
}

describe('signing in', () => {
  test('answers with who it is, and never with the session or the password', async () => {
    const { orla } = organisation.people
    const answer = await signIn(` ${orla!.email.toUpperCase()} `, orla!.password)
    expect(answer.status).toBe(200)
    expect(answer.json).toEqual({ id: orla!.id, organisationId: organisation.id, organisationName: 'Sessions', name: orla!.name, email: orla!.email, roles: ['technician'] })
    expect((await who(cookieOf(answer))).json).toEqual(answer.json)
  })

  test('sets one cookie that only our own pages can send and no script can read', async () => {
    const { orla } = organisation.people
    const answer = await signIn(orla!.email, orla!.password)
    const cookies = ([] as string[]).concat(answer.headers['set-cookie'] ?? [])
    expect(cookies).toHaveLength(1)
    const [pair, ...attributes] = cookies[0]!.split(/;\s*/)
    expect(pair).toMatch(/^__Host-sid=.{64,}$/)
    expect(attributes.filter(attribute => !/^(Max-Age|Expires)=/.test(attribute)).sort()).toEqual(['HttpOnly', 'Path=/', 'SameSite=Lax', 'Secure'])
    expect(pair!.length).toBeLessThan(2048)
  })

  test('says the same of a wrong password and of an account that is not there', async () => {
    const wrong = await signIn(organisation.people.tomas!.email, 'not the password')
    const unknown = await signIn('nobody@sessions.example', 'not the password')
    expect(wrong.status).toBe(401)
    expect(wrong.json).toMatchObject({ data: { code: 'wrong-sign-in' } })
    expect(told(unknown)).toEqual(told(wrong))
  })

  test('takes as long for an account that is not there as for a wrong password', async () => {
    const time = async (email: string) => {
      const startedAt = performance.now()
      await signIn(email, 'not the password')
      return performance.now() - startedAt
    }
    const times: [number[], number[]] = [[], []]
    for (let round = 0; round < 3; round++) {
      times[0].push(await time(organisation.people.ines!.email))
      times[1].push(await time('nobody-either@sessions.example'))
    }
    // Without the work on a password that nobody has, the second would be some hundred times quicker.
    const [known, unknown] = times.map(list => Math.min(...list)) as [number, number]
    expect(unknown / known).toBeGreaterThan(0.5)
    expect(unknown / known).toBeLessThan(2)
  })

  test('refuses the eleventh attempt within a quarter of an hour and says when to come back', async () => {
    const attempts = await Promise.all(Array.from({ length: 14 }, () => signIn('often@sessions.example', 'guess')))
    const refused = attempts.filter(answer => answer.status === 429)
    expect(attempts.filter(answer => answer.status === 401)).toHaveLength(10)
    expect(refused).toHaveLength(4)
    for (const answer of refused) {
      expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0)
      expect(Number(answer.headers['retry-after'])).toBeLessThanOrEqual(900)
      expect(answer.json).toMatchObject({ data: { code: 'too-many-attempts' } })
    }
    // A header that anybody can write gives nobody a fresh count.
    const spoofed = await app.ask('/api/session', { method: 'POST', body: { email: 'often@sessions.example', password: 'guess' }, headers: { 'x-forwarded-for': '203.0.113.9', 'forwarded': 'for=203.0.113.9' } })
    expect(spoofed.status).toBe(429)
  })

  test('gives a new session each time and ends the one before', async () => {
    const { maren } = organisation.people
    const first = await app.signIn(maren!)
    const second = await app.signIn(maren!, first)
    expect(second).not.toBe(first)
    expect((await who(first)).status).toBe(401)
    expect((await who(second)).status).toBe(200)
  })

  test('does not take over a session that somebody planted', async () => {
    const answer = await signIn(organisation.people.maren!.email, organisation.people.maren!.password, '__Host-sid=planted')
    expect(answer.status).toBe(200)
    expect(cookieOf(answer)).not.toBe('__Host-sid=planted')
  })
})

describe('a session', () => {
  test('is over with signing out, whoever kept the cookie', async () => {
    const cookie = await app.signIn(organisation.people.piet!)
    const out = await app.ask('/api/session', { method: 'DELETE', cookie })
    expect(out.status).toBe(200)
    expect((await who(cookie)).status).toBe(401)
    expect((await app.ask('/api/phones', { cookie })).status).toBe(401)
    expect((await app.ask('/api/session', { method: 'DELETE', cookie })).status).toBe(200)
  })

  test('is over when its person is disabled, and signing in again is a wrong sign-in', async () => {
    const { ines } = organisation.people
    const cookie = await app.signIn(ines!)
    expect((await who(cookie)).status).toBe(200)
    await owner.query('update users set disabled_at = now() where id = $1', [ines!.id])
    try {
      expect((await who(cookie)).status).toBe(401)
      expect((await signIn(ines!.email, ines!.password)).json).toMatchObject({ data: { code: 'wrong-sign-in' } })
    }
    finally {
      await owner.query('update users set disabled_at = null where id = $1', [ines!.id])
    }
  })

  test.each([
    ['idle: technician', 'orla', 7 * 86_400, 'last_seen_at'],
    ['idle: office', 'maren', 3_600, 'last_seen_at'],
    ['expiry', 'maren', 0, 'expires_at'],
  ])('is over at its limit and not before (%s)', async (_title, name, seconds, column) => {
    const cookie = await app.signIn(organisation.people[name]!)
    const move = (age: number) => owner.query(`update sessions set ${column} = now() - make_interval(secs => $2) where "user" = $1 and revoked_at is null`, [organisation.people[name]!.id, age])
    await move(seconds - 30)
    expect((await who(cookie)).status).toBe(200)
    await move(seconds + 1)
    expect((await who(cookie)).status).toBe(401)
  })

  test('counts as heard of when it is used', async () => {
    const cookie = await app.signIn(organisation.people.maren!)
    await owner.query('update sessions set last_seen_at = now() - interval \'30 minutes\' where "user" = $1', [organisation.people.maren!.id])
    await who(cookie)
    const { rows } = await owner.query<{ age: number }>('select min(extract(epoch from now() - last_seen_at))::int as age from sessions where "user" = $1 and revoked_at is null', [organisation.people.maren!.id])
    expect(rows[0]!.age).toBeLessThan(60)
  })

  test('is kept by its hash alone: what stands in the database opens nothing', async () => {
    await app.signIn(organisation.people.tomas!)
    const { rows } = await owner.query<{ id_hash: Buffer }>('select id_hash from sessions where "user" = $1', [organisation.people.tomas!.id])
    expect(rows.length).toBeGreaterThan(0)
    for (const row of rows) expect(row.id_hash).toHaveLength(createHash('sha256').digest().length)
  })

  test.each(['__Host-sid=', '__Host-sid=x', `__Host-sid=${'A'.repeat(3000)}`, '__Host-sid=Fe26.2**abc*def*ghi*123*jkl*mno', '__Host-sid=%00%ff'])('is not made of a cookie that is none of ours (%#)', async (cookie) => {
    expect((await who(cookie)).status).toBe(401)
    expect((await app.ask('/api/sync/pull?ver=0', { cookie })).status).toBe(401)
  })

  test('shows nothing at the sign-in module\'s own address', async () => {
    const cookie = await app.signIn(organisation.people.maren!)
    expect((await app.ask('/api/_auth/session', { cookie })).status).toBe(404)
    expect((await app.ask('/api/_auth/session', { method: 'DELETE', cookie })).status).toBe(404)
    expect((await who(cookie)).status).toBe(200)
  })
})
