import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { merge } from '#shared/sync/merge'
import type { StampedOperation } from '#shared/sync/operations'
import { overlay } from '#shared/sync/overlay'
import { groupRows, sheetDocumentOf } from '#shared/sync/read-rows'
import type { ConflictData, RegisterData, Row, RowChange } from '#shared/sync/rows'
import { canonicalJson } from '#shared/sync/same-value'
import { anOperation, aSheetCreation, idNumber, ORGANISATION, PUMP, SHEET, SURVEY } from '../../../fixtures/operations'

function apply(operations: readonly StampedOperation[]) {
  const rows = new Map<string, RowChange>()
  const outcomes = operations.map((operation) => {
    const result = merge(operation, (t, id) => rows.get(`${t} ${id}`) as Row | undefined, ORGANISATION)
    for (const row of result.rows) rows.set(`${row.t} ${row.id}`, row)
    return result.outcome === 'held' || result.outcome === 'refused' ? `${result.outcome}:${result.reason}` : result.outcome
  })
  const sheet = groupRows(rows.values()).get(SHEET)
  return { rows, outcomes, document: sheet ? sheetDocumentOf(sheet) : null }
}

const setTask = (value: string | null, number: number, base: number | null, dev = 'd_a', resolves = false) =>
  anOperation('reg.set', { key: 'task', value, base: base === null ? null : idNumber(base), resolves }, { number, dev })
const start = (number: number, at = '2026-03-03T07:02:00.000Z') =>
  anOperation('ev.add', { type: 'timer', data: { action: 'start', pumpId: PUMP, reason: null }, corrects: null, reason: null }, { number, at })
const step = (transition: 'hand-in' | 'return' | 'accept' | 'void' | 'reopen', expect: number, number: number, reason: string | null = null, fit: boolean | null = null) =>
  anOperation('st.req', { transition, expect, fit, reason }, { number })

describe('events', () => {
  it('[MERGE1] the same event twice is one event', () => {
    const { document } = apply([aSheetCreation(), start(2), start(2)])
    expect(document!.events).toHaveLength(1)
  })

  it('[MERGE2] an event taken back stays visible with its first reason', () => {
    const { document } = apply([
      aSheetCreation(), start(2),
      anOperation('ev.void', { target: idNumber(2), reason: 'wrong pump' }, { number: 3 }),
      anOperation('ev.void', { target: idNumber(2), reason: 'again' }, { number: 4 }),
    ])
    expect(document!.events[0]!.void).toMatchObject({ reason: 'wrong pump' })
  })

  it('[PUSH6] an event for a sheet that never arrived is held, not dropped', () => {
    const { outcomes, rows } = apply([start(2)])
    expect(outcomes).toEqual(['held:unknown-object'])
    expect([...rows.values()]).toMatchObject([{ t: 'late', data: { kind: 'ev.add' } }])
  })

  it('[PUSH6] an impossible flow is held with the reason in words', () => {
    const { outcomes, document } = apply([aSheetCreation(), anOperation('ev.add', {
      type: 'flow-reading',
      data: { when: 'before', pumpId: PUMP, calibratorId: null, samplerInLine: null, typed: '-2', unit: 'L/min', litresPerMinute: -2 },
      corrects: null, reason: null,
    }, { number: 2 })])
    expect(outcomes).toEqual(['ok', 'held:invalid'])
    expect(document!.late[0]!.reason).toContain('litresPerMinute')
  })
})

