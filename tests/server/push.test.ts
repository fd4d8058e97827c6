import { randomUUID } from 'node:crypto'
import fc from 'fast-check'
import pg from 'pg'
import { and, eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, inject, test, vi } from 'vitest'
import { formatHlc } from '#shared/sync/hlc'
import { openDatabase, type Database } from '#server/database/client'
import { device } from '#server/database/tables/device'
import { op } from '#server/database/tables/op'
import { orgClock } from '#server/database/tables/org-clock'
import { rowState } from '#server/database/tables/row-state'
import { sheets } from '#server/database/tables/sheets'
import { decideSheet } from '#server/services/decide-sheet'
import { Refusal } from '#server/services/refusal'
import { answersOf, aSmallOrganisation, TestPhone, type SmallOrganisation } from './support/small-organisation'

let database: Database
let organisation: SmallOrganisation

beforeAll(async () => {
  database = openDatabase(inject('databaseUrl'))
  organisation = await aSmallOrganisation(database, 'Push')
})
afterAll(() => database.$client.end())

const aPhone = (actor = organisation.technician) => new TestPhone(organisation, actor)
const ledger = (id: string) => organisation.read(async tx => (await tx.select().from(op).where(and(eq(op.organisation, organisation.id), eq(op.id, id))))[0])
const rowsOf = (object: string) => organisation.read(tx => tx.select().from(rowState).where(and(eq(rowState.organisation, organisation.id), eq(rowState.object, object))))
const version = () => organisation.read(async tx => (await tx.select().from(orgClock).where(eq(orgClock.organisation, organisation.id)))[0]!.v)

