import { request } from 'node:http'
import { gzipSync } from 'node:zlib'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import type { Database } from '#server/database/client'
import { aSeededOrganisation, openTestDatabase, type SeededOrganisation } from '../support/office'
import { App, openWire, START_LIMIT_MILLISECONDS, type Answer, type Asked } from './support/app'
import { apiRoutes } from './support/routes'

let database: Database
let organisation: SeededOrganisation
let app: App
let wire: Awaited<ReturnType<typeof openWire>>
let cookie: string

beforeAll(async () => {
  database = openTestDatabase()
  organisation = await aSeededOrganisation(database, 'Requests', 'requests.example', new Date())
  wire = await openWire(inject('databaseUrl'))
  app = await App.start(wire.url)
  cookie = await app.signIn(organisation.people.maren!)
}, START_LIMIT_MILLISECONDS)
afterAll(async () => {
  await app.stop()
  await wire.close()
  await database.$client.end()
})

const PUSH = { v: 1, dev: 'd_1', phone: 'p_1', label: '', epoch: null, sv: 1, pending: 0, oldest: null, blobs: 0, cursor: 0, now: '2026-05-12T13:00:00.000Z', ops: [] as unknown[] }
const push = (asked: Asked) => app.ask('/api/sync/push', { method: 'POST', cookie, body: PUSH, ...asked })
const codeOf = (answer: Answer) => (answer.json as { data?: { code?: string } } | undefined)?.data?.code
const changing = apiRoutes().filter(route => route.method !== 'GET').map(route => ({ ...route, path: route.path.replace(/:\w+/g, '00000000-0000-7000-8000-000000000000') }))

describe('a change from elsewhere', () => {
  test.each(changing)('$method $path is refused from another site, from a form and from nowhere', async ({ method, path }) => {
    const refused: Record<string, string>[] = [
      { 'sec-fetch-site': 'cross-site' },
      { 'sec-fetch-site': 'same-site' },
      { 'sec-fetch-site': 'none' },
      { 'sec-fetch-site': '' },
      { 'sec-fetch-site': '', 'origin': 'https://elsewhere.example' },
      { 'sec-fetch-site': '', 'origin': 'null' },
      { 'sec-fetch-site': 'cross-site', 'origin': app.url },
    ]
    for (const headers of refused) {
      const answer = await app.ask(path, { method, cookie, body: {}, headers })
      expect([headers, answer.status, codeOf(answer)]).toEqual([headers, 403, 'other-site'])
    }
  })

  test.each(changing.filter(({ method }) => method !== 'DELETE'))('$method $path takes JSON alone', async ({ method, path }) => {
    for (const type of ['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data; boundary=x', 'text/plain; application/json', 'application/jsonp', '']) {
      const answer = await app.ask(path, { method, cookie, body: '{}', headers: { 'content-type': type } })
      expect([type, answer.status]).toEqual([type, 415])
    }
  })

  test('comes from our own pages with either of the two headers that say so', async () => {
    expect((await push({})).status).toBe(200)
    expect((await push({ headers: { 'sec-fetch-site': '', 'origin': app.url } })).status).toBe(200)
    expect((await push({ headers: { 'content-type': 'Application/JSON; charset=utf-8' } })).status).toBe(200)
  })

  test('gets no leave to read an answer from another origin', async () => {
    for (const path of ['/', '/field', '/sign-in', '/api/health', '/api/session', '/sw.js', '/manifest.webmanifest']) {
      const answer = await app.ask(path, { cookie, headers: { origin: 'https://elsewhere.example' } })
      expect([path, answer.headers['access-control-allow-origin']]).toEqual([path, undefined])
    }
    const preflight = await app.ask('/api/sync/push', { method: 'OPTIONS', headers: { 'origin': 'https://elsewhere.example', 'access-control-request-method': 'POST' } })
    expect(preflight.headers['access-control-allow-origin']).toBeUndefined()
    expect(preflight.headers['access-control-allow-methods']).toBeUndefined()
  })
})

