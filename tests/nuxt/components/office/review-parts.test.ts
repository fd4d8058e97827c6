import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import OfficeConflicts from '~/components/office/OfficeConflicts.vue'
import OfficeFindings from '~/components/office/OfficeFindings.vue'
import OfficeHistory from '~/components/office/OfficeHistory.vue'
import OfficeLate from '~/components/office/OfficeLate.vue'
import OfficePhoneTable from '~/components/office/OfficePhoneTable.vue'
import OfficeReadings from '~/components/office/OfficeReadings.vue'
import OfficeTimeline from '~/components/office/OfficeTimeline.vue'
import { assessSheet } from '#shared/assessment/assess-sheet'
import type { Finding } from '#shared/assessment/sheet-assessment'
import { aBundle, aDay, aFlowReading, anId, clock, flowReadings, PHONE, takenBack, TECHNICIAN_ID } from '../../../fixtures/builders'
import { wordsOf } from '../../words-of'

const OTHER_PERSON = anId('person', 2)
const nameOf = (id: string) => ({ [TECHNICIAN_ID]: 'First Technician', [OTHER_PERSON]: 'Second Technician' }[id] ?? 'Test pump 0012')
const phoneOf = (dev: string) => (dev === PHONE ? 'First phone' : 'Second phone')
const common = { nameOf, phoneOf, zone: 'Europe/London' }

describe('OfficeConflicts', () => {
  it('shows both values with who, when and which phone, and which one stands now', async () => {
    const conflicts = await mountSuspended(OfficeConflicts, {
      props: {
        ...common, conflicts: [{
          field: 'task', isOpen: true, values: [
            { opId: 'a', value: 'Sanding doors', author: TECHNICIAN_ID, at: '2026-07-03T06:00:00.000Z', dev: PHONE, isCurrent: false },
            { opId: 'b', value: 'Sanding frames', author: OTHER_PERSON, at: '2026-07-03T06:05:00.000Z', dev: 'phone-b', isCurrent: true },
          ],
        }],
      },
    })
    const [first, second] = conflicts.findAll('li').map(item => wordsOf(item.element))
    expect(first).toBe('Sanding doors First Technician, 3 Jul 2026, 07:00 First phone')
    expect(second).toBe('Sanding frames Second Technician, 3 Jul 2026, 07:05 Second phone Stands on the sheet now')
  })
})

describe('OfficeFindings', () => {
  const finding = (changes: Partial<Finding>): Finding => ({
    code: 'flow-change', severity: 'stop', subject: '', part: 'flow-after', title: 'Flow fell by 12.9 %.', whatNow: 'Hand in as not fit.',
    numbers: [{ name: 'change', value: -12.9, unit: '%' }], rule: 'Beyond 10 % the sample is not fit.', source: 'common practice', answer: null, ...changes,
  })

  it('puts the gravest first, with its numbers, its rule and its source', async () => {
    const findings = await mountSuspended(OfficeFindings, {
      props: { ...common, gaps: [], findings: [finding({ severity: 'attention', code: 'long-pause', title: 'Paused for 75 min.', answer: { reason: 'Fire drill', author: TECHNICIAN_ID, at: clock('15:20') } }), finding({})] },
    })
    const [first, second] = findings.findAll('ul > li').map(item => wordsOf(item.element))
    expect(first).toContain('Stop. Flow fell by 12.9 %.')
    expect(first).toContain('change \u221212.9 %')
    expect(first).toContain('Source: common practice')
    expect(second).toContain('Attention, answered.')
    expect(second).toContain('“Fire drill” First Technician')
  })

  it('says so when nothing speaks against the sheet', async () => {
    const findings = await mountSuspended(OfficeFindings, { props: { ...common, gaps: [], findings: [] } })
    expect(findings.text()).toContain('Nothing speaks against this sheet')
  })
})

