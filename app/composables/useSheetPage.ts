import type { MaybeRefOrGetter } from 'vue'
import { localParts } from '#shared/domain/local-time'

/**
 * What the pages of one sheet share: the sheet itself, its zone and today, names of what it points to, and what was used lately on
 * this phone, so that pickers can start with it.
 */
export function useSheetPage(sheetId: MaybeRefOrGetter<string>) {
  const sheet = useSheet(sheetId)
  const { reference } = useReference()
  const { sheets } = useFieldDay()
  const clock = useClockStore()

  const zone = computed(() => sheet.bundle.value?.survey?.zone ?? phoneZone())
  const todayOn = computed(() => localParts(clock.nowAt, zone.value).dayOn)
  const nameOf = computed(() => referenceNames(reference.value))

  /** The other sheets of this phone, the latest first. */
  const others = computed(() => sheets.value
    .map(one => one.bundle.document)
    .filter(document => document.id !== toValue(sheetId))
    .sort((one, other) => one.createdAt < other.createdAt ? 1 : -1))

  const recent = computed(() => ({
    workerIds: eachOnce(others.value.map(one => one.sheet.workerId)),
    methodIds: eachOnce(others.value.map(one => one.sheet.methodId)),
    agentIds: eachOnce(others.value.flatMap(one => one.sheet.agentIds)),
    samplerIds: eachOnce(others.value.map(one => one.sheet.samplerId)),
    pumpIds: eachOnce(others.value.map(one => one.sheet.pumpId)),
    calibratorIds: eachOnce(others.value.map(one => one.sheet.calibratorId)),
    lots: eachOnce(others.value.map(one => one.sheet.mediumLot)).map((lot) => {
      const from = others.value.find(one => one.sheet.mediumLot === lot)
      return { lot, medium: from?.sheet.medium ?? null, expiresOn: from?.sheet.mediumExpiresOn ?? null }
    }),
    tasks: eachOnce([
      sheet.bundle.value?.document.sheet.task,
      ...[...sheet.bundle.value?.document.events ?? []].reverse().map(event => event.type === 'activity' && event.void === null ? event.data.text : null),
      ...others.value.flatMap(one => [...one.events].reverse().map(event => event.type === 'activity' && event.void === null ? event.data.text : null)),
    ].map(text => text?.trim() || null)).slice(0, 8),
  }))

  /** Which other sheet each pump is drawing for now. */
  const pumpsInUse = computed(() => new Map(sheets.value
    .filter(one => one.bundle.document.id !== toValue(sheetId) && (one.assessment.progress === 'running' || one.assessment.progress === 'paused'))
    .flatMap((one) => {
      const pumpId = one.assessment.currentPumpId
      return pumpId ? [[pumpId, one.bundle.worker?.code ?? one.bundle.document.sheet.number ?? 'another sheet'] as const] : []
    })))

  return { ...sheet, reference, zone, todayOn, nameOf, recent, pumpsInUse, clock }
}
