import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { assessSheet } from '#shared/assessment/assess-sheet'
import { siblingsOf } from '#shared/assessment/siblings'
import { sheetListQuerySchema, type SheetListQuery, type SheetSummary } from '#shared/records/office-views'
import { createBundleSource } from '#shared/sync/bundle'
import { groupRows } from '#shared/sync/read-rows'
import type { Row } from '#shared/sync/rows'
import type { Database } from '#server/database/client'
import { listPhones } from '#server/services/list-phones'
import { listSheets, PAGE_SIZE } from '#server/services/list-sheets'
import { listSurveys, openSurvey } from '#server/services/list-surveys'
import { openSheet } from '#server/services/open-sheet'
import { aSeededOrganisation, openTestDatabase, type SeededOrganisation } from './support/office'

const NOW = new Date('2026-05-12T13:00:00.000Z')
let database: Database
let own: SeededOrganisation
let other: SeededOrganisation

beforeAll(async () => {
  database = openTestDatabase()
  own = await aSeededOrganisation(database, 'Reads', 'reads.example', NOW)
  other = await aSeededOrganisation(database, 'Reads of others', 'reads-others.example', NOW)
})
afterAll(() => database.$client.end())

const list = (query: Partial<Record<keyof SheetListQuery, string>> = {}, organisation = own, now = NOW) => (
  organisation.read(tx => listSheets(tx, organisation.people.maren!, sheetListQuerySchema.parse(query), now))
)
const assessedFrom = (sheetId: string, rows: unknown[]) => assessSheet(createBundleSource(groupRows(rows as Row[]), siblingsOf).bundle(sheetId)!, NOW.toISOString())

describe('the list of sheets', () => {
  test('shows the sheets that were handed in, worst first, unless asked otherwise', async () => {
    const answer = await list()
    expect(answer.sheets.length).toBeGreaterThan(2)
    expect(answer.sheets.every(sheet => sheet.state === 'handed-in')).toBe(true)
    expect(answer).toMatchObject({ total: answer.sheets.length, page: 1, pageSize: PAGE_SIZE })
    const stops = answer.sheets.map(sheet => sheet.stopCount)
    expect(stops).toEqual([...stops].sort((a, b) => b - a))
  })

  test('counts every state under the same filters, whatever state is shown', async () => {
    const all = await list({ state: 'all' })
    const inReview = await list()
    expect(inReview.counts).toEqual(all.counts)
    expect(all.counts.all).toBe(all.total)
    expect(all.counts['to-review']).toBe(inReview.total)
    const states = new Set(all.sheets.map(sheet => sheet.state))
    expect(states.size).toBeGreaterThan(2)
    for (const state of states) expect((await list({ state })).total).toBe(all.counts[state])
  })

  test('narrows by survey, technician, severity and words, each alone and together', async () => {
    const all = await list({ state: 'all' })
    const survey = all.sheets[0]!.surveyId
    expect((await list({ state: 'all', survey })).sheets.every(sheet => sheet.surveyId === survey)).toBe(true)

    const technician = own.people.orla!
    const byTechnician = await list({ state: 'all', technician: technician.id })
    expect(byTechnician.total).toBeGreaterThan(0)
    expect(byTechnician.sheets.every(sheet => sheet.technicianName === technician.name)).toBe(true)
    expect(byTechnician.total).toBe(all.sheets.filter(sheet => sheet.technicianName === technician.name).length)

    const has: Record<string, (sheet: SheetSummary) => boolean> = {
      stop: sheet => sheet.stopCount > 0,
      attention: sheet => sheet.attentionCount > 0,
      any: sheet => sheet.stopCount + sheet.attentionCount > 0,
      none: sheet => sheet.stopCount + sheet.attentionCount === 0,
    }
    for (const [severity, is] of Object.entries(has)) {
      const found = await list({ state: 'all', severity })
      expect(found.sheets.map(sheet => sheet.id).sort()).toEqual(all.sheets.filter(is).map(sheet => sheet.id).sort())
      expect(found.counts.all).toBe(found.total)
    }

    const worker = all.sheets.find(sheet => sheet.workerCode !== null)!.workerCode!
    const byWorker = await list({ state: 'all', q: worker.toUpperCase() })
    expect(byWorker.sheets.some(sheet => sheet.workerCode === worker)).toBe(true)
    const number = all.sheets.find(sheet => sheet.number !== null)!.number!
    expect((await list({ state: 'all', q: number.toLowerCase() })).sheets.some(sheet => sheet.number === number)).toBe(true)
    expect(await list({ state: 'all', q: 'no such words' })).toMatchObject({ sheets: [], total: 0, counts: { all: 0 } })
    expect(await list({ state: 'all', q: '%' })).toMatchObject({ total: 0 })
    expect((await list({ state: 'all', technician: technician.id, severity: 'stop' })).total).toBe(byTechnician.sheets.filter(has.stop!).length)
  })

  test('sorts by each column both ways, with what is missing at the end', async () => {
    for (const sort of ['number', 'worker', 'handed-in', 'state', 'findings']) {
      const up = await list({ state: 'all', sort, direction: 'asc' })
      const down = await list({ state: 'all', sort, direction: 'desc' })
      expect(up.sheets.map(sheet => sheet.id).sort()).toEqual(down.sheets.map(sheet => sheet.id).sort())
      if (sort === 'findings' || sort === 'state') continue
      for (const { sheets } of [up, down]) {
        const values = sheets.map(sheet => sheet[({ 'number': 'number', 'worker': 'workerCode', 'handed-in': 'handedInAt' } as const)[sort]!])
        expect(values.findIndex(value => value === null)).toBe(values.includes(null) ? values.filter(value => value !== null).length : -1)
      }
    }
    const byNumber = (await list({ state: 'all', sort: 'number' })).sheets.flatMap(sheet => sheet.number ?? [])
    expect(byNumber).toEqual([...byNumber].sort(new Intl.Collator('en', { numeric: true }).compare))
  })

  test('gives an empty page beyond the end, and still the total', async () => {
    const answer = await list({ state: 'all', page: '99' })
    expect(answer.sheets).toEqual([])
    expect(answer.total).toBeGreaterThan(0)
  })

  test('shows nothing of another organisation', async () => {
    const mine = new Set((await list({ state: 'all' })).sheets.map(sheet => sheet.id))
    expect((await list({ state: 'all' }, other)).sheets.filter(sheet => mine.has(sheet.id))).toEqual([])
    // Asked with the other's ids in the filters.
    expect(await list({ state: 'all', technician: other.people.orla!.id })).toMatchObject({ total: 0 })
    const [foreignSurvey] = await other.read(tx => listSurveys(tx, other.people.maren!))
    expect(await list({ state: 'all', survey: foreignSurvey!.id })).toMatchObject({ total: 0, counts: { all: 0 } })
    // Even one organisation's reader inside the other's transaction sees nothing: row-level security stands behind the queries.
    await expect(other.read(tx => listSheets(tx, own.people.maren!, sheetListQuerySchema.parse({ state: 'all' }), NOW))).rejects.toThrow('no counter')
  })

  test('says of a sheet what its own page says of it', async () => {
    for (const summary of (await list({ state: 'all' })).sheets) {
      const answer = await own.read(tx => openSheet(tx, own.people.maren!, summary.id))
      const assessment = assessedFrom(summary.id, answer.rows)
      expect({ number: summary.number, stop: summary.stopCount, attention: summary.attentionCount, litres: summary.volumeLitres, minutes: summary.sampledMinutes, change: summary.changePercent }).toEqual({
        number: summary.number,
        stop: assessment.findings.filter(finding => finding.severity === 'stop').length,
        attention: assessment.findings.filter(finding => finding.severity === 'attention').length,
        litres: assessment.volumeLitres, minutes: assessment.sampledMinutes, change: assessment.change?.percent ?? null,
      })
    }
  })
})

