import { describe, expect, it } from 'vitest'
import { isNarrowed, queueAddress, QUEUE_DEFAULTS, readQueueFilters, settleQueue, withFilters } from '../../../app/utils/review-queue'
import { anId } from '../../fixtures/builders'

describe('filters in the address', () => {
  it('reads back what it writes', () => {
    const filters = withFilters(QUEUE_DEFAULTS, { state: 'accepted', survey: anId('survey'), severity: 'stop', q: 'W-0', sort: 'number', direction: 'desc' })
    expect(readQueueFilters(queueAddress(filters) as Record<string, string>)).toEqual(filters)
  })

  it('gives a plain queue a plain address', () => {
    expect(queueAddress(QUEUE_DEFAULTS)).toEqual({})
  })

  it('leaves out what it does not understand instead of failing', () => {
    expect(readQueueFilters({ state: 'nowhere', survey: 'not-an-id', page: '0', severity: 'stop' })).toEqual({ ...QUEUE_DEFAULTS, severity: 'stop' })
  })

  it('begins another list on its first page', () => {
    expect(withFilters({ ...QUEUE_DEFAULTS, page: 4 }, { q: 'grinding' }).page).toBe(1)
  })

  it('takes a filter away when it is cleared', () => {
    const narrowed = withFilters(QUEUE_DEFAULTS, { severity: 'stop' })
    expect(isNarrowed(narrowed)).toBe(true)
    expect(isNarrowed(withFilters(narrowed, { severity: undefined }))).toBe(false)
  })
})

describe('a fresh list under someone\'s eyes', () => {
  const shown = [{ id: 'a', is: 'old' }, { id: 'b', is: 'old' }]
  const fresh = [{ id: 'c', is: 'new' }, { id: 'b', is: 'new' }]

  it('is shown in its own order while no cursor is in the table', () => {
    const settled = settleQueue(shown, fresh, false)
    expect(settled.rows.map(row => row.id)).toEqual(['c', 'b'])
    expect(settled).toMatchObject({ newIds: ['c'], isHeld: false })
  })

  it('moves no row under a cursor: values are fresh, new rows come last, gone ones wait', () => {
    const settled = settleQueue(shown, fresh, true)
    expect(settled.rows).toEqual([{ id: 'a', is: 'old' }, { id: 'b', is: 'new' }, { id: 'c', is: 'new' }])
    expect(settled).toMatchObject({ newIds: ['c'], isHeld: true })
  })

  it('holds nothing when only values changed', () => {
    expect(settleQueue(shown, shown.map(row => ({ ...row, is: 'new' })), true)).toMatchObject({ newIds: [], isHeld: false })
  })
})
