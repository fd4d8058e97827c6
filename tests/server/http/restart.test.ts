import { randomUUID } from 'node:crypto'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import { formatHlc } from '#shared/sync/hlc'
import type { PushResponse } from '#shared/sync/protocol'
import type { Database } from '#server/database/client'
import { restartCluster } from '../../../drizzle/scripts/postgres.mjs'
import { aSeededOrganisation, openTestDatabase, type SeededOrganisation } from '../support/office'
import { App, START_LIMIT_MILLISECONDS } from './support/app'

let database: Database
let organisation: SeededOrganisation
let app: App

beforeAll(async () => {
  database = openTestDatabase()
  organisation = await aSeededOrganisation(database, 'Restarts', 'restarts.example', new Date())
  // The database is about to be taken away, and this test's own connections with it.
  await database.$client.end()
  app = await App.start(inject('databaseUrl'))
}, START_LIMIT_MILLISECONDS)
afterAll(() => app.stop())

describe('a power cut of the database under load', () => {
  test('loses nothing that was answered, and phones go on afterwards', async () => {
    const cookie = await app.signIn(organisation.people.orla!)
    const answered: string[] = []
    const statuses = new Set<number>()
    let acceptedSinceRestart = 0
    let phase: 'before' | 'cut' | 'after' | 'done' = 'before'

    const phone = async (dev: string) => {
      for (let n = 1; phase !== 'done'; n++) {
        const id = randomUUID()
        const at = new Date().toISOString()
        const answer = await app.ask('/api/sync/push', {
          method: 'POST', cookie, body: {
            v: 1, dev, phone: dev, label: '', epoch: null, sv: 1, pending: 0, oldest: null, blobs: 0, cursor: 0, now: at,
            ops: [{ id, n, hlc: formatHlc(Date.now(), 0), sv: 1, kind: 'obj.new', object: id, sheet: null, at, enteredAt: at, zone: 'UTC', mono: null, offset: 0, by: null, personal: null, body: { type: 'worker', parent: null, initial: { code: `W-${dev}-${n}` } } }],
          },
        })
        statuses.add(answer.status)
        if (answer.status !== 200) {
          expect(answer.headers['retry-after']).toBeDefined()
          await new Promise(resolve => setTimeout(resolve, 50))
          continue
        }
        expect((answer.json as PushResponse).res).toEqual([[n, 'ok', null]])
        answered.push(id)
        if (phase === 'after') acceptedSinceRestart++
      }
    }
    const phones = Promise.all(['d_r1', 'd_r2', 'd_r3', 'd_r4'].map(phone))
    const until = async (isDone: () => boolean) => {
      const deadline = Date.now() + 30_000
      while (!isDone() && Date.now() < deadline) await new Promise(resolve => setTimeout(resolve, 20))
      expect(isDone()).toBe(true)
    }
    await until(() => answered.length >= 40)
    phase = 'cut'
    await restartCluster({ crash: true })
    phase = 'after'
    await until(() => acceptedSinceRestart >= 40)
    phase = 'done'
    await phones

    expect([...statuses].filter(status => status !== 200 && status !== 503)).toEqual([])
    const owner = new pg.Client({ connectionString: inject('ownerUrl') })
    await owner.connect()
    try {
      const { rows } = await owner.query<{ id: string }>('select op.id from op join row_state r on r.organisation = op.organisation and r.t = \'obj\' and r.id = op.object::text where op.id = any($1::uuid[])', [answered])
      expect(rows.map(row => row.id).sort()).toEqual([...answered].sort())
    }
    finally {
      await owner.end()
    }
    expect((await app.ask('/api/health')).status).toBe(200)
  }, 120_000)
})
