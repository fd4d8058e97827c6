import { afterEach, describe, expect, it } from 'vitest'
import { assessSheet } from '#shared/assessment/assess-sheet'
import type { SheetDocument } from '#shared/records/sheet-bundle'
import { commit, InvalidChange } from '~/local/commit'
import { saveDraft } from '~/local/drafts'
import { createSheetActions, fieldDraftKey, type ShownSheet } from '~/local/sheet-actions'
import { createSheetsReader } from '~/local/sheets'
import { startSheet } from '~/local/start-sheet'
import { syncRound } from '~/local/sync-round'
import { createViewReader } from '~/local/view'
import { aContext, aPhone, CALIBRATOR, forget, PUMP, setTask, SURVEY, TestServer, type TestPhone } from './phone'

const OTHER_PUMP = '00000000-0000-4000-8000-0000000000ee'
const opened: TestPhone[] = []
afterEach(async () => { await forget(...opened.splice(0)) })

/** A sheet on a phone, with a screen that is read again when the test says so: between, it shows what it showed before. */
async function aSheetOnScreen(initial: Parameters<typeof startSheet>[2] = {}, plannedMinutes: number | null = null) {
  const one = aPhone()
  opened.push(one)
  const sheetId = await startSheet(one.store, SURVEY, { number: 'A-1', pumpId: PUMP, calibratorId: CALIBRATOR, ...initial })
  const reader = createViewReader(one.store)
  const readSheets = createSheetsReader()
  let shown: ShownSheet | null = null
  async function look(id = sheetId): Promise<SheetDocument> {
    const view = await reader.read()
    const sheets = readSheets(view)
    const bundle = sheets.bundle(id)!
    if (id === sheetId) {
      const refusedSteps = view.refusals.filter(item => item.sheet === id && item.outcome === 'refused').map(item => item.id)
      shown = { bundle, assessment: assessSheet(bundle, new Date(one.clock.milliseconds).toISOString()), plannedMinutes, refusedSteps }
    }
    return bundle.document
  }
  await look()
  const actions = createSheetActions(() => one.store, () => sheetId, () => shown)
  const flow = (when: 'before' | 'after', litresPerMinute: number, pumpId = PUMP) => actions.addFlowReading({
    when, typed: String(litresPerMinute).replace('.', ','), unit: 'L/min', litresPerMinute, samplerInLine: 'Cassette', pumpId, calibratorId: CALIBRATOR,
  })
  const pass = (minutes: number) => { one.clock.milliseconds += minutes * 60_000 }
  return { one, sheetId, actions, look, flow, pass, assessment: () => shown!.assessment! }
}