describe('registers', () => {
  it('[MERGE3] an edit that knows the value before it replaces it', () => {
    const { document, outcomes } = apply([aSheetCreation(), setTask('grinding', 2, null), setTask('welding', 3, 2)])
    expect(document!.sheet.task).toBe('welding')
    expect(document!.conflicts).toEqual([])
    expect(outcomes).toEqual(['ok', 'ok', 'ok'])
  })

  it('[MERGE4] two phones that set one field without knowing of each other leave both values in one open conflict', () => {
    const { document, outcomes } = apply([aSheetCreation(), setTask('grinding', 2, null, 'd_a'), setTask('welding', 3, null, 'd_b')])
    expect(outcomes.at(-1)).toBe('conflict')
    expect(document!.sheet.task).toBe('welding')
    expect(document!.conflicts).toMatchObject([{ field: 'task', isOpen: true, values: [{ value: 'grinding', isCurrent: false }, { value: 'welding', isCurrent: true }] }])
  })

  it('[MERGE4] a third phone adds its value to the same conflict', () => {
    const { document } = apply([aSheetCreation(), setTask('a', 2, null, 'd_a'), setTask('b', 3, null, 'd_b'), setTask('c', 4, null, 'd_c')])
    expect(document!.conflicts).toHaveLength(1)
    expect(document!.conflicts[0]!.values.map(value => value.value)).toEqual(['a', 'b', 'c'])
  })

  it('[MERGE5] the same value from two phones is no conflict and closes an open one', () => {
    const agreed = apply([aSheetCreation(), setTask('grinding', 2, null, 'd_a'), setTask('grinding', 3, null, 'd_b')])
    expect(agreed.document!.conflicts).toEqual([])
    const closed = apply([aSheetCreation(), setTask('grinding', 2, null, 'd_a'), setTask('welding', 3, null, 'd_b'), setTask('welding', 4, 2, 'd_a')])
    expect(closed.document!.conflicts[0]).toMatchObject({ isOpen: false })
  })

  it('a person who chooses closes the conflict', () => {
    const { document } = apply([aSheetCreation(), setTask('grinding', 2, null, 'd_a'), setTask('welding', 3, null, 'd_b'), setTask('grinding', 4, 3, 'd_a', true)])
    expect(document!.sheet.task).toBe('grinding')
    expect(document!.conflicts[0]).toMatchObject({ isOpen: false })
  })

  it('an unknown field is held', () => {
    expect(apply([aSheetCreation(), anOperation('reg.set', { key: '__proto__', value: 'x', base: null, resolves: false }, { number: 2 })]).outcomes[1]).toBe('held:invalid')
  })

  it('[MERGE3] the winner does not depend on the order of arrival', () => {
    fc.assert(fc.property(
      fc.uniqueArray(fc.record({ value: fc.string({ maxLength: 3 }), dev: fc.constantFrom('d_a', 'd_b', 'd_c'), number: fc.integer({ min: 2, max: 50 }) }), { selector: edit => edit.number, minLength: 2, maxLength: 6 }),
      fc.infiniteStream(fc.nat()),
      (edits, order) => {
        const operations = edits.map(edit => setTask(edit.value, edit.number, null, edit.dev))
        const shuffled = operations.map(operation => ({ operation, key: order.next().value! })).sort((a, b) => a.key - b.key).map(item => item.operation)
        const one = apply([aSheetCreation(), ...operations]).rows.get(`reg ${SHEET}/task`)!.data as unknown as RegisterData
        const other = apply([aSheetCreation(), ...shuffled]).rows.get(`reg ${SHEET}/task`)!.data as unknown as RegisterData
        expect([other.op, other.value]).toEqual([one.op, one.value])
      },
    ))
  })

  it('[MERGE4] no value of two different ones is ever lost from sight', () => {
    fc.assert(fc.property(fc.uniqueArray(fc.string({ minLength: 1, maxLength: 4 }), { minLength: 2, maxLength: 5 }), (values) => {
      const { rows } = apply([aSheetCreation(), ...values.map((value, index) => setTask(value, index + 2, null, `d_${index}`))])
      const conflict = rows.get(`conflict ${SHEET}/task`)!.data as unknown as ConflictData
      expect(conflict.values.map(value => value.value).sort()).toEqual([...values].sort())
    }))
  })
})

