import { randomUUID } from 'node:crypto'
import { and, eq, sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import type { Row } from '#shared/sync/rows'
import { openDatabase, type Database } from '#server/database/client'
import { orgClock } from '#server/database/tables/org-clock'
import { rowState } from '#server/database/tables/row-state'
import { applyOffice } from '#server/services/apply-office'
import { OtherEpoch } from '#server/services/collect-pull'
import { answersOf, aSmallOrganisation, TestPhone, type SmallOrganisation } from './support/small-organisation'

let database: Database
let organisation: SmallOrganisation

beforeAll(async () => {
  database = openDatabase(inject('databaseUrl'))
  organisation = await aSmallOrganisation(database, 'Pull')
})
afterAll(() => database.$client.end())

const stored = (of: SmallOrganisation, scope?: string) => of.read(tx => tx.select().from(rowState).where(and(eq(rowState.organisation, of.id), scope ? eq(rowState.scope, scope) : undefined)))
const byKey = (rows: Iterable<Row>) => Object.fromEntries([...rows].map(({ t, id, ver, data }) => [`${t} ${id}`, { ver, data }]))

/** Puts a person into the survey's crew, or takes them out. */
async function changeCrew(of: SmallOrganisation, surveyId: string, personId: string, kind: 'set.add' | 'set.drop'): Promise<void> {
  await of.run(tx => applyOffice(tx, of.reviewer, [kind === 'set.add'
    ? { kind, object: surveyId, sheet: null, body: { set: 'crew', element: personId, meta: {} } }
    : { kind, object: surveyId, sheet: null, body: { set: 'crew', element: personId } }], new Date()))
}

async function aSurvey(of: SmallOrganisation): Promise<string> {
  const surveyId = randomUUID()
  await of.run(tx => applyOffice(tx, of.reviewer, [
    { kind: 'obj.new', object: surveyId, sheet: null, body: { type: 'survey', parent: null, initial: { title: 'Another', siteId: randomUUID(), startsOn: '2026-03-02', endsOn: '2026-03-06', zone: 'Europe/Dublin' } } },
  ], new Date()))
  return surveyId
}

describe('pulling', () => {
  test('[PULL2] gives every row once when one push is larger than a page', async () => {
    const phone = new TestPhone(organisation, organisation.technician)
    const sheet = phone.newSheet()
    const notes = Array.from({ length: 399 }, (_, index) => phone.note(sheet.object, `note ${index}`))
    await phone.push([sheet, ...notes])
    const pulls = new TestPhone(organisation, organisation.technician)
    const pages = await pulls.pull(37)
    expect(pages).toBeGreaterThan(10)
    expect(byKey(pulls.rows.values())).toEqual(byKey(await stored(organisation) as Row[]))
    expect(await pulls.pull(37)).toBe(1)
  })

  test('[PULL1] gives only what is new the next time, in order of version', async () => {
    const phone = new TestPhone(organisation, organisation.technician)
    await phone.pull()
    const sheet = phone.newSheet()
    await phone.push([sheet, phone.set(sheet.object, 'task', 'a')])
    await phone.push([phone.set(sheet.object, 'medium', 'b')])
    const page = await phone.page()
    expect(page.rows.map(row => `${row.t} ${row.id}`)).toEqual([`obj ${sheet.object}`, `reg ${sheet.object}/task`, `reg ${sheet.object}/medium`])
    expect(page).toMatchObject({ more: false, scopes: { '+': [], '-': [] }, next: { ver: page.to, after: null } })
  })

  test('[PULL2] leaves a row that moves on while pages are pulled to the next pull', async () => {
    const phone = new TestPhone(organisation, organisation.technician)
    const sheet = phone.newSheet()
    await phone.push([sheet, ...Array.from({ length: 60 }, (_, index) => phone.note(sheet.object, `n${index}`)), phone.set(sheet.object, 'task', 'first')])
    const pulls = new TestPhone(organisation, organisation.technician)
    await pulls.pull(20, async (page) => {
      if (page === 1) await phone.push([phone.set(sheet.object, 'task', 'second', null)])
    })
    await pulls.pull(20)
    expect(byKey(pulls.rows.values())).toEqual(byKey(await stored(organisation).then(rows => rows.filter(row => row.scope === organisation.id || row.scope === organisation.surveyId)) as Row[]))
  })

  test('[PULL4] fills a new scope from the beginning and takes a lost one away', async () => {
    const surveyId = await aSurvey(organisation)
    const phone = new TestPhone(organisation, organisation.technician)
    await phone.pull()
    expect(phone.scopes).not.toContain(surveyId)
    await changeCrew(organisation, surveyId, organisation.technician.id, 'set.add')
    await phone.pull()
    expect(phone.scopes).toContain(surveyId)
    expect([...phone.rows.values()].filter(row => row.scope === surveyId)).toHaveLength((await stored(organisation, surveyId)).length)
    await changeCrew(organisation, surveyId, organisation.technician.id, 'set.drop')
    await phone.pull()
    expect(phone.scopes).not.toContain(surveyId)
    expect([...phone.rows.values()].filter(row => row.scope === surveyId)).toEqual([])
  })

  test('[PULL4] skips nothing of a survey that comes while pages are pulled', async () => {
    const own = await aSmallOrganisation(database, 'Early')
    const surveyId = await aSurvey(own)
    const writer = new TestPhone(own, own.reviewer)
    const sheet = writer.operation('obj.new', randomUUID(), { type: 'sheet', parent: surveyId, initial: {} })
    await writer.push([sheet, ...Array.from({ length: 20 }, (_, index) => writer.note(sheet.object, `early ${index}`))])
    const phone = new TestPhone(own, own.technician)
    const other = phone.newSheet()
    await phone.push([other, ...Array.from({ length: 100 }, (_, index) => phone.note(other.object, `n${index}`))])
    // At page 2 the pages are past the versions of the survey's rows.
    const pages = await phone.pull(25, async (page) => {
      if (page === 2) await changeCrew(own, surveyId, own.technician.id, 'set.add')
    })
    expect(pages).toBeGreaterThan(2)
    await phone.pull(25)
    expect(byKey([...phone.rows.values()].filter(row => row.scope === surveyId))).toEqual(byKey(await stored(own, surveyId) as Row[]))
  })

  test('[PULL5] names the epoch of the database to a phone that knows another', async () => {
    const phone = new TestPhone(organisation, organisation.technician)
    await phone.pull()
    await expect(phone.page({ epoch: 'e_other' })).rejects.toBeInstanceOf(OtherEpoch)
    await expect(phone.page({ epoch: 'e_other' })).rejects.toMatchObject({ epoch: phone.epoch })
  })

  test('gives a technician outside the crew the organisation\'s records and no survey', async () => {
    const phone = new TestPhone(organisation, organisation.outsider)
    await phone.pull()
    expect(phone.scopes).toEqual([organisation.id])
    expect([...phone.rows.values()].every(row => row.scope === organisation.id)).toBe(true)
  })
})

describe('two organisations', () => {
  test('see nothing of each other, whatever ids they name', async () => {
    const other = await aSmallOrganisation(database, 'Neighbour')
    const phone = new TestPhone(organisation, organisation.technician)
    const sheet = phone.newSheet({ task: 'ours' })
    await phone.push([sheet])
    const before = await stored(organisation, organisation.surveyId)
    const stranger = new TestPhone(other, other.reviewer)
    expect(answersOf(await stranger.push([
      stranger.set(sheet.object, 'task', 'theirs'),
      stranger.operation('obj.new', randomUUID(), { type: 'sheet', parent: organisation.surveyId, initial: {} }),
      stranger.step(sheet.object, 'hand-in', 0, false, 'x'),
    ]))).toMatchObject({ 1: 'held unknown-object', 2: expect.stringMatching(/^held/), 3: 'held unknown-object' })
    expect(await stored(organisation, organisation.surveyId)).toEqual(before)
    await stranger.pull()
    expect(stranger.scopes.sort()).toEqual([other.id, other.surveyId].sort())
    expect(JSON.stringify([...stranger.rows.values()])).not.toContain('ours')
    const page = await stranger.page({ ver: 0, have: `${organisation.id},${organisation.surveyId}` })
    expect(page.scopes['-'].sort()).toEqual([organisation.id, organisation.surveyId].sort())
    expect(page.rows.some(row => row.scope === organisation.id || row.scope === organisation.surveyId)).toBe(false)
  })
})

describe('many writers', () => {
  test('[PULL1] a phone that pulls all the while misses nothing of sixteen writers', async () => {
    const busy = await aSmallOrganisation(database, 'Busy')
    const writers = openDatabase(inject('databaseUrl'), 16)
    try {
      const through = { ...busy, run: (work: Parameters<SmallOrganisation['run']>[0]) => busyRun(writers, busy.id, work) } as SmallOrganisation
      const phone = new TestPhone(busy, busy.technician)
      let isWriting = true
      const pulling = (async () => {
        let pulls = 0
        while (isWriting) {
          await phone.pull(20)
          pulls++
        }
        await phone.pull(20)
        return pulls
      })()
      await Promise.all(Array.from({ length: 16 }, async (_, writer) => {
        const own = new TestPhone(through, busy.technician, `d_writer_${writer}`)
        const sheet = own.newSheet()
        await own.push([sheet])
        for (let round = 0; round < 12; round++) {
          await own.push([own.note(sheet.object, `${writer} ${round}`), own.set(sheet.object, 'task', `${round}`)])
          await new Promise(resolve => setTimeout(resolve, Math.random() * 5))
        }
      }))
      isWriting = false
      expect(await pulling).toBeGreaterThan(3)
      expect(byKey(phone.rows.values())).toEqual(byKey(await stored(busy) as Row[]))
      const [clock] = await busy.read(tx => tx.select().from(orgClock).where(eq(orgClock.organisation, busy.id)))
      expect(clock!.v).toBe(1 + 16 * 13)
    }
    finally {
      await writers.$client.end()
    }
  })
})

async function busyRun<T>(writers: Database, organisationId: string, work: (tx: Parameters<Parameters<Database['transaction']>[0]>[0]) => Promise<T>): Promise<T> {
  return writers.transaction(async (tx) => {
    await tx.execute(sql`select set_config('app.organisation', ${organisationId}, true)`)
    return work(tx)
  })
}