describe('receiving', () => {
  test('[PUSH1] keeps an operation to the letter, names and contacts apart from its hash', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    const first = { ...phone.note(sheet.object, 'Dry, <LOD, 2,03'), personal: { worker: 'A name' } }
    expect(answersOf(await phone.push([sheet, first]))).toEqual({ 1: 'ok', 2: 'ok' })
    const { personal, ...rest } = first
    const entry = await ledger(first.id)
    expect(entry).toMatchObject({ dev: phone.dev, n: 2, author: organisation.technician.id, body: rest, personal, outcome: 'ok' })
    expect(answersOf(await phone.push([{ ...first, personal: {} }]))).toEqual({ 2: 'dup' })
  })

  test('[PUSH2] answers dup to the same batch again and changes nothing', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    const batch = [sheet, phone.set(sheet.object, 'task', 'grinding'), phone.note(sheet.object, 'wet floor')]
    await phone.push(batch)
    const before = [await rowsOf(sheet.object), await version()]
    expect(answersOf(await phone.push([...batch].reverse()))).toEqual({ 1: 'dup', 2: 'dup', 3: 'dup' })
    expect([await rowsOf(sheet.object), await version()]).toEqual(before)
  })

  test('[PUSH2] says again what was held or refused, because the first answer may have been lost', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    const batch = [sheet, phone.step(sheet.object, 'hand-in', 5, true), phone.set(sheet.object, 'no-such-field', 1), { ...phone.note(sheet.object, 'later'), sv: 99 }]
    const answer = answersOf(await phone.push(batch))
    expect(answer).toEqual({ 1: 'ok', 2: 'refused stale-state', 3: 'held invalid', 4: 'parked newer-schema' })
    expect(answersOf(await phone.push(batch))).toEqual({ ...answer, 1: 'dup' })
  })

  test('[PUSH3] receives the same id with another body under an id of its own and holds it, once', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    const note = phone.note(sheet.object, 'first')
    const other = { ...note, body: { ...note.body, data: { text: 'second' } } }
    await phone.push([sheet, note])
    expect(answersOf(await phone.push([other]))).toEqual({ 2: 'held id-reused' })
    expect(answersOf(await phone.push([other]))).toEqual({ 2: 'held id-reused' })
    const late = (await rowsOf(sheet.object)).filter(row => row.t === 'late')
    expect(late).toHaveLength(1)
    expect(late[0]!.data).toMatchObject({ reason: 'id-reused', body: { data: { text: 'second' } } })
    expect((await ledger(note.id))?.body).toMatchObject({ body: { data: { text: 'first' } } })
    expect(await ledger(late[0]!.id)).toMatchObject({ claimedId: note.id, outcome: 'held', reason: 'id-reused' })
  })

  test('[PUSH5] lets no bad operation stop the others, and keeps each of them', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    const id = sheet.object
    const deep = { ...phone.note(id, ''), body: { a: { b: { c: { d: { e: { f: { g: { h: { i: { j: { k: { l: { m: 1 } } } } } } } } } } } } } }
    const batch: unknown[] = [
      sheet, deep,
      { ...phone.note(id, ''), body: { type: 'note', data: { text: 'x'.repeat(10_001) }, corrects: null, reason: null } },
      { ...phone.note(id, ''), id: 'not-an-id' },
      { ...phone.note(id, ''), kind: 'ev.unheard-of' },
      { ...phone.note(id, ''), hlc: 'late' },
      { ...phone.note(id, ''), sv: Number.MAX_SAFE_INTEGER },
      { ...phone.note(id, ''), unexpected: true },
      phone.set(randomUUID(), 'task', 'on a sheet that nobody made'),
      phone.note(id, 'nul \u0000 and half an emoji \uD83D'),
      { ...phone.note(id, 'a clock from year 0'), at: '0000-01-01T00:00:00Z', enteredAt: '0000-01-01T00:00:00Z' },
    ]
    const answer = await phone.push(batch)
    expect(answersOf(answer)).toEqual({
      1: 'ok', 2: 'held malformed', 3: 'held malformed', 4: 'held malformed', 5: 'held malformed', 6: 'held malformed', 7: 'parked newer-schema', 8: 'held malformed',
      9: 'held unknown-object', 10: 'ok', 11: 'ok',
    })
    const late = (await rowsOf(id)).filter(row => row.t === 'late')
    expect(late).toHaveLength(7)
    expect(JSON.stringify(late)).toContain('x'.repeat(10_001))
    const [projection] = await organisation.read(tx => tx.select().from(sheets).where(and(eq(sheets.organisation, organisation.id), eq(sheets.id, id))))
    expect(projection).toMatchObject({ lateChanges: 7 })
    expect(answersOf(await phone.push(batch))).toMatchObject({ 1: 'dup', 2: 'held malformed', 4: 'held malformed' })
    expect((await rowsOf(id)).filter(row => row.t === 'late')).toHaveLength(7)
  })

  test('[PUSH5] receives one by one what the database will not take together, and holds the one at fault as text', async () => {
    const owner = new pg.Client({ connectionString: inject('ownerUrl') })
    await owner.connect()
    const quiet = vi.spyOn(console, 'error').mockImplementation(() => {})
    await owner.query(`create function refuse_planted() returns trigger language plpgsql as $$ begin raise exception 'planted' using errcode = '22000'; end $$`)
    await owner.query(`create trigger refuse_planted before insert on op for each row when (new.body -> 'body' -> 'data' ->> 'text' = 'planted fault') execute function refuse_planted()`)
    try {
      const phone = aPhone()
      const sheet = phone.newSheet()
      const batch = [sheet, phone.note(sheet.object, 'planted fault'), phone.note(sheet.object, 'after it')]
      expect(answersOf(await phone.push(batch))).toEqual({ 1: 'ok', 2: 'held error', 3: 'ok' })
      expect(await ledger(batch[1]!.id)).toMatchObject({ outcome: 'held', reason: 'error', body: { text: expect.stringContaining('planted fault') } })
      expect((await rowsOf(sheet.object)).filter(row => row.t === 'late').map(row => row.id)).toEqual([batch[1]!.id])
      expect(answersOf(await phone.push(batch))).toEqual({ 1: 'dup', 2: 'held error', 3: 'dup' })
      expect(quiet).toHaveBeenCalled()
    }
    finally {
      quiet.mockRestore()
      await owner.query('drop trigger refuse_planted on op')
      await owner.query('drop function refuse_planted')
      await owner.end()
    }
  })

  test('never fails over what an operation holds, whatever it is', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    await phone.push([sheet])
    const valid = [phone.note(sheet.object, 'x'), phone.set(sheet.object, 'task', 'y'), phone.step(sheet.object, 'hand-in', 0, false, 'no'), phone.newSheet()] as Record<string, unknown>[]
    const planted = fc.oneof(fc.jsonValue({ maxDepth: 4 }), fc.constantFrom('\u0000', '\uD800', Number.MAX_SAFE_INTEGER, 2 ** 31, -1, 1e308, '0000-01-01T00:00:00Z', ['__proto__'], JSON.parse('{"__proto__":{"polluted":true}}')))
    const operation = fc.tuple(fc.constantFrom(...valid), fc.constantFrom(...Object.keys(valid[0]!), 'body.key', 'body.value', 'body.type', 'body.data', 'body.initial', 'body.parent', '__proto__'), planted, fc.integer({ min: 1, max: 2 ** 53 - 1 }))
      .map(([base, path, value, n]) => {
        const copy = structuredClone(base)
        copy.id = randomUUID()
        copy.n = n
        const [first, second] = path.split('.') as [string, string?]
        if (second) Object.defineProperty(copy[first], second, { value, enumerable: true, configurable: true, writable: true })
        else Object.defineProperty(copy, first, { value, enumerable: true, configurable: true, writable: true })
        return copy
      })
    let received = 0
    await fc.assert(fc.asyncProperty(fc.array(operation, { minLength: 1, maxLength: 12 }), async (ops) => {
      try {
        const answer = await phone.push(JSON.parse(JSON.stringify(ops)))
        expect(answer.res).toHaveLength(ops.length)
        received += ops.length
      }
      catch (error) {
        expect(error).toBeInstanceOf(Refusal)
        expect(error).toMatchObject({ status: 422 })
      }
    }), { numRuns: 60 })
    expect(received).toBeGreaterThan(100)
    expect(({} as Record<string, unknown>).polluted).toBeUndefined()
  })
})

