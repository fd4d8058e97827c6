import type { SheetListAnswer, SheetListQuery, SheetSummary } from '#shared/records/office-views'
import type { QueueFilters } from '~/utils/review-queue'

/** More sheets than a survey has; an export never asks for ever. */
const MOST_EXPORTED_PAGES = 100

/**
 * A list of sheets by its filters: loaded by the server, kept fresh while it is in sight, without a row moving under someone's
 * cursor.
 */
export function useOfficeQueue(filters: MaybeRefOrGetter<QueueFilters>, { key }: { key: string }) {
  const { touch } = useOfficeNow()
  const query = computed(() => queueAddress(toValue(filters)))
  const { data, status, error, refresh } = useFetch<SheetListAnswer>('/api/sheets', { key, query, lazy: true })

  /** Rows that keep their places while someone's cursor is among them; null when the fresh order is shown. */
  const heldRows = shallowRef<readonly SheetSummary[] | null>(null)
  const rows = computed(() => heldRows.value ?? data.value?.sheets ?? [])
  const newIds = shallowRef<readonly string[]>([])
  const hasCursor = shallowRef(false)
  let shownQuery = JSON.stringify(query.value)

  function forgetNew() {
    newIds.value = []
    heldRows.value = null
  }

  watch(data, (answer, before) => {
    const isOtherList = shownQuery !== JSON.stringify(query.value)
    shownQuery = JSON.stringify(query.value)
    if (!answer || !before || isOtherList) return forgetNew()
    touch()
    const settled = settleQueue(heldRows.value ?? before.sheets, answer.sheets, hasCursor.value)
    heldRows.value = settled.isHeld ? settled.rows : null
    newIds.value = [...newIds.value, ...settled.newIds]
  })
  watch(hasCursor, (isInside) => {
    if (!isInside) heldRows.value = null
  })

  const { isReachable } = useOfficeChanges({ shownVer: () => data.value?.ver, refresh: () => refresh() })

  /** Every sheet that the filters let through, page by page. */
  async function allSheets(): Promise<SheetSummary[]> {
    const sheets: SheetSummary[] = []
    for (let page = 1; page <= MOST_EXPORTED_PAGES; page += 1) {
      const asked: Partial<SheetListQuery> = { ...toValue(filters), page }
      const answer = await $fetch<SheetListAnswer>('/api/sheets', { query: asked })
      sheets.push(...answer.sheets)
      if (sheets.length >= answer.total || answer.sheets.length === 0) break
    }
    return sheets
  }

  return {
    rows, newIds, hasCursor, status, error, refresh, isReachable, forgetNew, allSheets,
    isHeld: computed(() => heldRows.value !== null),
    counts: computed(() => data.value?.counts ?? {}),
    total: computed(() => data.value?.total ?? 0),
    pageCount: computed(() => Math.max(1, Math.ceil((data.value?.total ?? 0) / (data.value?.pageSize || 1)))),
    hasData: computed(() => Boolean(data.value)),
  }
}