describe('OfficeReadings', () => {
  it('keeps the first value of a corrected reading in sight, struck through, with reason and author', async () => {
    const wrong = takenBack(aFlowReading({ typed: '1.76', litresPerMinute: 1.76 }), 'Misread')
    const right = aFlowReading({ typed: '1,67', litresPerMinute: 1.67 }, { corrects: wrong.id, reason: 'Display said 1.67' })
    const bundle = aBundle({ events: [...flowReadings('before', [1.7, 1.7]), wrong, right] })
    const assessment = assessSheet(bundle, clock('06:50'))
    const readings = await mountSuspended(OfficeReadings, {
      props: { ...common, when: 'before', events: bundle.document.events, pumps: assessment.pumps, working: assessment.workings['mean-before'], calibrators: bundle.calibrators },
    })
    expect(readings.findAll('del').map(one => one.text())).toEqual(['1.76 L/min'])
    expect(readings.text()).toContain('1,67 L/min')
    expect(readings.text()).toContain('Corrected by First Technician: Display said 1.67')
    // (1.7 + 1.7 + 1.67) / 3 by hand.
    expect(wordsOf(readings.element)).toContain('Mean 1.690 L/min')
  })
})

describe('OfficeTimeline', () => {
  it('shows what was taken back with its reason, and a phone\'s clock that was off', async () => {
    const [first, ...rest] = aDay()
    const events = [takenBack(first!, 'Wrong pump'), ...rest.map(event => ({ ...event, clockOffsetMilliseconds: 300_000 }))]
    const timeline = await mountSuspended(OfficeTimeline, { props: { ...common, zone: 'UTC', events } })
    const items = timeline.findAll('li').map(item => wordsOf(item.element))
    expect(items[0]).toContain('Taken back by First Technician, 3 Mar 2026, 15:30: Wrong pump')
    expect(timeline.findAll('li')[0]!.find('del').exists()).toBe(true)
    expect(items.find(item => item.includes('Started'))).toContain('clock was 5 min behind: by the server’s clock 07:05')
  })
})

describe('OfficeLate and OfficeHistory', () => {
  it('say what was kept beside the sheet, from whom and why', async () => {
    const late = await mountSuspended(OfficeLate, {
      props: { ...common, events: [], late: [{ opId: 'x', reason: 'locked', author: OTHER_PERSON, dev: 'phone-b', at: '2026-07-03T06:00:00.000Z', kind: 'reg.set', body: { key: 'task', value: 'Sweeping' } }] },
    })
    expect(wordsOf(late.element)).toContain('Task: Sweeping The sheet was locked when it arrived. Second Technician, 3 Jul 2026, 07:00, Second phone')
  })

  it('give the claimed time, the corrected one and when it was received', async () => {
    const history = await mountSuspended(OfficeHistory, {
      props: {
        ...common, zone: 'UTC', events: [], history: [{
          opId: 'x', kind: 'st.req', at: '2026-03-03T15:00:00.000Z', receivedAt: '2026-03-03T19:30:00.000Z', author: TECHNICIAN_ID, dev: PHONE, outcome: 'refused',
          reason: 'stale-state', what: 'hand-in', body: { transition: 'hand-in', fit: true, reason: null }, clockOffsetMilliseconds: -600_000,
        }],
      },
    })
    expect(history.findAll('tbody td').map(cell => wordsOf(cell.element))).toEqual([
      '3 Mar 2026, 15:00:00 clock 10 min ahead by the server’s 14:50:00', '3 Mar 2026, 19:30:00', 'First Technician First phone',
      'Handed in as fit', expect.stringContaining('Refused'),
    ])
  })
})

describe('OfficePhoneTable', () => {
  it('puts who owes on top and says it in words', async () => {
    const phone = { phone: 'p', lastSeenAt: '2026-03-03T12:00:00.000Z', clockOffsetMilliseconds: 0, lastNumber: 40, missingNumbers: 0, pending: 0, oldestAt: null }
    const table = await mountSuspended(OfficePhoneTable, {
      props: {
        zone: 'UTC', nowMs: Date.parse('2026-03-05T12:00:00.000Z'), phones: [
          { ...phone, dev: 'a', label: 'First phone', personName: 'First Technician' },
          { ...phone, dev: 'b', label: 'Second phone', personName: 'Second Technician', pending: 7, oldestAt: '2026-03-03T11:00:00.000Z', clockOffsetMilliseconds: 300_000 },
          { ...phone, dev: 'c', label: '', personName: 'Third Technician', missingNumbers: 2 },
        ],
      },
    })
    const rows = table.findAll('tbody tr').map(row => wordsOf(row.element))
    expect(rows[0]).toMatch(/^Changes are missing Third Technician A phone without a name .*2 of 40$/)
    expect(rows[1]).toContain('Owes for over a day')
    expect(rows[1]).toContain('waits 2 days')
    expect(rows[1]).toContain('5 min behind')
    expect(rows[2]).toContain('Owes nothing')
  })
})