describe('fields of a sheet', () => {
  it('[MERGE4] two changes of one\'s own in a row are no conflict, also before the screen has caught up', async () => {
    const { one, sheetId, actions, look } = await aSheetOnScreen()
    await Promise.all([actions.setField('task', 'sanding'), actions.setField('task', 'sanding doors'), actions.setField('task', 'sanding frames')])
    const document = await look()
    expect(document.sheet.task).toBe('sanding frames')
    expect(document.conflicts).toEqual([])
    await actions.setField('task', 'grinding')
    expect((await look()).conflicts).toEqual([])
    const server = new TestServer(() => one.person.id)
    await syncRound(aContext(one, server))
    expect((await one.store.db.acked.toArray()).map(entry => entry.outcome)).not.toContain('conflict')
    expect((await look()).sheet.task).toBe('grinding')
    expect(sheetId).toBe(document.id)
  })

  it('[MERGE4] a change that does not know of another phone\'s keeps both values, and choosing one closes it', async () => {
    const { one, sheetId, actions, look } = await aSheetOnScreen()
    await actions.setField('task', 'sanding')
    const server = new TestServer(() => one.person.id)
    await syncRound(aContext(one, server))
    await look()
    const two = aPhone(one.person)
    // The same person's second phone has a database of its own only in another browser; here its operation goes to the server directly.
    const base = (await look()).origins.task!.opId
    const other = { ...(await commit(one.store, [setTask(sheetId, 'welding', base)]))[0]!, id: two.store.surroundings.newId() }
    await one.store.db.outbox.clear()
    one.clock.milliseconds += 1000
    await actions.setField('task', 'grinding')
    await server.push({ v: 1, dev: 'd_other', phone: 'p_other', label: '', epoch: null, sv: 1, pending: 1, oldest: null, blobs: 0, cursor: 0, now: other.at, ops: [other] })
    await syncRound(aContext(one, server))
    const document = await look()
    expect(document.conflicts).toMatchObject([{ field: 'task', isOpen: true }])
    expect(document.conflicts[0]!.values.map(value => value.value).sort()).toEqual(['grinding', 'welding'])
    await actions.chooseValue('task', 'welding')
    expect((await look()).conflicts).toMatchObject([{ field: 'task', isOpen: false }])
    await syncRound(aContext(one, server))
    expect((await look()).sheet.task).toBe('welding')
  })

  it('writes nothing when the value is what stands there already', async () => {
    const { one, actions } = await aSheetOnScreen()
    await actions.setField('number', 'A-1')
    expect(await one.store.db.outbox.count()).toBe(1)
  })

  it('takes the typed text of the field away with the change', async () => {
    const { one, sheetId, actions } = await aSheetOnScreen()
    await saveDraft(one.store, fieldDraftKey(sheetId, 'task'), 'sanding')
    await actions.setField('task', 'sanding')
    expect(await one.store.db.drafts.count()).toBe(0)
  })

  it('goes on with the right base after a value that was refused', async () => {
    const { actions, look } = await aSheetOnScreen()
    await actions.setField('task', 'sanding')
    await expect(actions.setField('plannedFlowLitresPerMinute', -1)).rejects.toBeInstanceOf(InvalidChange)
    await actions.setField('plannedFlowLitresPerMinute', 2)
    expect((await look()).sheet.plannedFlowLitresPerMinute).toBe(2)
    expect((await look()).conflicts).toEqual([])
  })
})

describe('events of a sheet', () => {
  it('[OP4] an event\'s id is its operation\'s id', async () => {
    const { one, actions, look } = await aSheetOnScreen()
    const id = await actions.addNote('Dusty today', { role: 'worker', id: null, name: null })
    expect((await look()).events.map(event => event.id)).toEqual([id])
    expect((await one.store.db.outbox.where('id').equals(id).first())!.op.by).toEqual({ role: 'worker', id: null, name: null })
  })

  it('[TIMER2] a correction takes the first back and names it, in one commit; both stay', async () => {
    const { one, actions, look, flow } = await aSheetOnScreen()
    const first = await flow('before', 20.3)
    await look()
    const second = await actions.correct(first, { data: { typed: '2,03', litresPerMinute: 2.03 } }, 'Comma forgotten')
    const [wrong, right] = [(await look()).events.find(event => event.id === first)!, (await look()).events.find(event => event.id === second)!]
    expect(wrong.void).toMatchObject({ reason: 'Comma forgotten' })
    expect(wrong.data).toMatchObject({ typed: '20,3', litresPerMinute: 20.3 })
    expect(right).toMatchObject({ corrects: first, reason: 'Comma forgotten', void: null, data: { typed: '2,03', litresPerMinute: 2.03, pumpId: PUMP }, at: wrong.at })
    const entries = await one.store.db.outbox.orderBy('n').toArray()
    expect(entries.at(-1)!.op.enteredAt).toBe(entries.at(-2)!.op.enteredAt)
    await expect(actions.correct(first, { at: '2026-03-03T06:00:00.000Z' }, 'Again')).rejects.toThrow('taken back already')
    await expect(actions.correct(second, {}, ' ')).rejects.toBeInstanceOf(InvalidChange)
  })

  it('a start counts the planned end from the plan\'s minutes, once', async () => {
    const { actions, look } = await aSheetOnScreen({}, 240)
    await actions.timer('start', { at: '2026-03-03T06:30:00.000Z' })
    expect((await look()).sheet.plannedEndAt).toBe('2026-03-03T10:30:00.000Z')
    await actions.timer('stop')
    await look()
    await actions.timer('start')
    expect((await look()).sheet.plannedEndAt).toBe('2026-03-03T10:30:00.000Z')
  })

  it('every event after a swap names the pump that draws now', async () => {
    const { actions, look, pass } = await aSheetOnScreen()
    await actions.timer('start')
    pass(30)
    await look()
    await actions.swapPump({ pumpId: OTHER_PUMP, reason: 'Battery' })
    pass(30)
    await look()
    await actions.addFlowCheck({ by: 'indicator', calibratorId: null, typed: '2', unit: 'L/min', litresPerMinute: 2, pumpMinutes: 30, note: null })
    await actions.reportFault({ fault: 'battery', note: null })
    await actions.timer('stop')
    const events = (await look()).events
    expect(events.map(event => [event.type, (event.data as { pumpId?: string }).pumpId])).toEqual([
      ['timer', PUMP], ['pump-swap', OTHER_PUMP], ['flow-check', OTHER_PUMP], ['pump-fault', OTHER_PUMP], ['timer', OTHER_PUMP],
    ])
    await expect(actions.swapPump({ pumpId: OTHER_PUMP, reason: null })).rejects.toBeInstanceOf(InvalidChange)
  })

  it('a sampler without a pump starts without one', async () => {
    const { actions, look } = await aSheetOnScreen({ air: 'diffusive' })
    await actions.timer('start')
    expect((await look()).events[0]!.data).toMatchObject({ action: 'start', pumpId: null })
  })
})

