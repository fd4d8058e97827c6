import { afterEach, describe, expect, it, vi } from 'vitest'
import { assessSheet } from '#shared/assessment/assess-sheet'
import { HELD_REASONS, REFUSED_REASONS } from '#shared/sync/outcomes'
import { requestCode, useErrorText } from '~/composables/useErrorText'
import { clockJump, watchClock } from '~/local/clock-watch'
import { commit, InvalidChange, NotSaved } from '~/local/commit'
import { clockOffset } from '~/local/contact'
import { dueOf } from '~/local/due'
import { createSheetsReader } from '~/local/sheets'
import { createViewReader } from '~/local/view'
import { aPhone, forget, PUMP, reading, startedSheet, type TestPhone } from './phone'

const opened: TestPhone[] = []
afterEach(async () => {
  vi.useRealTimers()
  await forget(...opened.splice(0))
})
function phone() {
  const made = aPhone()
  opened.push(made)
  return made
}

describe('the words for what went wrong', () => {
  const { refusal, notSaved, request } = useErrorText()

  it('has a sentence of its own for every reason that is known, each saying that the change is kept', () => {
    const known = [...HELD_REASONS.filter(reason => reason !== 'error' && reason !== 'malformed').map(reason => refusal('held', reason)), ...REFUSED_REASONS.map(reason => refusal('refused', reason))]
    expect(new Set(known).size).toBe(known.length)
    for (const sentence of [...known, refusal('kept', 'weighed'), refusal('held', 'error'), refusal('parked', 'newer-schema')]) expect(sentence).toMatch(/kept|safe/)
  })

  it('reads the reason also where a detail stands behind it', () => {
    expect(refusal('held', 'invalid: flow: too small')).toBe(refusal('held', 'invalid'))
  })

  it('says what was wrong with an impossible value, and never blames the phone for it', () => {
    expect(notSaved(new InvalidChange('Choose the pump first.')).message).toContain('Choose the pump first.')
    expect(notSaved(new NotSaved('x')).message).toContain('What you typed is still here')
  })

  it('tells a wrong password from a server that fails and from no answer at all', () => {
    expect(requestCode({ status: 401, data: { data: { code: 'wrong-sign-in' } } })).toBe('wrong-sign-in')
    expect(requestCode({ status: 502, data: '<html>' })).toBe('server-error')
    expect(requestCode(new TypeError('fetch failed'))).toBe('no-answer')
    expect(new Set([request({ status: 401 }).title, request({ status: 500 }).title, request(new TypeError()).title, request({ status: 429 }).title]).size).toBe(4)
  })
})

describe('the watch over the clock', () => {
  it.each([
    ['one hour forward', 3_601_000, 1000, true], ['one hour back', -3_599_000, 1000, true], ['just over two seconds', 3001, 1000, true],
    ['two seconds', 3000, 1000, false], ['a slow tick', 60_000, 60_000, false],
  ])('%s: %i ms on the wall while %i ms went by', (_name, wall, monotonic, isJump) => {
    const jump = clockJump({ wallMilliseconds: 1_000_000_000, monotonicMilliseconds: 500 }, { wallMilliseconds: 1_000_000_000 + wall, monotonicMilliseconds: 500 + monotonic })
    expect(jump).toEqual(isJump ? { wallMilliseconds: wall, monotonicMilliseconds: monotonic } : null)
  })

  it('writes a jump down on the running sheets while the page is in sight', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    const end = watchClock(one.store, () => [sheet])
    one.clock.milliseconds += 3_600_000
    one.clock.monotonic += 1000
    await expect.poll(async () => (await one.store.db.outbox.toArray()).map(entry => entry.op.kind === 'ev.add' ? entry.op.body : null), { timeout: 5000 })
      .toEqual([null, { type: 'clock-jump', data: { wallMilliseconds: 3_600_000, monotonicMilliseconds: 1000 }, corrects: null, reason: null }])
    end()
  })

  it('takes the server\'s time for that of the middle of the round trip', () => {
    expect(clockOffset({ serverTime: '2026-03-03T07:00:10.000Z', sentAt: Date.parse('2026-03-03T07:00:00.000Z'), roundTripMilliseconds: 4000 })).toBe(8000)
  })
})

describe('the board', () => {
  it('says what falls due on a sheet that runs, and nothing of one that is ready', async () => {
    const one = phone()
    const sheet = await startedSheet(one, { number: 'A-1', pumpId: PUMP, plannedEndAt: '2026-03-03T09:00:00.000Z' })
    await commit(one.store, [reading(sheet, 2)])
    const read = async (nowAt: string) => {
      const bundle = createSheetsReader()(await createViewReader(one.store).read()).bundle(sheet)!
      return dueOf(bundle, assessSheet(bundle, nowAt), nowAt)
    }
    expect(await read('2026-03-03T07:00:00.000Z')).toEqual([])
    await commit(one.store, [{ kind: 'ev.add', object: sheet, sheet, body: { type: 'timer', data: { action: 'start', pumpId: PUMP, reason: null }, corrects: null, reason: null } }])
    const due = await read('2026-03-03T09:05:00.000Z')
    expect(due.find(item => item.what === 'planned-end')).toMatchObject({ at: '2026-03-03T09:00:00.000Z', isOverdue: true, words: 'Planned end' })
    // Common practice: the first flow check is due 15 minutes after the start.
    expect(due.find(item => item.what === 'flow-check')).toMatchObject({ at: '2026-03-03T07:15:00.000Z', isOverdue: true })
  })

  it('reads and assesses anew only the sheet that was written on', async () => {
    const one = phone()
    const sheets = [await startedSheet(one, { number: 'A-1', pumpId: PUMP }), await startedSheet(one, { number: 'A-2' })]
    const view = createViewReader(one.store)
    const reader = createSheetsReader()
    const at = '2026-03-03T07:00:00.000Z'
    const before = reader(await view.read())
    const first = sheets.map(id => before.assess(id, at))
    const bundles = sheets.map(id => before.bundle(id))
    await commit(one.store, [reading(sheets[0]!, 2)])
    const after = reader(await view.read())
    expect(after.bundle(sheets[1]!)).toBe(bundles[1])
    expect(after.assess(sheets[1]!, at)).toBe(first[1])
    expect(after.bundle(sheets[0]!)).not.toBe(bundles[0])
    expect(after.assess(sheets[0]!, at)!.flowBefore?.readings).toHaveLength(1)
  })
})
