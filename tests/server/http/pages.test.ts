import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import { createHash } from 'node:crypto'
import type { Database } from '#server/database/client'
import { aSeededOrganisation, openTestDatabase, type SeededOrganisation } from '../support/office'
import { App, START_LIMIT_MILLISECONDS, type Answer } from './support/app'

let database: Database
let organisation: SeededOrganisation
let app: App
let cookie: string

beforeAll(async () => {
  database = openTestDatabase()
  organisation = await aSeededOrganisation(database, 'Pages', 'pages.example', new Date())
  app = await App.start(inject('databaseUrl'))
  cookie = await app.signIn(organisation.people.maren!)
}, START_LIMIT_MILLISECONDS)
afterAll(async () => {
  await app.stop()
  await database.$client.end()
})

const PAGES = ['/field', '/sign-in', '/office', '/office/review', '/office/nothing-here']

/** The policy by directive. */
function policyOf(answer: Answer): Record<string, string[]> {
  const header = String(answer.headers['content-security-policy'] ?? '')
  return Object.fromEntries(header.split(';').map(part => part.trim().split(/\s+/)).filter(([name]) => name).map(([name, ...values]) => [name!, values]))
}

/** What stands inside each script of a page that has no address. */
function inlineScripts(html: string): { attributes: string, text: string }[] {
  return [...html.matchAll(/<script\b([^>]*)>([\s\S]*?)<\/script>/g)]
    .map(([, attributes, text]) => ({ attributes: attributes!, text: text! }))
    .filter(({ attributes }) => !/\bsrc=/.test(attributes) && !/type="application\/json"/.test(attributes))
}

describe('headers', () => {
  test.each([...PAGES, '/api/health', '/api/session', '/api/nothing', '/'])('%s says what a browser may do with it', async (path) => {
    const { headers } = await app.ask(path, { cookie })
    expect(headers['x-content-type-options']).toBe('nosniff')
    expect(headers['referrer-policy']).toBe('no-referrer')
    expect(headers['content-security-policy']).toContain('default-src \'none\'')
    expect(headers['x-powered-by']).toBeUndefined()
    expect(headers['access-control-allow-origin']).toBeUndefined()
    expect(String(headers['strict-transport-security'])).toMatch(/max-age=(\d{8,}).*includeSubDomains/)
    if (path.startsWith('/api/')) return
    expect(headers['cross-origin-opener-policy']).toBe('same-origin')
    const permissions = String(headers['permissions-policy'])
    for (const allowed of ['camera=(self)', 'screen-wake-lock=(self)']) expect(permissions).toContain(allowed)
    for (const forbidden of ['geolocation=()', 'microphone=()']) expect(permissions).toContain(forbidden)
  })

  test.each(PAGES)('%s runs only scripts that are ours', async (path) => {
    const answer = await app.ask(path, { cookie })
    const policy = policyOf(answer)
    expect(policy['default-src']).toEqual(['\'none\''])
    expect(policy['script-src']).toContain('\'self\'')
    expect(policy['script-src']!.filter(source => /unsafe|\*|https?:|data:|blob:|\{\{/.test(source))).toEqual([])
    for (const [name, values] of Object.entries({ 'object-src': ['\'none\''], 'base-uri': ['\'none\''], 'frame-ancestors': ['\'none\''], 'form-action': ['\'self\''], 'connect-src': ['\'self\''], 'worker-src': ['\'self\''], 'script-src-attr': ['\'none\''] })) {
      expect([name, policy[name]]).toEqual([name, values])
    }
    const sources = policy['script-src']!
    for (const { attributes, text } of inlineScripts(answer.text)) {
      const nonce = /nonce="([^"]+)"/.exec(attributes)?.[1]
      const hash = `'sha256-${createHash('sha256').update(text).digest('base64')}'`
      expect(sources.includes(hash) || (nonce !== undefined && sources.includes(`'nonce-${nonce}'`))).toBe(true)
    }
    expect(answer.text).not.toMatch(/\son(click|load|error)=/)
  })

  test('the field\'s page, which a phone keeps, goes by hashes and not by a nonce that would be frozen', async () => {
    const answer = await app.ask('/field')
    const sources = policyOf(answer)['script-src']!
    expect(inlineScripts(answer.text).length).toBeGreaterThan(0)
    expect(sources.some(source => source.startsWith('\'sha256-'))).toBe(true)
    expect(sources.filter(source => source.startsWith('\'nonce-'))).toEqual([])
    expect((await app.ask('/field')).text).toBe(answer.text)
  })

  test('a deep address of the field opens under the same rules', async () => {
    const answer = await app.ask('/field/sheets/00000000-0000-7000-8000-000000000000')
    const sources = policyOf(answer)['script-src']!
    for (const { attributes, text } of inlineScripts(answer.text)) {
      const nonce = /nonce="([^"]+)"/.exec(attributes)?.[1]
      expect(sources.includes(`'sha256-${createHash('sha256').update(text).digest('base64')}'`) || (nonce !== undefined && sources.includes(`'nonce-${nonce}'`))).toBe(true)
    }
  })

  test('a page of the office has a nonce of its own each time', async () => {
    const nonceOf = async () => policyOf(await app.ask('/office', { cookie }))['script-src']!.find(source => source.startsWith('\'nonce-'))
    const first = await nonceOf()
    expect(first).toMatch(/^'nonce-.{16,}'$/)
    expect(await nonceOf()).not.toBe(first)
  })
})