describe('changing the medium in mid-run', () => {
  it('stops this sheet and starts the next at one instant, with the pump\'s setting carried over in sight', async () => {
    const { one, actions, look, flow, pass, sheetId } = await aSheetOnScreen({
      task: 'sanding', protection: 'FFP3 as seen', shiftEndsAt: '2026-03-03T15:00:00.000Z', medium: 'Filter', mediumLot: 'L-1', mediumExpiresOn: '2027-01-01', seal: 'S-1', checkLeak: 'done',
    })
    await flow('before', 2)
    await flow('before', 2.02)
    await flow('after', 1.9)
    pass(5)
    await look()
    await actions.timer('start')
    pass(60)
    await look()
    const before = await one.store.db.outbox.count()
    const nextId = await actions.changeMedium({ number: 'A-2', medium: 'Filter', mediumLot: 'L-2' })
    expect(await one.store.db.outbox.count()).toBe(before + 5)

    const old = await look()
    const next = await look(nextId)
    const at = new Date(one.clock.milliseconds).toISOString()
    expect(old.events.at(-1)).toMatchObject({ type: 'timer', at, data: { action: 'stop', pumpId: PUMP } })
    expect(next.events.filter(event => event.type === 'timer')).toMatchObject([{ at, data: { action: 'start', pumpId: PUMP } }])
    expect(next.sheet).toMatchObject({
      number: 'A-2', continuesId: sheetId, task: 'sanding', protection: 'FFP3 as seen', shiftEndsAt: '2026-03-03T15:00:00.000Z', pumpId: PUMP,
      mediumLot: 'L-2', mediumExpiresOn: null, seal: null, checkLeak: null, technicianId: one.person.id,
    })
    const carried = next.events.filter(event => event.type === 'flow-reading')
    expect(carried).toMatchObject([
      { reason: 'carried over from A-1', corrects: null, at: '2026-03-03T07:00:00.000Z', data: { when: 'before', litresPerMinute: 2 } },
      { reason: 'carried over from A-1', corrects: null, data: { when: 'before', litresPerMinute: 2.02 } },
    ])
    pass(60)
    const bundle = createSheetsReader()(await createViewReader(one.store).read()).bundle(nextId)!
    const assessment = assessSheet(bundle, new Date(one.clock.milliseconds).toISOString())
    expect(assessment.progress).toBe('running')
    expect(assessment.sampledMinutes).toBeCloseTo(60, 6)
    expect(assessment.flowUsed?.litresPerMinute).toBeCloseTo(2.01, 6)
  })

  it('starts nothing when this sheet did not run', async () => {
    const { actions, look } = await aSheetOnScreen()
    const nextId = await actions.changeMedium({ number: null, medium: null, mediumLot: null })
    expect((await look()).events).toEqual([])
    expect((await look(nextId)).events).toEqual([])
  })
})

