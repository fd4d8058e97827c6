import type { LocationQuery, LocationQueryRaw } from 'vue-router'
import { sheetListQuerySchema, type SheetListQuery } from '#shared/records/office-views'

/** Filters, sort and page of the review queue, as its address holds them. */
export type QueueFilters = SheetListQuery

export const QUEUE_DEFAULTS: QueueFilters = sheetListQuerySchema.parse({})

/** Reads the filters from an address; what is not understood is left out, so an old link still opens the queue. */
export function readQueueFilters(query: LocationQuery): QueueFilters {
  const filters: Record<string, unknown> = { ...QUEUE_DEFAULTS }
  for (const [name, schema] of Object.entries(sheetListQuerySchema.shape)) {
    const raw = query[name]
    const text = Array.isArray(raw) ? raw[0] : raw
    if (text === undefined || text === null || text === '') continue
    const parsed = schema.safeParse(text)
    if (parsed.success) filters[name] = parsed.data
  }
  return filters as QueueFilters
}

/** The filters as an address: only what differs from a plain queue, so that the same view has the same address. */
export function queueAddress(filters: QueueFilters): LocationQueryRaw {
  const address: Record<string, string> = {}
  for (const [name, value] of Object.entries(filters)) {
    const isPlain = value === undefined || value === '' || value === (QUEUE_DEFAULTS as Record<string, unknown>)[name]
    if (!isPlain) address[name] = String(value)
  }
  return address
}

/** Another filter is another list: it begins on its first page. */
export function withFilters(filters: QueueFilters, change: Partial<QueueFilters>): QueueFilters {
  const next: Record<string, unknown> = { ...filters, page: 1, ...change }
  for (const [name, value] of Object.entries(next)) {
    if (value === undefined || value === '' || value === null) next[name] = (QUEUE_DEFAULTS as Record<string, unknown>)[name]
  }
  return next as QueueFilters
}

/** Whether anything narrows the list beside the tab it stands on. */
export function isNarrowed(filters: QueueFilters): boolean {
  return Boolean(filters.survey || filters.technician || filters.severity || filters.q)
}

export interface ShownQueue<Row> { rows: Row[], newIds: string[], isHeld: boolean }

/**
 * The rows to show when a fresh list has come.
 *
 * While someone's cursor stands in the table no row may move under it: rows keep their places with their new values, those
 * that left the list stay until the cursor is gone, and new ones come at the end. Otherwise the fresh order is shown.
 */
export function settleQueue<Row extends { id: string }>(shown: readonly Row[], fresh: readonly Row[], hasCursor: boolean): ShownQueue<Row> {
  const known = new Set(shown.map(row => row.id))
  const newRows = fresh.filter(row => !known.has(row.id))
  const newIds = newRows.map(row => row.id)
  if (!hasCursor) return { rows: [...fresh], newIds, isHeld: false }
  const freshById = new Map(fresh.map(row => [row.id, row]))
  const rows = [...shown.map(row => freshById.get(row.id) ?? row), ...newRows]
  const isHeld = rows.length !== fresh.length || rows.some((row, index) => row.id !== fresh[index]?.id)
  return { rows, newIds, isHeld }
}
