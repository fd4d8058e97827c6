import { isOpenForField } from '#shared/access/policy'
import { readMeta, type NetworkState } from '~/local/db'
import type { FieldStore } from '~/local/field-store'
import { createSyncEngine, type SyncEngine, type SyncStatus } from '~/local/sync-engine'

export type ChipKind = 'saved-here' | 'sending' | 'all-sent' | 'needs-you' | 'stuck' | 'sign-in'

const MINUTE_MILLISECONDS = 60_000

/** The truth about sending: computed from the outbox, never from what the browser believes about the network. */
export const useSyncStore = defineStore('sync', () => {
  const session = useSessionStore()
  const clock = useClockStore()
  const status = shallowRef<SyncStatus>({ network: 'online', isSending: false, stuckSinceMilliseconds: null, downloadProgress: null })
  const updateReady = ref(false)
  let engine: SyncEngine | null = null
  let engineStore: FieldStore | null = null
  let unsubscribe = () => {}

  const kept = useLiveQuery(async () => {
    const db = session.fieldStore?.db
    if (!db) return null
    return { lastOkAt: await readMeta(db, 'lastOkAt') ?? null, offset: await readMeta(db, 'offset') ?? null, network: await readMeta(db, 'network') ?? null }
  }, null as { lastOkAt: string | null, offset: number | null, network: NetworkState | null } | null, () => session.fieldStore)

  const lastOkAt = computed(() => kept.value?.lastOkAt ?? null)
  const clockOffsetMilliseconds = computed(() => kept.value?.offset ?? null)
  /** As the tab that sends found it. */
  const network = computed<NetworkState>(() => kept.value?.network ?? status.value.network)
  const isSending = computed(() => status.value.isSending)
  const isComplete = computed(() => session.view?.cursor.isComplete ?? false)
  const downloadProgress = computed(() => status.value.downloadProgress)

  const waiting = computed(() => session.view?.outbox.length ?? 0)
  const needing = computed(() => {
    const { view, sheets } = session
    if (!view || !sheets) return 0
    const conflicts = sheets.source.sheets().filter(document => isOpenForField(document.standing.state))
      .reduce((sum, document) => sum + document.conflicts.filter(conflict => conflict.isOpen).length, 0)
    return view.refusals.length + conflicts
  })

  const chip = computed<{ kind: ChipKind, count: number, at: string | null, minutes: number }>(() => {
    const at = lastOkAt.value
    const plain = { at, minutes: 0 }
    if (network.value === 'signed-out') return { kind: 'sign-in', count: waiting.value, ...plain }
    if (needing.value > 0) return { kind: 'needs-you', count: needing.value, ...plain }
    const { stuckSinceMilliseconds } = status.value
    if (stuckSinceMilliseconds !== null && waiting.value > 0) {
      return { kind: 'stuck', count: waiting.value, at, minutes: Math.max(0, Math.floor((clock.nowMs - stuckSinceMilliseconds) / MINUTE_MILLISECONDS)) }
    }
    if (waiting.value > 0) return { kind: isSending.value ? 'sending' : 'saved-here', count: waiting.value, ...plain }
    return { kind: at === null ? 'saved-here' : 'all-sent', count: 0, ...plain }
  })

  /** Begins to send and fetch for the person at work; ends it for the one before. */
  function follow(store: FieldStore | null) {
    if (store === engineStore) return
    stop()
    if (!store) return
    engineStore = store
    engine = markRaw(createSyncEngine(store))
    unsubscribe = engine.subscribe((next) => { status.value = next })
    engine.start()
  }

  function stop() {
    unsubscribe()
    engine?.stop()
    engine = engineStore = null
  }

  async function sendNow() {
    await engine?.sendNow()
  }

  return { chip, lastOkAt, network, clockOffsetMilliseconds, updateReady, isComplete, downloadProgress, isSending, waiting, follow, stop, sendNow }
})
