import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import type { SheetListAnswer, SurveyView } from '#shared/records/office-views'
import type { Database } from '#server/database/client'
import { aSeededOrganisation, openTestDatabase, type SeededOrganisation } from '../support/office'
import { App, START_LIMIT_MILLISECONDS, type Answer, type Asked } from './support/app'
import { apiRoutes, nameOf } from './support/routes'

/** Ids of a sheet and a survey, to stand in a route's address. */
interface Ids { sheetId: string, surveyId: string, technicianId: string }

interface Row {
  /** What somebody who is not signed in gets. */
  anonymous: number
  /** What a technician, a reviewer and an administrator get of their own organisation. */
  roles: [technician: number, reviewer: number, administrator: number]
  /** How the request is made; ids are the only thing in it that belongs to an organisation. */
  ask?: (ids: Ids) => Asked & { query?: string }
  /** Answers that differ from call to call by nature: compared without these fields. */
  moving?: string[]
}

const MISSING: Ids = { sheetId: '00000000-0000-7000-8000-00000000000a', surveyId: '00000000-0000-7000-8000-00000000000b', technicianId: '00000000-0000-7000-8000-00000000000c' }

const pushBody = ({ sheetId, surveyId }: Ids) => ({
  v: 1, dev: `d_${sheetId.slice(-8)}`, phone: 'p_matrix', label: 'Matrix', epoch: null, sv: 1, pending: 0, oldest: null, blobs: 0, cursor: 0, now: '2026-05-12T13:00:00.000Z',
  ops: [sheetId, surveyId].map((object, index) => ({
    id: `00000000-0000-7000-8000-${object.slice(-12)}`, n: 900 + index, hlc: '0198000000000000', sv: 1, kind: 'reg.set', object, sheet: object,
    at: '2026-05-12T13:00:00.000Z', enteredAt: '2026-05-12T13:00:00.000Z', zone: 'UTC', mono: null, offset: null, by: null, personal: null,
    body: { key: index === 0 ? 'task' : 'title', value: 'Taken over', base: null, resolves: false },
  })),
})

/** One row a route. A route without a row fails the test, and so does a row without a route. */
const MATRIX: Record<string, Row> = {
  'GET /api/health': { anonymous: 200, roles: [200, 200, 200] },
  'POST /api/session': { anonymous: 422, roles: [422, 422, 422], ask: () => ({ body: {} }) },
  'GET /api/session': { anonymous: 401, roles: [200, 200, 200] },
  // Last of all, because it ends the session; anybody may say goodbye.
  'DELETE /api/session': { anonymous: 200, roles: [200, 200, 200] },
  'GET /api/changes': { anonymous: 401, roles: [403, 200, 200] },
  'GET /api/phones': { anonymous: 401, roles: [403, 200, 200] },
  'GET /api/sheets': { anonymous: 401, roles: [403, 200, 200], ask: ids => ({ query: `?state=all&survey=${ids.surveyId}&technician=${ids.technicianId}` }), moving: ['ver'] },
  'GET /api/sheets/:sheetId': { anonymous: 401, roles: [403, 200, 200] },
  // Revision 99 is nobody's: the step is refused, so that the sheets stay as they are.
  'POST /api/sheets/:sheetId/transitions': { anonymous: 401, roles: [403, 409, 409], ask: () => ({ body: { transition: 'void', expect: 99, reason: 'Taken over.' } }) },
  'GET /api/surveys': { anonymous: 401, roles: [403, 200, 200] },
  'GET /api/surveys/:surveyId': { anonymous: 401, roles: [403, 200, 200] },
  'GET /api/sync/pull': { anonymous: 401, roles: [200, 200, 200], ask: ids => ({ query: `?ver=0&have=${ids.surveyId},${ids.sheetId}` }), moving: ['time', 'to', 'next', 'rows', 'scopes'] },
  'POST /api/sync/push': { anonymous: 401, roles: [200, 200, 200], ask: ids => ({ body: pushBody(ids) }), moving: ['time', 'ver'] },
}

const routes = apiRoutes().sort((a, b) => Number(nameOf(a) === 'DELETE /api/session') - Number(nameOf(b) === 'DELETE /api/session'))

let database: Database
let app: App
let own: SeededOrganisation
let other: SeededOrganisation
let ownIds: Ids
const cookies: Record<string, string> = {}