describe('sets and creation', () => {
  const add = (number: number) => anOperation('set.add', { set: 'crew', element: idNumber(900), meta: {} }, { number, object: SURVEY, sheet: null })
  const drop = (number: number) => anOperation('set.drop', { set: 'crew', element: idNumber(900) }, { number, object: SURVEY, sheet: null })
  const survey = anOperation('obj.new', { type: 'survey', parent: null, initial: { title: 'Foundry', siteId: idNumber(800), startsOn: '2026-03-03', endsOn: '2026-03-04', zone: 'Europe/Dublin' } }, { object: SURVEY, sheet: null })

  it('[MERGE6] the later of adding and dropping stands, in any order of arrival', () => {
    for (const operations of [[survey, add(2), drop(3)], [survey, drop(3), add(2)]]) {
      expect(apply(operations).rows.get(`set ${SURVEY}/crew/${idNumber(900)}`)!.data).toMatchObject({ isPresent: false })
    }
  })

  it('[MERGE7] creating the same record again changes nothing', () => {
    const { document, outcomes } = apply([aSheetCreation(), setTask('grinding', 2, null), aSheetCreation(3)])
    expect(outcomes).toEqual(['ok', 'ok', 'ok'])
    expect(document!.sheet.task).toBe('grinding')
  })

  it('a sheet without its survey is held', () => {
    expect(apply([anOperation('obj.new', { type: 'sheet', parent: null, initial: {} })]).outcomes).toEqual(['held:invalid'])
  })
})

describe('steps', () => {
  it('[MERGE8] a step decided on an outdated sheet is refused', () => {
    expect(apply([aSheetCreation(), step('hand-in', 0, 2, null, true), step('hand-in', 0, 3, null, true)]).outcomes).toEqual(['ok', 'ok', 'refused:stale-state'])
  })

  it('handing in as not fit, returning and voiding ask for a reason', () => {
    expect(apply([aSheetCreation(), step('hand-in', 0, 2, ' ', false)]).outcomes[1]).toBe('refused:needs-reason')
    expect(apply([aSheetCreation(), step('hand-in', 0, 2, 'pump died', false), step('return', 1, 3)]).outcomes).toEqual(['ok', 'ok', 'refused:needs-reason'])
  })

  it('a step that the table does not know from here is refused', () => {
    expect(apply([aSheetCreation(), step('accept', 0, 2)]).outcomes[1]).toBe('refused:not-from-here')
  })

  it('[MERGE9] what arrives after acceptance is held beside the sheet and changes nothing', () => {
    const before = [aSheetCreation(), start(2), step('hand-in', 0, 3, null, true), step('accept', 1, 4)]
    const locked = apply(before)
    const after = apply([...before, setTask('late words', 5, null), start(6, '2026-03-03T09:00:00.000Z')])
    expect(after.outcomes.slice(4)).toEqual(['held:locked', 'held:locked'])
    expect(after.document!.sheet).toEqual(locked.document!.sheet)
    expect(after.document!.events).toEqual(locked.document!.events)
    expect(after.document!.late.map(change => change.reason)).toEqual(['locked', 'locked'])
  })

  it('reopening lets changes in again', () => {
    const { outcomes } = apply([aSheetCreation(), step('hand-in', 0, 2, null, true), step('accept', 1, 3), step('reopen', 2, 4, 'a correction from the crew'), setTask('x', 5, null)])
    expect(outcomes.at(-1)).toBe('ok')
  })
})

describe('the overlay', () => {
  const operations = [aSheetCreation(), setTask('grinding', 2, null), start(3), step('hand-in', 0, 4, null, true)]

  it('shows the same record before and after sending', () => {
    const server = apply(operations)
    const phone = overlay([], operations.map(operation => ({ ...operation, isWaiting: true })), ORGANISATION)
    const document = sheetDocumentOf(groupRows(phone.rows).get(SHEET)!)!
    expect(document.sheet).toEqual(server.document!.sheet)
    expect(document.standing).toMatchObject({ state: 'handed-in', isWaiting: true })
    expect(server.document!.standing.isWaiting).toBe(false)
    expect(document.events.map(event => [event.id, event.isWaiting])).toEqual([[idNumber(3), true]])
  })

  it('[MERGE1] laying an operation over rows that already hold it changes nothing', () => {
    const server = apply(operations)
    const again = overlay([...server.rows.values()], operations, ORGANISATION)
    const rows = again.rows.filter(row => row.t !== 'state')
    expect(canonicalJson(rows)).toBe(canonicalJson([...server.rows.values()].filter(row => row.t !== 'state')))
  })
})
