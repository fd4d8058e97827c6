import { assessSheet } from '#shared/assessment/assess-sheet'
import type { SheetAssessment } from '#shared/assessment/sheet-assessment'
import { siblingsOf } from '#shared/assessment/siblings'
import type { SheetAnswer } from '#shared/records/office-views'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { createBundleSource } from '#shared/sync/bundle'
import { groupRows } from '#shared/sync/read-rows'
import type { Row } from '#shared/sync/rows'

/**
 * A sheet as the office sees it, read from the same rows and with the same functions as on the phone, so that a number here
 * is the phone's number.
 *
 * @param answer what `GET /api/sheets/:sheetId` said, or null while it is loading
 * @param nowAt the instant for what is still running
 */
export function useReviewedSheet(answer: MaybeRefOrGetter<SheetAnswer | null | undefined>, nowAt: MaybeRefOrGetter<string>) {
  const groups = computed(() => groupRows((toValue(answer)?.rows ?? []) as Row[]))
  const source = computed(() => createBundleSource(groups.value, siblingsOf))

  const bundle = computed<SheetBundle | null>(() => {
    const sheetId = toValue(answer)?.sheetId
    return sheetId ? source.value.bundle(sheetId) : null
  })
  const assessment = computed<SheetAssessment | null>(() => (bundle.value ? assessSheet(bundle.value, toValue(nowAt)) : null))
  const nameOf = computed(() => recordNames(groups.value, toValue(answer)?.people))
  const zone = computed(() => bundle.value?.survey?.zone ?? 'UTC')
  const phoneOf = computed(() => (dev: string) => toValue(answer)?.phones[dev] || 'a phone without a name')

  return { bundle, assessment, nameOf, phoneOf, zone }
}
