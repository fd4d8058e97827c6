import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it, vi } from 'vitest'
import UiBadge from '~/components/ui/UiBadge.vue'
import UiErrorSummary from '~/components/ui/UiErrorSummary.vue'
import UiFigure from '~/components/ui/UiFigure.vue'
import UiNotice from '~/components/ui/UiNotice.vue'
import UiShape from '~/components/ui/UiShape.vue'
import UiTable from '~/components/ui/UiTable.vue'
import UiUndo from '~/components/ui/UiUndo.vue'
import UiWorking from '~/components/ui/UiWorking.vue'
import { TONES } from '~/utils/tone'
import { sampledMinutesWorking } from '#shared/domain/volume-workings'

afterEach(() => { vi.useRealTimers() })

describe('a state', () => {
  it('is told apart by its shape alone', async () => {
    const drawn = await Promise.all(TONES.map(async tone => (await mountSuspended(UiShape, { props: { tone } })).html()))
    expect(new Set(drawn).size).toBe(TONES.length)
  })

  it('always has its word', async () => {
    const badge = await mountSuspended(UiBadge, { props: { tone: 'stop', label: 'Not as fit' } })
    expect(badge.text()).toBe('Not as fit')
    expect(badge.get('svg').attributes('aria-hidden')).toBe('true')
  })
})

describe('UiNotice', () => {
  it('says how serious it is to whoever hears it, at once only where it must', async () => {
    const stop = await mountSuspended(UiNotice, { props: { tone: 'stop', title: 'No flow after', live: true } })
    expect(stop.attributes('role')).toBe('alert')
    expect(stop.text()).toContain('Stop: No flow after')
    const attention = await mountSuspended(UiNotice, { props: { tone: 'attention', title: 'Late', live: true } })
    expect(attention.attributes('role')).toBe('status')
    const note = await mountSuspended(UiNotice, { props: { title: 'Calm' } })
    expect(note.attributes('role')).toBeUndefined()
  })
})

describe('UiErrorSummary', () => {
  it('takes the focus when problems appear and leads to each field', async () => {
    const field = document.createElement('input')
    field.id = 'flow-1'
    field.scrollIntoView = () => {}
    document.body.append(field)
    const summary = await mountSuspended(UiErrorSummary, { props: { errors: [] as { id: string, message: string }[] }, attachTo: document.body })
    expect(summary.text()).toBe('')
    await summary.setProps({ errors: [{ id: 'flow-1', message: 'Say how high the flow was' }] })
    await expect.poll(() => document.activeElement?.textContent).toContain('There is a problem')
    await summary.get('a').trigger('click')
    expect(document.activeElement).toBe(field)
    summary.unmount()
    field.remove()
  })
})

describe('UiFigure', () => {
  it('never shows what is not known as a number', async () => {
    const figure = await mountSuspended(UiFigure, { props: { label: 'Volume', value: null, unit: 'L' } })
    expect(figure.text()).toContain('not known yet')
    expect(figure.text()).not.toContain('0')
  })
})

describe('UiWorking', () => {
  it('shows formula, what went in with units, and the source, with instants in the zone of the place', async () => {
    const working = sampledMinutesWorking({ startedAt: '2026-07-03T06:02:00.000Z', stoppedAt: '2026-07-03T07:02:00.000Z', pauses: [] })
    const shown = await mountSuspended(UiWorking, { props: { working, zone: 'Europe/London', open: true } })
    expect(shown.text()).toContain(working.formula)
    expect(shown.text()).toContain(`Source: ${working.source}`)
    expect(shown.findAll('dd').map(one => one.text())).toEqual(['3 Jul 2026, 07:02:00', '3 Jul 2026, 08:02:00', '60 min', '60 min'])
  })
})

describe('UiUndo', () => {
  it('goes after its time, but not while somebody is at it', async () => {
    vi.useFakeTimers()
    const undo = await mountSuspended(UiUndo, { props: { text: 'Paused W-03 at 11:30', seconds: 10 }, attachTo: document.body })
    undo.get('button').element.focus()
    vi.advanceTimersByTime(25_000)
    expect(undo.emitted('done')).toBeUndefined()
    undo.get('button').element.blur()
    vi.advanceTimersByTime(10_000)
    expect(undo.emitted('done')).toHaveLength(1)
    undo.unmount()
  })
})

describe('UiTable', () => {
  const props = {
    caption: 'Sheets handed in',
    columns: [{ key: 'sheet', label: 'Sheet', sortable: true }, { key: 'litres', label: 'Volume', unit: 'L', align: 'end' as const }],
    rows: [{ sheet: 'A-1', litres: 812 }],
    rowKey: (row: { sheet: string }) => row.sheet,
  }

  it('has a caption, units in its head, and says how it is sorted', async () => {
    const table = await mountSuspended(UiTable, { props: { ...props, sort: { key: 'sheet', direction: 'ascending' } } } as never)
    expect(table.get('caption').text()).toBe('Sheets handed in')
    expect(table.findAll('th').map(one => one.attributes('aria-sort'))).toEqual(['ascending', undefined])
    await table.get('th button').trigger('click')
    expect(table.emitted('update:sort')?.at(-1)).toEqual([{ key: 'sheet', direction: 'descending' }])
  })

  it('says so when there is nothing', async () => {
    const table = await mountSuspended(UiTable, { props: { ...props, rows: [] } } as never)
    expect(table.get('tbody').text()).toBe('Nothing to show.')
  })
})