beforeAll(async () => {
  database = openTestDatabase()
  own = await aSeededOrganisation(database, 'Matrix A', 'matrix-a.example', new Date())
  other = await aSeededOrganisation(database, 'Other organisation', 'other.example', new Date())
  app = await App.start(inject('databaseUrl'))
  for (const [role, person] of [['technician', 'orla'], ['reviewer', 'maren'], ['administrator', 'piet']] as const) {
    cookies[role] = await app.signIn(own.people[person]!)
    cookies[`other ${role}`] = await app.signIn(other.people[person]!)
  }
  const surveys = (await app.ask('/api/surveys', { cookie: cookies.reviewer })).json as SurveyView[]
  const { sheets } = (await app.ask('/api/sheets', { cookie: cookies.reviewer })).json as SheetListAnswer
  ownIds = { sheetId: sheets[0]!.id, surveyId: surveys[0]!.id, technicianId: own.people.orla!.id }
}, START_LIMIT_MILLISECONDS)
afterAll(async () => {
  await app.stop()
  await database.$client.end()
})

function ask(route: (typeof routes)[number], ids: Ids, cookie?: string): Promise<Answer> {
  const { query = '', ...asked } = MATRIX[nameOf(route)]!.ask?.(ids) ?? {}
  const path = route.path.replace(/:(\w+)/g, (_whole, name: string) => ids[name as keyof Ids]) + query
  return app.ask(path, { method: route.method, ...asked, ...(cookie === undefined ? {} : { cookie }) })
}

/** All of an answer that says something about what was asked for. */
function told(route: (typeof routes)[number], { status, text, json }: Answer): unknown {
  const moving = MATRIX[nameOf(route)]!.moving
  if (!moving || json === undefined) return { status, text }
  return { status, json: Object.fromEntries(Object.entries(json as Record<string, unknown>).filter(([name]) => !moving.includes(name))) }
}

describe('the matrix of routes', () => {
  test('has a row for every route and a route for every row', () => {
    expect(Object.keys(MATRIX).sort()).toEqual(routes.map(nameOf).sort())
    expect(routes.every(route => /^(GET|POST|PUT|PATCH|DELETE)$/.test(route.method))).toBe(true)
  })

  test.each(routes)('$method $path lets nobody in without signing in, but where it must', async (route) => {
    const answer = await ask(route, ownIds)
    expect(answer.status).toBe(MATRIX[nameOf(route)]!.anonymous)
    if (answer.status === 401) expect(answer.json).toMatchObject({ data: { code: 'sign-in' } })
  })

  test.each(routes.filter(route => nameOf(route) !== 'DELETE /api/session'))('$method $path answers each role as it may', async (route) => {
    const answers = []
    for (const role of ['technician', 'reviewer', 'administrator']) answers.push((await ask(route, ownIds, cookies[role])).status)
    expect(answers).toEqual(MATRIX[nameOf(route)]!.roles)
  })

  test.each(routes.filter(route => nameOf(route) !== 'DELETE /api/session'))('$method $path tells another organisation\'s people of our ids what it tells of none', async (route) => {
    for (const role of ['technician', 'reviewer', 'administrator']) {
      const cookie = cookies[`other ${role}`]
      const foreign = await ask(route, ownIds, cookie)
      const missing = await ask(route, MISSING, cookie)
      expect(told(route, foreign)).toEqual(told(route, missing))
      if (route.path.includes(':') && role !== 'technician') expect(foreign.status).toBe(404)
      // A refusal may say which of its own records was asked for, but nothing of ours ever.
      for (const mine of [own.id, own.people.orla!.email, 'Matrix A']) expect(foreign.text).not.toContain(mine)
    }
  })

  test('another organisation\'s pull and push leave us as we were', async () => {
    const before = (await app.ask(`/api/sheets/${ownIds.sheetId}`, { cookie: cookies.reviewer })).text
    const pushed = await ask({ method: 'POST', path: '/api/sync/push' }, ownIds, cookies['other reviewer'])
    expect((pushed.json as { res: unknown[][] }).res.map(([, outcome]) => outcome)).toEqual(['held', 'held'])
    expect((await app.ask(`/api/sheets/${ownIds.sheetId}`, { cookie: cookies.reviewer })).text).toBe(before)
    const pulled = (await ask({ method: 'GET', path: '/api/sync/pull' }, ownIds, cookies['other reviewer'])).json as { scopes: Record<string, string[]>, rows: { scope: string }[] }
    expect(pulled.scopes['-']).toEqual([ownIds.surveyId, ownIds.sheetId])
    expect(pulled.rows.filter(row => row.scope === ownIds.surveyId || row.scope === own.id)).toEqual([])
  })

  test('signs out everybody who asks for it, and only them', async () => {
    expect((await app.ask('/api/session', { method: 'DELETE', cookie: cookies.technician })).status).toBe(200)
    expect((await app.ask('/api/session', { cookie: cookies.technician })).status).toBe(401)
    expect((await app.ask('/api/session', { cookie: cookies.reviewer })).status).toBe(200)
  })
})