describe('one sheet', () => {
  test('comes with its whole history, oldest first, and a name for everybody in it', async () => {
    const [sheet] = (await list()).sheets
    const answer = await own.read(tx => openSheet(tx, own.people.maren!, sheet!.id))
    expect(answer.history[0]).toMatchObject({ kind: 'obj.new', what: 'sheet', outcome: 'ok' })
    expect(answer.history.some(entry => entry.kind === 'st.req' && entry.what === 'hand-in')).toBe(true)
    expect(answer.history.map(entry => entry.opId)).toEqual([...new Set(answer.history.map(entry => entry.opId))])
    for (const entry of answer.history) {
      expect(answer.people[entry.author]).toBeTruthy()
      expect(answer.phones[entry.dev]).toBeTruthy()
    }
    expect(JSON.stringify(answer).includes('"personal":')).toBe(false)
  })

  test('tells every ledger entry of the sheet exactly once', async () => {
    const [sheet] = (await list()).sheets
    const answer = await own.read(tx => openSheet(tx, own.people.maren!, sheet!.id))
    const stored = await own.read(async tx => (await tx.query.op.findMany({ where: (op, { eq }) => eq(op.sheet, sheet!.id), columns: { id: true } })))
    expect(answer.history.map(entry => entry.opId).sort()).toEqual(stored.map(entry => entry.id).sort())
  })

  test('is not there for another organisation, as little as one that never was', async () => {
    const [sheet] = (await list()).sheets
    const maren = other.people.maren!
    await expect(other.read(tx => openSheet(tx, maren, sheet!.id))).rejects.toMatchObject({ code: 'not-found', status: 404 })
    await expect(other.read(tx => openSheet(tx, maren, '00000000-0000-7000-8000-000000000000'))).rejects.toMatchObject({ code: 'not-found', status: 404 })
  })
})

describe('surveys and phones', () => {
  test('a survey counts its sheets by state, its plan and its crew', async () => {
    const surveys = await own.read(tx => listSurveys(tx, own.people.piet!))
    const all = await list({ state: 'all' })
    expect(surveys.length).toBeGreaterThan(0)
    for (const survey of surveys) {
      expect(survey.title).not.toBe('')
      expect(survey.siteName).not.toBe('')
      expect(survey.crew.every(person => person.name !== '')).toBe(true)
      const sheets = all.sheets.filter(sheet => sheet.surveyId === survey.id)
      expect(Object.values(survey.sheetCounts).reduce((sum, count) => sum + count, 0)).toBe(sheets.length)
      const detail = await own.read(tx => openSurvey(tx, own.people.piet!, survey.id))
      expect(detail.planLines).toHaveLength(survey.planLineCount)
      expect(detail).toMatchObject(survey)
    }
    await expect(other.read(tx => openSurvey(tx, other.people.piet!, surveys[0]!.id))).rejects.toMatchObject({ code: 'not-found' })
  })

  test('a phone says whose it is and what it still owes', async () => {
    const phones = await own.read(tx => listPhones(tx, own.people.maren!))
    expect(phones.length).toBeGreaterThan(0)
    expect(phones.every(phone => phone.personName !== '' && phone.lastNumber > 0 && phone.missingNumbers === 0)).toBe(true)
  })
})