describe('a request that is none', () => {
  test('with another verb gets 405 and the verbs there are', async () => {
    for (const [method, path, allow] of [['POST', '/api/health', 'GET'], ['PUT', '/api/session', 'DELETE, GET, POST'], ['GET', '/api/sync/push', 'POST'], ['DELETE', '/api/sheets/x', 'GET'], ['PATCH', '/api/phones', 'GET'], ['OPTIONS', '/api/phones', 'GET']] as const) {
      const answer = await app.ask(path, { method, cookie })
      expect([path, answer.status, String(answer.headers.allow).split(', ').sort().join(', ')]).toEqual([path, 405, allow])
    }
  })

  test('for a route that is not there gets 404 and no page', async () => {
    for (const path of ['/api/nothing', '/api/', '/api/sheets/x/y/z', '/api/_auth/session', '/api/../api/nothing', '/api/sheets/%2e%2e/nothing']) {
      const answer = await app.ask(path, { cookie })
      expect([path, answer.status, answer.headers['content-type']]).toEqual([path, 404, 'application/json'])
    }
    for (const path of ['//api/phones', '/API/phones', '/api%2fphones']) expect([path, (await app.ask(path, { cookie })).status]).toEqual([path, 404])
  })

  test('with an id that is none gets 422, without a word of the database', async () => {
    for (const id of ['x', '\'; drop table op; --'.replaceAll(' ', '%20'), '%00', '0', '..%2f..', '%F0%9F']) {
      const answer = await app.ask(`/api/sheets/${id}`, { cookie })
      expect([id, [400, 404, 422].includes(answer.status)]).toEqual([id, true])
      expect(answer.text).not.toMatch(/at .*\(|node_modules|syntax error|invalid input syntax|select /i)
    }
  })

  test('with filters that nobody knows gets 422, and quotes in them find nothing', async () => {
    for (const query of ['state=every', 'sort=id', 'page=0', 'page=1e9', 'page[]=1&page[]=2', 'state=open&state=open', 'survey=x', 'unknown=1', '__proto__=1', `q=${'x'.repeat(101)}`]) {
      expect([query, (await app.ask(`/api/sheets?${query}`, { cookie })).status]).toEqual([query, query === '__proto__=1' ? 200 : 422])
    }
    const answer = await app.ask(`/api/sheets?state=all&q=${encodeURIComponent('\'"; drop table sheets --')}`, { cookie })
    expect([answer.status, (answer.json as { total: number }).total]).toEqual([200, 0])
  })
})

describe('a body', () => {
  test('beyond 1 MiB is refused at once, whether its length is said or not', async () => {
    const large = JSON.stringify({ ...PUSH, label: 'x'.repeat(2 ** 20) })
    const said = await push({ body: large })
    expect([said.status, codeOf(said)]).toEqual([413, 'too-large'])

    const startedAt = performance.now()
    const chunked = await sendChunks('/api/sync/push', 5 * 2 ** 20)
    expect(chunked.status === 413 || chunked.status === 'cut').toBe(true)
    expect(performance.now() - startedAt).toBeLessThan(3_000)
    expect((await app.ask('/api/health')).status).toBe(200)
  })

  test('may hold 1 MiB of operations', async () => {
    const text = JSON.stringify(PUSH)
    expect((await push({ body: text + ' '.repeat(2 ** 20 - text.length) })).status).toBe(200)
    expect((await push({ body: text + ' '.repeat(2 ** 20 - text.length + 1) })).status).toBe(413)
  })

  test('that is compressed is refused, and so is one that is no JSON', async () => {
    const gzip = await push({ body: gzipSync(JSON.stringify(PUSH)), headers: { 'content-encoding': 'gzip' } })
    expect([gzip.status, codeOf(gzip)]).toEqual([415, 'compressed-body'])
    for (const body of ['', '{', 'undefined', '{"v":1e', '\u0000', 'NaN', '{"v":1}}']) {
      const answer = await push({ body })
      expect([body, answer.status, codeOf(answer)]).toEqual([body, 400, 'not-json'])
    }
  })

  test('that nests too deep or holds a text too long is refused in words', async () => {
    const signIn = (body: unknown) => app.ask('/api/session', { method: 'POST', body })
    const deep = JSON.parse(`${'{"a":'.repeat(30)}1${'}'.repeat(30)}`) as unknown
    expect(codeOf(await signIn(deep))).toBe('too-deep')
    expect(codeOf(await signIn({ email: 'x'.repeat(10_001), password: 'x' }))).toBe('text-too-long')
    expect((await signIn(`${'['.repeat(400_000)}${']'.repeat(400_000)}`)).status).toBe(422)
    expect((await push({ body: { ...PUSH, label: deep } })).status).toBe(422)
    expect((await push({ body: { ...PUSH, ops: Array.from({ length: 501 }, () => ({})) } })).status).toBe(422)
  })

  test('with fields that nobody asked for is refused, and takes nobody\'s place', async () => {
    for (const name of ['organisation', 'organisationId', 'org', 'author', 'role', 'roles', 'actor', 'user', '__proto__x', 'constructor']) {
      expect([name, (await push({ body: { ...PUSH, [name]: organisation.people.piet!.id } })).status]).toEqual([name, 422])
    }
    expect((await push({ body: `{"__proto__":{"v":1},${JSON.stringify(PUSH).slice(1)}` })).status).toBeLessThan(500)
    expect(({} as Record<string, unknown>).v).toBeUndefined()
  })

  test('of whatever shape never makes the server fail', async () => {
    const pages: { path: string, whole: Record<string, unknown> }[] = [
      { path: '/api/session', whole: { email: 'fuzz@requests.example', password: 'x' } },
      { path: '/api/sync/push', whole: PUSH },
      { path: '/api/sheets/00000000-0000-7000-8000-000000000000/transitions', whole: { transition: 'accept', expect: 1, fit: true, reason: 'x' } },
    ]
    expect(pages.map(page => page.path).sort()).toEqual(changing.filter(({ method }) => method === 'POST').map(({ path }) => path).sort())
    const odd = fc.oneof(
      fc.jsonValue({ maxDepth: 4 }),
      fc.constantFrom<unknown>('\u0000', '\uD83D', -0, -1, 1e308, 2 ** 53, '0000-01-01T00:00:00Z', '+275760-09-13T00:00:00.000Z', [], {}, [[]], null, true, 'a@b', '%', '\'; select pg_sleep(9); --'),
    )
    const bodies = fc.oneof(
      odd.map(value => ({ replace: value })),
      fc.tuple(fc.nat(20), odd).map(([field, value]) => ({ field, value })),
    )
    await fc.assert(fc.asyncProperty(fc.nat(pages.length - 1), bodies, async (which, change) => {
      const { path, whole } = pages[which]!
      const names = Object.keys(whole)
      const body = 'field' in change ? { ...whole, [names[change.field % names.length]!]: change.value } : change.replace
      // Signing in works on the password for most of a second and counts attempts: only what does not get that far is tried there.
      if (path === '/api/session' && typeof (body as { email?: unknown } | null)?.email === 'string' && typeof (body as { password?: unknown }).password === 'string') return
      const answer = await app.ask(path, { method: 'POST', cookie, body: JSON.stringify(body) })
      if (answer.status >= 500) throw new Error(`${path} gave ${answer.status} for ${JSON.stringify(body)}`)
    }), { numRuns: 300 })
  })
})

describe('a fault', () => {
  test('of the database is said as 503 with a time to come back, and ends with the fault', async () => {
    const tried: [string, Asked][] = [['/api/health', {}], ['/api/session', { cookie }], ['/api/phones', { cookie }], ['/api/sync/pull?ver=0', { cookie }], ['/api/sync/push', { method: 'POST', body: PUSH, cookie }], ['/api/session', { method: 'POST', body: { email: 'a@b.example', password: 'x' } }]]
    wire.cut()
    try {
      for (const [path, asked] of tried) {
        const answer = await app.ask(path, asked)
        expect([path, answer.status, codeOf(answer)]).toEqual([path, 503, 'database-away'])
        expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0)
        expect(answer.text).not.toMatch(/ECONN|node_modules|at .*\(|127\.0\.0\.1/)
      }
    }
    finally {
      wire.mend()
    }
    for (const [path, asked] of tried.slice(0, 5)) expect([path, (await app.ask(path, asked)).status]).toEqual([path, 200])
  })

  test('is logged without what people wrote, and answered without where it was', () => {
    const log = app.log.join('\n')
    expect(log).not.toContain(organisation.people.maren!.password)
    expect(log).not.toContain('__Host-sid')
  })
})

/** Sends a body of unknown length in pieces; gives the status, or 'cut' when the server hung up on it. */
function sendChunks(path: string, bytes: number): Promise<{ status: number | 'cut' }> {
  return new Promise((resolve) => {
    const asked = request(app.url + path, { method: 'POST', agent: false, headers: { 'content-type': 'application/json', 'sec-fetch-site': 'same-origin', cookie, 'transfer-encoding': 'chunked' } }, (response) => {
      response.resume()
      resolve({ status: response.statusCode ?? 0 })
    })
    asked.on('error', () => resolve({ status: 'cut' }))
    const piece = Buffer.alloc(65_536, 0x20)
    let sent = 0
    const more = () => {
      while (sent < bytes) {
        sent += piece.length
        if (!asked.write(piece)) return void asked.once('drain', more)
      }
      asked.end()
    }
    more()
  })
}
