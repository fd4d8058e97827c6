import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it } from 'vitest'
import OfficeFilters from '~/components/office/OfficeFilters.vue'
import OfficeSheetTable from '~/components/office/OfficeSheetTable.vue'
import { QUEUE_DEFAULTS } from '~/utils/review-queue'
import { aSummary } from '../../../fixtures/sheet-summary'
import { wordsOf } from '../../words-of'

const NOW = Date.parse('2026-03-03T18:40:00.000Z')
const sheets = [aSummary({ place: 1, stopCount: 2, attentionCount: 3, openAttentionCount: 1, conflictCount: 1 }), aSummary({ place: 2 }), aSummary({ place: 3, workerCode: null, kind: 'field-blank', sampledMinutes: null, volumeLitres: null, changePercent: null })]

let mounted: { unmount: () => void } | undefined

async function mountTable(props: Record<string, unknown> = {}) {
  const table = await mountSuspended(OfficeSheetTable, {
    props: { caption: 'Sheets', sheets, sort: 'findings' as const, nowMs: NOW, linkTo: (sheet: { id: string }) => `/office/review/${sheet.id}`, ...props },
    attachTo: document.body,
  })
  mounted = table
  return table
}

afterEach(() => mounted?.unmount())

describe('OfficeSheetTable', () => {
  it('puts what is against a sheet first, each by count and word, and units once in the head', async () => {
    const table = await mountTable()
    const first = table.findAll('tbody tr')[0]!.findAll('td')[0]!
    expect(wordsOf(first.element)).toBe('2 stop 1 conflict 1 attention 2 answered')
    expect(table.findAll('thead th').map(head => wordsOf(head.element))).toContain('Volume L')
    expect(table.text()).toContain('3 h ago')
  })

  it('shows no number where none is known', async () => {
    const table = await mountTable()
    const cells = table.findAll('tbody tr')[2]!.findAll('td.cell-figure').map(cell => wordsOf(cell.element))
    expect(cells).toEqual(['– min', '– L', '– % change'])
    expect(table.findAll('tbody tr')[2]!.text()).toContain('Field blank')
  })

  it('moves its cursor from sheet to sheet and stops at the ends', async () => {
    const table = await mountTable()
    const links = table.findAll<HTMLAnchorElement>('tbody th a').map(link => link.element)
    const { moveCursor } = table.vm as unknown as { moveCursor: (step: 1 | -1) => void }
    moveCursor(1)
    expect(document.activeElement).toBe(links[0])
    moveCursor(1)
    moveCursor(1)
    moveCursor(1)
    expect(document.activeElement).toBe(links[2])
    moveCursor(-1)
    expect(document.activeElement).toBe(links[1])
    expect(links[1]!.getAttribute('href')).toContain(sheets[1]!.id)
  })

  it('tells when somebody\'s cursor is in it and when it has left', async () => {
    const table = await mountTable()
    await table.get('table').trigger('pointerenter')
    table.get<HTMLAnchorElement>('tbody th a').element.focus()
    await table.get('table').trigger('pointerleave')
    expect(table.emitted('cursor')!.at(-1)).toEqual([true])
    table.get<HTMLAnchorElement>('tbody th a').element.blur()
    await expect.poll(() => table.emitted('cursor')!.at(-1)).toEqual([false])
  })

  it('says how it is sorted and turns round when the same head is pressed', async () => {
    const table = await mountTable()
    const head = table.findAll('thead th').find(one => one.text() === 'Findings')!
    expect(head.attributes('aria-sort')).toBe('descending')
    await head.get('button').trigger('click')
    await table.findAll('thead th').find(one => one.text() === 'Worker')!.get('button').trigger('click')
    expect(table.emitted('update:sort')).toEqual([['findings', 'asc'], ['worker', 'asc']])
  })

  it('marks what came while the page was open', async () => {
    const table = await mountTable({ newIds: [sheets[1]!.id] })
    expect(table.findAll('tbody tr').map(row => row.text().includes('New'))).toEqual([false, true, false])
  })
})

describe('OfficeFilters', () => {
  const options = { surveys: [{ value: 's1', label: 'Sanding hall' }], technicians: [{ value: 'p1', label: 'Test Technician' }] }

  it('tells each choice at once and "none" as no filter', async () => {
    const filters = await mountSuspended(OfficeFilters, { props: { filters: QUEUE_DEFAULTS, ...options } })
    const [survey, , severity] = filters.findAll('select')
    await survey!.setValue('s1')
    await severity!.setValue('stop')
    await filters.setProps({ filters: { ...QUEUE_DEFAULTS, severity: 'stop' } })
    await severity!.setValue('')
    expect(filters.emitted('change')).toEqual([[{ survey: 's1' }], [{ severity: 'stop' }], [{ severity: undefined }]])
  })

  it('waits for a rest in typing, but not after Enter', async () => {
    const filters = await mountSuspended(OfficeFilters, { props: { filters: QUEUE_DEFAULTS, ...options } })
    await filters.get('input').setValue('W-0')
    expect(filters.emitted('change')).toBeUndefined()
    await filters.get('form').trigger('submit')
    expect(filters.emitted('change')).toEqual([[{ q: 'W-0' }]])
  })

  it('clears all of them with one press', async () => {
    const filters = await mountSuspended(OfficeFilters, { props: { filters: { ...QUEUE_DEFAULTS, q: 'x', severity: 'stop' }, ...options } })
    await filters.findAll('button').find(button => button.text() === 'Clear')!.trigger('click')
    expect(filters.emitted('change')).toEqual([[{ survey: undefined, technician: undefined, severity: undefined, q: undefined }]])
  })
})