describe('handing in', () => {
  it('writes the signature and the step in one commit, and shows it as waiting', async () => {
    const { one, actions, look } = await aSheetOnScreen()
    await actions.handIn({ fit: false, reason: 'Pump fell into the pit', name: ' Ada Field ' })
    const document = await look()
    expect(document.standing).toMatchObject({ state: 'handed-in', revision: 1, isFit: false, isWaiting: true })
    expect(document.events).toMatchObject([{ type: 'signature', data: { name: 'Ada Field' } }])
    await syncRound(aContext(one, new TestServer(() => one.person.id)))
    expect((await look()).standing).toMatchObject({ state: 'handed-in', isWaiting: false })
  })

  it('asks for a reason and a name, and does not call a sheet with gaps fit', async () => {
    const { one, actions } = await aSheetOnScreen()
    await expect(actions.handIn({ fit: false, reason: ' ', name: 'Ada' })).rejects.toBeInstanceOf(InvalidChange)
    await expect(actions.handIn({ fit: false, reason: 'Lost', name: ' ' })).rejects.toBeInstanceOf(InvalidChange)
    await expect(actions.handIn({ fit: true, reason: null, name: 'Ada' })).rejects.toThrow('cannot be handed in as fit')
    expect(await one.store.db.outbox.count()).toBe(1)
  })

  it('[MERGE8] is refused when another phone handed in first: shown, kept, and answered by handing in anew', async () => {
    const { one, sheetId, actions, look } = await aSheetOnScreen()
    const server = new TestServer(() => one.person.id)
    await syncRound(aContext(one, server))
    await look()
    const step = (transition: 'hand-in' | 'return', expect: number, n: number) => ({
      id: one.store.surroundings.newId(), n, hlc: '0190000000000000', sv: 1, kind: 'st.req', object: sheetId, sheet: sheetId, at: '2026-03-03T07:00:00.000Z',
      enteredAt: '2026-03-03T07:00:00.000Z', zone: 'UTC', mono: null, offset: null, by: null, personal: null,
      body: { transition, expect, fit: transition === 'hand-in' ? false : null, reason: 'Seen' },
    })
    const push = (...ops: ReturnType<typeof step>[]) => server.push({ v: 1, dev: 'd_other', phone: 'p', label: '', epoch: null, sv: 1, pending: 1, oldest: null, blobs: 0, cursor: 0, now: '2026-03-03T07:00:00.000Z', ops })
    await push(step('hand-in', 0, 1))
    await actions.handIn({ fit: false, reason: 'Pump stopped', name: 'Ada' })
    await syncRound(aContext(one, server))
    await look()
    const view = () => createViewReader(one.store).read()
    expect((await view()).refusals).toMatchObject([{ outcome: 'refused', reason: 'stale-state', sheet: sheetId }])
    await push(step('return', 1, 2))
    await syncRound(aContext(one, server))
    await look()
    await actions.handIn({ fit: false, reason: 'Pump stopped', name: 'Ada' })
    expect((await view()).refusals).toEqual([])
    await syncRound(aContext(one, server))
    expect((await look()).standing).toMatchObject({ state: 'handed-in', revision: 3 })
    expect((await one.store.db.acked.toArray()).filter(entry => entry.outcome === 'refused')).toHaveLength(1)
  })
})
