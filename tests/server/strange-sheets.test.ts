import { randomUUID } from 'node:crypto'
import { eq, sql } from 'drizzle-orm'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, inject, test, vi } from 'vitest'
import { sheetListQuerySchema } from '#shared/records/office-views'
import { SHEET_EVENTS, type SheetEventType } from '#shared/records/sheet-event'
import { openDatabase, type Database } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { applyOffice } from '#server/services/apply-office'
import { listSheets } from '#server/services/list-sheets'
import { openSheet } from '#server/services/open-sheet'
import { answersOf, aSmallOrganisation, TestPhone, type SmallOrganisation } from './support/small-organisation'

let database: Database
let organisation: SmallOrganisation

beforeAll(async () => {
  database = openDatabase(inject('databaseUrl'))
  organisation = await aSmallOrganisation(database, 'Strange')
})
afterAll(() => database.$client.end())

const list = () => organisation.read(tx => listSheets(tx, organisation.reviewer, sheetListQuerySchema.parse({ state: 'all' }), new Date()))

const instants = fc.constantFrom('0001-01-01T00:00:00Z', '1969-12-31T23:59:59.999Z', '2026-03-29T01:30:00Z', '2026-03-03T07:00:00.000Z', '2026-03-03T08:00:00.123456789Z', '9999-12-31T23:59:59.999Z')
const zones = fc.constantFrom('Europe/Dublin', 'UTC', 'Nowhere/Land', 'x', '+99:99', ' ', 'Europe/Dublin\u0000', '../../etc')
const pump = randomUUID()
const extremes = fc.constantFrom(0.000001, 1e-300, 1000, 2.03)
/** Data that the schemas take, at their edges. */
const data: Record<SheetEventType, fc.Arbitrary<Record<string, unknown>>> = {
  'flow-reading': fc.record({ when: fc.constantFrom('before', 'after'), pumpId: fc.constantFrom(pump, randomUUID()), calibratorId: fc.constant(null), samplerInLine: fc.constant(null), typed: fc.constantFrom('2,03', '1e-300'), unit: fc.constantFrom('L/min', 'mL/min'), litresPerMinute: extremes, temperatureCelsius: fc.constantFrom(-60, 80, null), stationPressureKilopascals: fc.constantFrom(20, 120, null) }),
  'timer': fc.record({ action: fc.constantFrom('start', 'pause', 'resume', 'stop'), pumpId: fc.constantFrom(pump, null, randomUUID()) }),
  'flow-check': fc.record({ pumpId: fc.constant(pump), by: fc.constantFrom('indicator', 'calibrator'), typed: fc.constant(''), unit: fc.constant('L/min'), litresPerMinute: fc.oneof(extremes, fc.constant(null)), pumpMinutes: fc.constantFrom(0, 100_000, null) }),
  'pump-fault': fc.record({ pumpId: fc.constant(pump), fault: fc.constantFrom('stopped', 'other') }),
  'pump-swap': fc.record({ fromPumpId: fc.constantFrom(pump, randomUUID()), pumpId: fc.constantFrom(pump, randomUUID()) }),
  'flow-reset': fc.record({ pumpId: fc.constant(pump), fromLitresPerMinute: fc.constant(null), toLitresPerMinute: extremes, typed: fc.constant('2'), unit: fc.constant('L/min') }),
  'activity': fc.record({ text: fc.constantFrom('', 'x'.repeat(10_000)), fromAt: instants, toAt: fc.oneof(instants, fc.constant(null)) }),
  'condition': fc.record({ temperatureCelsius: fc.constantFrom(-60, null), relativeHumidityPercent: fc.constantFrom(0, 100, null) }),
  'note': fc.record({ text: fc.constant('<img src=x onerror=alert(1)>') }),
  'finding-answer': fc.record({ code: fc.constant('flow-change'), subject: fc.constant('__proto__'), reason: fc.constant('x') }),
  'signature': fc.record({ name: fc.constant('') }),
  'clock-jump': fc.record({ wallMilliseconds: fc.constantFrom(-1e15, 1e15), monotonicMilliseconds: fc.constantFrom(0, 1e15) }),
}