describe('applying', () => {
  test('[MERGE4] keeps both values of a field that two phones set apart', async () => {
    const [one, two] = [aPhone(), aPhone()]
    const sheet = one.newSheet()
    const first = one.set(sheet.object, 'task', 'grinding')
    await one.push([sheet, first])
    expect(answersOf(await two.push([two.set(sheet.object, 'task', 'welding', null)]))).toEqual({ 1: 'conflict' })
    const rows = await rowsOf(sheet.object)
    const conflict = rows.find(row => row.t === 'conflict')!
    expect((conflict.data as { values: { value: string }[] }).values.map(value => value.value).sort()).toEqual(['grinding', 'welding'])
    const [projection] = await organisation.read(tx => tx.select().from(sheets).where(and(eq(sheets.organisation, organisation.id), eq(sheets.id, sheet.object))))
    expect(projection).toMatchObject({ openConflicts: 1 })
  })

  test('[CLOCK1] holds a clock that runs a day ahead to two minutes, in the order of the phone', async () => {
    const phone = aPhone()
    phone.clock = Date.now() + 86_400_000
    const sheet = phone.newSheet()
    const batch = [sheet, phone.set(sheet.object, 'task', 'a'), phone.set(sheet.object, 'medium', 'b')]
    await phone.push(batch)
    const entries = await Promise.all(batch.map(operation => ledger(operation.id)))
    const stamps = entries.map(entry => entry!.hlcEffective)
    expect([...stamps].sort()).toEqual(stamps)
    expect(new Set(stamps).size).toBe(3)
    expect(stamps[2]! < formatHlc(Date.now() + 130_000, 0)).toBe(true)
    expect(entries[0]!.hlcClaimed).toBe(sheet.hlc)
  })

  test('[MERGE8] takes a step once: the second from the same revision is refused with its reason', async () => {
    const [one, two] = [aPhone(), aPhone()]
    const sheet = one.newSheet()
    expect(answersOf(await one.push([sheet, one.step(sheet.object, 'hand-in', 0, false, 'pump failed')]))).toEqual({ 1: 'ok', 2: 'ok' })
    expect(answersOf(await two.push([two.step(sheet.object, 'hand-in', 0, false, 'pump failed')]))).toEqual({ 1: 'refused stale-state' })
  })

  test('hands a sheet in as fit only without stop findings, and a reviewer alone accepts', async () => {
    const phone = aPhone()
    const pumpId = randomUUID()
    const sheet = phone.newSheet({ pumpId })
    // A flow that fell by a quarter: over the 10 % at which common practice calls a sample void.
    const readings = (['before', 'after'] as const).flatMap(when => [1, 2, 3].map(() => phone.operation('ev.add', sheet.object, {
      type: 'flow-reading', corrects: null, reason: null,
      data: { when, pumpId, calibratorId: null, samplerInLine: null, typed: when === 'before' ? '2.00' : '1.50', unit: 'L/min', litresPerMinute: when === 'before' ? 2 : 1.5 },
    })))
    const timer = (action: string) => phone.operation('ev.add', sheet.object, { type: 'timer', corrects: null, reason: null, data: { action, pumpId } })
    const batch = [
      sheet, ...readings.slice(0, 3), timer('start'), timer('stop'), ...readings.slice(3),
      phone.step(sheet.object, 'hand-in', 0, true),
      phone.step(sheet.object, 'hand-in', 0, false, 'the flow fell'),
      phone.step(sheet.object, 'accept', 1, false, 'all the same'),
    ]
    const answer = answersOf(await phone.push(batch))
    expect(batch.slice(-3).map(operation => answer[operation.n])).toEqual(['refused stop-findings', 'ok', 'refused not-allowed'])
    const accept = (fit: boolean) => organisation.run(tx => decideSheet(tx, organisation.reviewer, sheet.object, { transition: 'accept', expect: 1, fit, reason: 'Seen.' }, new Date()))
    await expect(accept(true)).rejects.toMatchObject({ code: 'stop-findings', status: 409 })
    await expect(accept(false)).resolves.toMatchObject({ revision: 2 })
  })

  test('[MERGE9] holds beside a locked sheet what comes late, and leaves the sheet as it was', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    await phone.push([sheet, phone.step(sheet.object, 'hand-in', 0, false, 'blocked')])
    await organisation.run(tx => decideSheet(tx, organisation.reviewer, sheet.object, { transition: 'accept', expect: 1, fit: false, reason: 'Kept as a record.' }, new Date()))
    const before = await rowsOf(sheet.object)
    const late = phone.set(sheet.object, 'task', 'welding')
    expect(answersOf(await phone.push([late]))).toEqual({ 3: 'held locked' })
    const after = await rowsOf(sheet.object)
    expect(after.filter(row => row.t !== 'late')).toEqual(before)
    expect(after.filter(row => row.t === 'late')).toMatchObject([{ id: late.id, scope: organisation.surveyId, data: { reason: 'locked', body: { value: 'welding' } } }])
  })

  test('holds what the person may not write: another survey, the office\'s records', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    await phone.push([sheet])
    const stranger = new TestPhone(organisation, organisation.outsider)
    expect(answersOf(await stranger.push([
      stranger.set(sheet.object, 'task', 'sabotage'), stranger.newSheet(), stranger.step(sheet.object, 'hand-in', 0, false, 'x'),
      stranger.set(organisation.surveyId, 'title', 'Mine'),
      stranger.operation('obj.new', randomUUID(), { type: 'settings', parent: null, initial: {} }, { sheet: null }),
    ]))).toEqual({ 1: 'held no-access', 2: 'held no-access', 3: 'refused not-allowed', 4: expect.stringMatching(/^held (no-access|not-allowed)$/), 5: 'held not-allowed' })
    expect((await rowsOf(sheet.object)).filter(row => row.t === 'reg' || row.t === 'state')).toEqual([])
  })

  test('receives a sheet of a survey that nobody made, without making it', async () => {
    const phone = aPhone()
    const sheet = phone.operation('obj.new', randomUUID(), { type: 'sheet', parent: randomUUID(), initial: {} })
    expect(answersOf(await phone.push([sheet]))[1]).toMatch(/^held/)
    expect((await rowsOf(sheet.object)).filter(row => row.t === 'obj')).toEqual([])
  })
})

