import { describe, expect, it } from 'vitest'
import { changeInWords, heldInWords } from '../../../app/utils/change-words'
import { allowedDecisions, decidedFit, decisionNeedsReason } from '../../../app/utils/decision'
import { eventChains } from '../../../app/utils/event-chains'
import { eventInWords, saidBy } from '../../../app/utils/event-words'
import { refusalInWords } from '../../../app/utils/refusal-words'
import { sheetsCsv } from '../../../app/utils/sheet-csv'
import { valueInWords } from '../../../app/utils/value-words'
import { sheetFacts } from '../../../app/utils/sheet-facts'
import { aBundle, aFlowReading, aTimer, anId, PUMP_ID, takenBack, WORKER_ID } from '../../fixtures/builders'
import { aSummary } from '../../fixtures/sheet-summary'

const nameOf = (id: string) => (id === PUMP_ID ? 'Test pump 0012' : id === WORKER_ID ? 'W-01' : `unknown (${id.slice(0, 8)})`)
const context = { nameOf, zone: 'Europe/London' }
const reviewer = { id: anId('person', 9), organisationId: anId('organisation'), roles: ['reviewer'] as const }

describe('decisions', () => {
  it('offers only the steps that the table and the policy allow', () => {
    expect(allowedDecisions(reviewer, 'handed-in')).toEqual(['accept', 'return', 'void'])
    expect(allowedDecisions(reviewer, 'accepted')).toEqual(['void', 'reopen'])
    expect(allowedDecisions(reviewer, 'open')).toEqual([])
    expect(allowedDecisions({ ...reviewer, roles: ['technician'] }, 'handed-in')).toEqual([])
  })

  it('asks for a reason to use what something speaks against', () => {
    expect(decisionNeedsReason('accept', { isFit: true, stopCount: 0 })).toBe(false)
    expect(decisionNeedsReason('accept', { isFit: true, stopCount: 1 })).toBe(true)
    expect(decisionNeedsReason('accept', { isFit: false, stopCount: 0 })).toBe(true)
    expect(decisionNeedsReason('void', { isFit: true, stopCount: 0 })).toBe(true)
  })

  it('never calls fit what a finding stands against', () => {
    expect(decidedFit('accept', { isFit: true, stopCount: 0 })).toBe(true)
    expect(decidedFit('accept', { isFit: true, stopCount: 2 })).toBe(false)
    expect(decidedFit('return', { isFit: true, stopCount: 0 })).toBeNull()
  })

  it('says in words why one was refused, and that nothing changed when there was no answer', () => {
    expect(refusalInWords({ status: 409, data: { data: { code: 'stale-state' } } })).toContain('has moved on')
    expect(refusalInWords({ status: 401 })).toContain('signed out')
    expect(refusalInWords(new TypeError('fetch failed'))).toContain('Nothing was changed')
  })
})

describe('entries', () => {
  it('puts a corrected entry with its first value and leaves a taken back one in sight', () => {
    const first = takenBack(aFlowReading({ typed: '1.76' }))
    const second = takenBack(aFlowReading({ typed: '1.67' }, { corrects: first.id, reason: 'Misread' }))
    const third = aFlowReading({ typed: '1.68' }, { corrects: second.id, reason: 'Again' })
    const gone = takenBack(aTimer('start', '07:00'))
    const chains = eventChains([gone, first, second, third])
    expect(chains.map(chain => [chain.event.id, chain.earlier.map(event => event.id), chain.isTakenBack])).toEqual([
      [gone.id, [], true],
      [third.id, [first.id, second.id], false],
    ])
  })

  it('ends even where two entries name each other', () => {
    const first = aTimer('start', '07:00')
    const second = aTimer('start', '07:01', {}, { corrects: first.id })
    expect(eventChains([{ ...first, corrects: second.id }, second, aTimer('stop', '08:00')])).toHaveLength(1)
  })

  it('says a reading with unit, pump and sampler, and who said an entry', () => {
    const words = eventInWords(aFlowReading({ typed: '2,05', calibratorId: null, samplerInLine: null }), nameOf, 'UTC')
    expect(words.title).toBe('Flow reading before')
    expect(words.detail).toBe('2,05 L/min · Test pump 0012 · no calibrator named · no sampler in line')
    expect(saidBy({ by: { role: 'worker', id: WORKER_ID, name: null } }, nameOf)).toBe('said by the worker, W-01')
  })
})

describe('changes in words', () => {
  it('names field and value', () => {
    expect(changeInWords('reg.set', { key: 'workerId', value: WORKER_ID }, context)).toBe('Worker: W-01')
    expect(changeInWords('reg.set', { key: 'shiftEndsAt', value: '2026-07-03T14:00:00.000Z' }, context)).toBe('Shift ends: 3 Jul 2026, 15:00')
    expect(valueInWords('task', null, nameOf, 'UTC')).toBe('empty')
    expect(valueInWords('inletSide', 'inside-helmet', nameOf, 'UTC')).toBe('Inside the helmet')
  })

  it('shows a body that it does not know as it came', () => {
    expect(changeInWords('ev.add', { type: 'from-the-future', data: { a: 1 } }, context)).toContain('from-the-future')
    expect(changeInWords('new.kind', { a: 1 }, context)).toBe('new.kind {"a":1}')
  })

  it('says why a change was held, with the detail', () => {
    expect(heldInWords('locked')).toBe('The sheet was locked when it arrived')
    expect(heldInWords('invalid: flow: must be above 0')).toBe('The value cannot be stored in this field (flow: must be above 0)')
  })
})

describe('the facts of a sheet', () => {
  it('say null for what is not noted, never a made-up value', () => {
    const groups = sheetFacts(aBundle({ sheet: { seal: null, task: null }, worker: null }), nameOf, 'UTC')
    const facts = groups.flatMap(group => group.facts)
    expect(facts.find(one => one.label === 'Seal')?.value).toBeNull()
    expect(facts.find(one => one.label === 'Worker')?.value).toBeNull()
    expect(facts.find(one => one.label === 'Shift')?.value).toBe('3 Mar 2026, 07:00 to 15:00')
  })
})

describe('CSV', () => {
  it('keeps numbers unrounded and quotes what needs it', () => {
    const [, head, row] = /^\uFEFF([^\r]+)\r\n([^\r]+)\r\n$/.exec(sheetsCsv([aSummary({ volumeLitres: 715.5200000000001, surveyTitle: 'Hall "B", east', changePercent: -3.25 })]))!
    expect(head!.split(',')).toHaveLength(21)
    expect(row).toContain('715.5200000000001')
    expect(row).toContain('"Hall ""B"", east"')
    expect(row).toContain(',-3.25,')
  })

  it('never hands a spreadsheet a formula that somebody typed', () => {
    expect(sheetsCsv([aSummary({ number: '=1+1', workerCode: '@x' })])).toContain('\'=1+1,')
  })
})