describe('what may be kept', () => {
  test('answers of the API and pages of the office are kept by nobody', async () => {
    for (const path of ['/api/health', '/api/session', '/api/phones', '/api/sheets', '/api/nothing', '/api/sync/pull?ver=0', '/office', '/office/review', '/sign-in']) {
      const answer = await app.ask(path, { cookie })
      expect([path, answer.headers['cache-control']]).toEqual([path, 'no-store'])
      expect([path, answer.headers.etag]).toEqual([path, undefined])
    }
    expect((await app.ask('/api/session')).headers['cache-control']).toBe('no-store')
  })

  test('the worker is asked for each time, and caches no answer of the API', async () => {
    const worker = await app.ask('/sw.js')
    expect(worker.status).toBe(200)
    expect(worker.headers['cache-control']).toBe('no-cache')
    expect(worker.text).toContain('/^\\/api\\//')
    expect(worker.text).not.toMatch(/(NetworkFirst|StaleWhileRevalidate|CacheFirst)\(/)
  })

  test('asking who somebody is gives a stranger no cookie', async () => {
    for (const path of ['/', '/field', '/sign-in', '/office', '/api/health', '/api/session', '/api/phones']) {
      expect([path, (await app.ask(path)).headers['set-cookie']]).toEqual([path, undefined])
    }
  })
})

describe('an error', () => {
  test('names a code and nothing of the inside', async () => {
    for (const [path, status] of [['/api/phones', 401], ['/api/nothing', 404], ['/api/sheets/00000000-0000-7000-8000-000000000000', 404], ['/api/sheets?page=0', 422]] as const) {
      const answer = await app.ask(path, status === 401 ? {} : { cookie })
      expect([path, answer.status]).toEqual([path, status])
      expect(Object.keys(answer.json as object).sort()).toEqual(['data', 'error', 'message', 'statusCode'])
      expect(answer.text).not.toMatch(/stack|node_modules|\.mjs|at async|file:\/\//)
    }
  })

  test('opens no door of development', async () => {
    for (const path of ['/__nuxt_devtools__/client/', '/_nuxt/builds/nothing.json', '/_openapi.json', '/_swagger', '/_scalar', '/.git/config', '/.env', '/server/index.mjs', '/_nuxt/../server/index.mjs', '/.output/server/index.mjs', '/_tailwind/']) {
      const answer = await app.ask(path)
      expect([path, answer.status]).toEqual([path, 404])
    }
    const page = await app.ask('/field')
    const script = /src="(\/_nuxt\/[^"]+\.js)"/.exec(page.text)?.[1] ?? /href="(\/_nuxt\/[^"]+\.js)"/.exec(page.text)![1]!
    expect((await app.ask(script)).text).not.toContain('sourceMappingURL')
    expect((await app.ask(`${script}.map`)).status).toBe(404)
  })

  test('a stranger is sent from the office to the sign-in page', async () => {
    const answer = await app.ask('/office/review')
    expect(answer.status).toBe(302)
    expect(answer.headers.location).toBe('/sign-in?next=/office/review')
  })
})
