import { randomUUID } from 'node:crypto'
import { asc, eq } from 'drizzle-orm'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import { RECORD_KINDS } from '#shared/records/kinds'
import { openDatabase, type Database } from '#server/database/client'
import { grantScope } from '#server/database/tables/grant-scope'
import { op } from '#server/database/tables/op'
import { orgClock } from '#server/database/tables/org-clock'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'
import { surveys } from '#server/database/tables/surveys'
import { decideSheet } from '#server/services/decide-sheet'
import { PROJECTIONS } from '#server/services/project/project-rows'
import { rebuildFromLedger } from '#server/services/rebuild-from-ledger'
import { aSmallOrganisation, TestPhone, type SmallOrganisation } from './support/small-organisation'

let database: Database
let owner: pg.Client
let organisation: SmallOrganisation

beforeAll(async () => {
  database = openDatabase(inject('databaseUrl'))
  owner = new pg.Client({ connectionString: inject('ownerUrl') })
  await owner.connect()
  organisation = await aSmallOrganisation(database, 'Rebuild')
  await aMixedDay()
})
afterAll(async () => {
  await database.$client.end()
  await owner.end()
})

/** Every outcome that there is: applied, in conflict, held for each reason, parked, refused, reused, locked. */
async function aMixedDay(): Promise<void> {
  const [one, two, stranger] = [new TestPhone(organisation, organisation.technician), new TestPhone(organisation, organisation.technician), new TestPhone(organisation, organisation.outsider)]
  const sheet = one.newSheet({ number: 'A-1' })
  const voided = one.note(sheet.object, 'wrong')
  await one.push([sheet, voided, one.set(sheet.object, 'task', 'grinding'), one.operation('ev.void', sheet.object, { target: voided.id, reason: 'a slip' })])
  await two.push([two.set(sheet.object, 'task', 'welding'), two.set(sheet.object, 'medium', 'filter'), two.set(sheet.object, 'no-such', 1), two.set(randomUUID(), 'task', 'x')])
  await two.push([{ ...voided, n: 50, body: { ...voided.body, data: { text: 'reused' } } }])
  await stranger.push([stranger.set(sheet.object, 'task', 'no'), stranger.newSheet(), stranger.operation('obj.new', randomUUID(), { type: 'settings', parent: null, initial: {} })])
  // One that cannot be read, of a sheet that is made by a later operation of the same batch.
  const late = one.newSheet({ number: 'A-2' })
  await one.push([{ ...one.note(late.object, 'unreadable'), n: 5, id: 'no-id' }, { ...late, n: 6 }, { ...one.note(late.object, 'newer'), sv: 99 }, { ...one.note(randomUUID(), 'nowhere'), kind: 'ev.unheard-of' }])
  await one.push([one.step(sheet.object, 'hand-in', 9, false, 'x'), one.step(sheet.object, 'hand-in', 0, false, 'blocked')])
  await organisation.run(tx => decideSheet(tx, organisation.reviewer, sheet.object, { transition: 'accept', expect: 1, fit: false, reason: 'Kept.' }, new Date()))
  await one.push([one.set(sheet.object, 'task', 'too late')])
}

const everything = () => organisation.read(async tx => ({
  rows: await tx.select().from(rowState).where(eq(rowState.organisation, organisation.id)).orderBy(asc(rowState.t), asc(rowState.id)),
  grants: await tx.select().from(grantScope).where(eq(grantScope.organisation, organisation.id)).orderBy(asc(grantScope.person)),
  sheets: await tx.select().from(sheets).where(eq(sheets.organisation, organisation.id)).orderBy(asc(sheets.id)),
  surveys: await tx.select().from(surveys).where(eq(surveys.organisation, organisation.id)).orderBy(asc(surveys.id)),
}))
const rebuild = () => organisation.run(tx => rebuildFromLedger(tx, organisation.id))

describe('rebuilding from the ledger', () => {
  test('makes the same rows, grants and lists again, to the letter', async () => {
    const before = await everything()
    expect(before.rows.filter(row => row.t === 'late').length).toBeGreaterThan(7)
    expect(await rebuild()).toMatchObject({ rows: before.rows.length, mended: [], unexplained: [] })
    expect(await everything()).toEqual(before)
  })

  test('the day of the test holds every outcome, so that none is rebuilt unseen', async () => {
    const found = await organisation.read(tx => tx.selectDistinct({ outcome: op.outcome, reason: op.reason }).from(op).where(eq(op.organisation, organisation.id)))
    expect(found.map(({ outcome, reason }) => `${outcome} ${reason ?? ''}`.trim()).sort()).toEqual(expect.arrayContaining([
      'conflict', 'held id-reused', 'held invalid', 'held locked', 'held malformed', 'held no-access', 'held not-allowed', 'held unknown-object', 'ok', 'parked newer-schema', 'refused stale-state',
    ]))
  })

  test('mends what was lost or changed outside, and phones pull the mended rows', async () => {
    const before = await everything()
    const register = before.rows.find(row => row.t === 'reg')!
    await owner.query('update row_state set data = \'{"forged": true}\' where organisation = $1 and t = $2 and id = $3', [organisation.id, register.t, register.id])
    await owner.query('delete from row_state where organisation = $1 and t = \'state\'', [organisation.id])
    await owner.query('insert into row_state (organisation, t, id, scope, object, ver, data) values ($1, \'ev\', \'planted\', $2, $2, 1, \'{}\')', [organisation.id, organisation.surveyId])
    await owner.query('delete from sheets where organisation = $1', [organisation.id])
    const states = before.rows.filter(row => row.t === 'state').map(row => `state ${row.id}`)
    const result = await rebuild()
    expect(result.mended.sort()).toEqual([`reg ${register.id}`, ...states].sort())
    expect(result.unexplained).toEqual(['ev planted'])
    const after = await everything()
    const plain = (rows: typeof after.rows) => rows.filter(row => row.id !== 'planted').map(({ ver: _ver, ...row }) => row)
    expect(plain(after.rows)).toEqual(plain(before.rows))
    expect(after.sheets.map(({ ver: _ver, ...sheet }) => sheet)).toEqual(before.sheets.map(({ ver: _ver, ...sheet }) => sheet))
    const [clock] = await organisation.read(tx => tx.select().from(orgClock).where(eq(orgClock.organisation, organisation.id)))
    expect(after.rows.find(row => row.id === register.id && row.t === 'reg')!.ver).toBe(clock!.v)
  })
})

describe('projections', () => {
  test('every kind of record has a decision about a table of its own', () => {
    expect(Object.keys(PROJECTIONS).sort()).toEqual([...RECORD_KINDS].sort())
  })
})