describe('what the server knows of a phone', () => {
  test('notes what it still owes and how far its clock is off', async () => {
    const phone = aPhone()
    await phone.push([phone.newSheet()], { pending: 38, oldest: '2026-03-03T07:00:00.000Z', now: new Date(Date.now() - 47 * 60_000).toISOString() })
    const [row] = await organisation.read(tx => tx.select().from(device).where(and(eq(device.organisation, organisation.id), eq(device.dev, phone.dev))))
    expect(row).toMatchObject({ pending: 37, oldestAt: '2026-03-03T07:00:00.000Z', maxN: 1, person: organisation.technician.id })
    expect(row!.clockOffsetMilliseconds! / 60_000).toBeCloseTo(47, 0)
  })

  test('says so when a number comes again with another operation, and keeps both', async () => {
    const phone = aPhone()
    const sheet = phone.newSheet()
    expect((await phone.push([sheet])).fork).toBe(false)
    const again = { ...phone.note(sheet.object, 'from a copy of the phone'), n: 1 }
    const answer = await phone.push([again])
    expect(answer).toMatchObject({ fork: true, res: [[1, 'ok', null]] })
    expect((await phone.push([again])).fork).toBe(false)
  })

  test('does not mix what two people send under one name', async () => {
    const mine = aPhone()
    await mine.push([mine.newSheet()])
    const theirs = new TestPhone(organisation, organisation.reviewer, mine.dev)
    const answer = await theirs.push([theirs.newSheet()])
    expect(answer).toMatchObject({ fork: false, res: [[1, 'ok', null]] })
    const devices = await organisation.read(tx => tx.select().from(device).where(eq(device.organisation, organisation.id)))
    expect(devices.filter(row => row.dev.startsWith(mine.dev)).map(row => row.person).sort()).toEqual([organisation.technician.id, organisation.reviewer.id].sort())
  })
})
