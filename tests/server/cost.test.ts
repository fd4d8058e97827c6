import { randomUUID } from 'node:crypto'
import { drizzle } from 'drizzle-orm/node-postgres'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import { sheetListQuerySchema } from '#shared/records/office-views'
import { openDatabase, type Database } from '#server/database/client'
import * as schema from '#server/database/schema'
import { inOrganisation } from '#server/database/with-organisation'
import { applyPush } from '#server/services/apply-push'
import { listSheets } from '#server/services/list-sheets'
import { listSurveys } from '#server/services/list-surveys'
import { openSheet } from '#server/services/open-sheet'
import { aSmallOrganisation, TestPhone, type SmallOrganisation } from './support/small-organisation'

let database: Database
let counting: Database
let statements: string[] = []
let organisation: SmallOrganisation

beforeAll(async () => {
  database = openDatabase(inject('databaseUrl'))
  const logger = { logQuery: (query: string) => void statements.push(query) }
  counting = Object.assign(drizzle(database.$client, { schema, casing: 'snake_case', logger }), { $client: database.$client })
  organisation = await aSmallOrganisation(database, 'Cost')
})
afterAll(() => database.$client.end())

/** How many statements the work sends, and how long it takes. */
async function cost(work: Parameters<typeof inOrganisation>[2]): Promise<{ statements: number, milliseconds: number }> {
  statements = []
  const startedAt = performance.now()
  await inOrganisation(counting, organisation.id, work)
  return { statements: statements.length, milliseconds: performance.now() - startedAt }
}

/** A batch of everything that phones send: sheets, fields, readings, steps, and what is held, over several sheets. */
function batchOf(phone: TestPhone, size: number): unknown[] {
  const batch: unknown[] = []
  while (batch.length < size) {
    const sheet = phone.newSheet()
    batch.push(
      sheet, phone.set(sheet.object, 'task', 'grinding'), phone.note(sheet.object, 'dry'), phone.set(sheet.object, 'task', 'welding'),
      phone.set(randomUUID(), 'task', 'nowhere'), { ...phone.note(sheet.object, ''), kind: 'ev.unheard-of' }, phone.set(sheet.object, 'no-such-field', 1),
      phone.step(sheet.object, 'hand-in', 0, false, 'blocked'), phone.step(sheet.object, 'hand-in', 0, true), phone.note(sheet.object, 'wet'),
    )
  }
  return batch.slice(0, size)
}

describe('what the database is asked', () => {
  test('for 500 operations is asked in as many statements as for ten', async () => {
    const push = (size: number) => {
      const phone = new TestPhone(organisation, organisation.technician)
      const ops = batchOf(phone, size)
      return cost(tx => applyPush(tx, organisation.technician, {
        v: 1, dev: phone.dev, phone: 'p', label: '', epoch: null, sv: 1, pending: 0, oldest: null, blobs: 0, cursor: 0, now: new Date().toISOString(), ops: ops as never,
      }, new Date()))
    }
    const small = await push(10)
    const large = await push(500)
    expect(small.statements).toBeGreaterThan(5)
    expect(large.statements).toBe(small.statements)
    expect(large.statements).toBeLessThan(25)
    expect(large.milliseconds).toBeLessThan(10_000)
  })

  test('for a list of sheets does not grow with the sheets, and less when nothing changed', async () => {
    const list = () => cost(tx => listSheets(tx, organisation.reviewer, sheetListQuerySchema.parse({ state: 'all', severity: 'any' }), new Date()))
    const grow = async (count: number) => {
      const phone = new TestPhone(organisation, organisation.technician)
      await phone.push(Array.from({ length: count }, () => phone.newSheet()))
    }
    await grow(1)
    const few = await list()
    await grow(200)
    const many = await list()
    expect(many.statements).toBe(few.statements)
    expect((await list()).statements).toBeLessThan(many.statements)
  })

  test('for one sheet and for the surveys does not grow with what lies beside them', async () => {
    const phone = new TestPhone(organisation, organisation.technician)
    const sheet = phone.newSheet()
    await phone.push([sheet])
    const open = () => cost(tx => openSheet(tx, organisation.reviewer, sheet.object))
    const surveys = () => cost(tx => listSurveys(tx, organisation.reviewer))
    const before = [(await open()).statements, (await surveys()).statements]
    await phone.push(Array.from({ length: 100 }, (_, index) => phone.note(sheet.object, `${index}`)))
    expect([(await open()).statements, (await surveys()).statements]).toEqual(before)
  })
})

describe('why a version comes from a locked counter', () => {
  test('a cursor over a plain sequence skips what commits late', async () => {
    const [slow, quick] = [new pg.Client({ connectionString: inject('ownerUrl') }), new pg.Client({ connectionString: inject('ownerUrl') })]
    await Promise.all([slow.connect(), quick.connect()])
    try {
      await slow.query('create table naive_feed (id bigserial primary key)')
      await slow.query('begin')
      await slow.query('insert into naive_feed default values')
      await quick.query('insert into naive_feed default values')
      const seen = (await quick.query<{ id: string }>('select id from naive_feed where id > 0 order by id')).rows.map(row => Number(row.id))
      await slow.query('commit')
      const later = (await quick.query<{ id: string }>('select id from naive_feed where id > $1', [seen.at(-1)])).rows
      // The first row is there now, and nobody will ever be given it.
      expect([seen, later]).toEqual([[2], []])
    }
    finally {
      await quick.query('rollback')
      await slow.query('drop table naive_feed')
      await Promise.all([slow.end(), quick.end()])
    }
  })

  test('[PULL1] the same two writers through the counter are both pulled', async () => {
    const [first, second, reader] = [0, 1, 2].map(() => new TestPhone(organisation, organisation.technician)) as [TestPhone, TestPhone, TestPhone]
    await reader.pull()
    const [slow, quick] = [first.newSheet(), second.newSheet()]
    const request = (phone: TestPhone, ops: unknown[]) => ({ v: 1, dev: phone.dev, phone: 'p', label: '', epoch: null, sv: 1, pending: 0, oldest: null, blobs: 0, cursor: 0, now: new Date().toISOString(), ops: ops as never })
    let release: () => void = () => {}
    const held = new Promise<void>((resolve) => { release = resolve })
    let isReceived: () => void = () => {}
    const received = new Promise<void>((resolve) => { isReceived = resolve })
    const writing = organisation.run(async (tx) => {
      await applyPush(tx, organisation.technician, request(first, [slow]), new Date())
      isReceived()
      await held
    })
    await received
    const waiting = second.push([quick])
    await reader.pull()
    expect([reader.rows.has(`obj ${slow.object}`), reader.rows.has(`obj ${quick.object}`)]).toEqual([false, false])
    release()
    await Promise.all([writing, waiting])
    await reader.pull()
    expect([reader.rows.has(`obj ${slow.object}`), reader.rows.has(`obj ${quick.object}`)]).toEqual([true, true])
  })
})