describe('sheets with strange but possible content', () => {
  test('can all be listed and opened; none of them hides the others', async () => {
    const phone = new TestPhone(organisation, organisation.technician)
    const plain = phone.newSheet({ number: 'PLAIN' })
    await phone.push([plain])
    const types = Object.keys(SHEET_EVENTS) as SheetEventType[]
    const event = fc.constantFrom(...types).chain(type => fc.record({ type: fc.constant(type), data: data[type], at: instants, zone: zones }))
    const applied = new Set<string>()
    await fc.assert(fc.asyncProperty(fc.array(event, { minLength: 1, maxLength: 14 }), instants, fc.constantFrom('pumped', 'diffusive', 'none'), async (events, shiftStartsAt, air) => {
      const sheet = phone.newSheet({ air, pumpId: pump, shiftStartsAt, shiftEndsAt: '2026-03-03T07:00:00Z', uptakeMillilitresPerMinute: air === 'diffusive' ? 1e-300 : null, plannedFlowLitresPerMinute: 1e-300 })
      const operations = events.map(({ type, data, at, zone }) => phone.operation('ev.add', sheet.object, { type, data, corrects: null, reason: null }, { at, enteredAt: at, zone }))
      const answer = answersOf(await phone.push([sheet, ...operations, phone.step(sheet.object, 'hand-in', 0, true), phone.step(sheet.object, 'hand-in', 0, false, 'strange')]))
      events.forEach(({ type }, index) => {
        if (answer[operations[index]!.n] === 'ok') applied.add(type)
      })
      expect(Object.values(answer).filter(text => text === 'held error')).toEqual([])
      expect((await organisation.read(tx => openSheet(tx, organisation.reviewer, sheet.object))).rows.length).toBeGreaterThan(events.length)
      const { sheets, counts } = await list()
      expect(counts.all).toBe(phone.sheets)
      expect(sheets.length).toBe(Math.min(50, phone.sheets))
    }), { numRuns: 40 })
    expect([...applied].sort()).toEqual([...types].sort())
  })

  test('one that cannot be assessed is listed to be looked at, and hides nobody', async () => {
    const own = await aSmallOrganisation(database, 'Fault')
    const phone = new TestPhone(own, own.technician)
    const [sound, broken] = [phone.newSheet({ number: 'SOUND' }), phone.newSheet({ number: 'BROKEN' })]
    const jump = phone.operation('ev.add', broken.object, { type: 'clock-jump', data: { wallMilliseconds: 0, monotonicMilliseconds: 0 }, corrects: null, reason: null })
    await phone.push([sound, broken, jump])
    // What no schema lets in: a fault of a later version.
    await own.run(tx => tx.update(rowState).set({ data: sql`jsonb_set(jsonb_set(${rowState.data}, '{data,wallMilliseconds}', '1e308'), '{data,monotonicMilliseconds}', '-1e308')` }).where(eq(rowState.id, jump.id)))
    const quiet = vi.spyOn(console, 'error').mockImplementation(() => {})
    const answer = await own.read(tx => listSheets(tx, own.reviewer, sheetListQuerySchema.parse({ state: 'all', sort: 'number' }), new Date()))
    expect(quiet).toHaveBeenCalledWith(expect.stringContaining(broken.object))
    quiet.mockRestore()
    expect(answer.sheets.map(({ number, stopCount }) => [number, stopCount])).toEqual([['BROKEN', 1], ['SOUND', 0]])
  })

  test('a survey whose zone nobody knows is listed with its sheets', async () => {
    const surveyId = randomUUID()
    await organisation.run(tx => applyOffice(tx, organisation.reviewer, [
      { kind: 'obj.new', object: surveyId, sheet: null, body: { type: 'survey', parent: null, initial: { title: 'Lost', siteId: randomUUID(), startsOn: '2026-03-02', endsOn: '2026-03-06', zone: 'Nowhere/Land' } } },
    ], new Date()))
    const writer = new TestPhone(organisation, organisation.reviewer)
    const sheet = writer.operation('obj.new', randomUUID(), { type: 'sheet', parent: surveyId, initial: { number: 'LOST-1' } })
    const timer = (action: string, at: string) => writer.operation('ev.add', sheet.object, { type: 'timer', data: { action, pumpId: pump }, corrects: null, reason: null }, { at, zone: 'Nowhere/Land' })
    await writer.push([sheet, timer('start', '2026-03-03T07:00:00Z'), timer('stop', '2026-03-03T09:00:00Z')])
    const answer = await organisation.read(tx => listSheets(tx, organisation.reviewer, sheetListQuerySchema.parse({ state: 'all', survey: surveyId }), new Date()))
    expect(answer.sheets.map(summary => summary.number)).toEqual(['LOST-1'])
  })
})
