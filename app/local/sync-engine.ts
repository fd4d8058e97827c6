import { browserTransport, type Transport } from './transport'
import { phoneId, phoneLabel } from './device'
import { readMeta, writeMeta, type NetworkState } from './db'
import type { FieldStore } from './field-store'
import { offerAgain, whatWaits } from './outbox'
import { syncRound, type RoundOutcome, type SyncContext } from './sync-round'

export const COMMIT_DEBOUNCE_MILLISECONDS = 1000
export const POLL_MILLISECONDS = 5000
export const BACKOFF_FIRST_MILLISECONDS = 1000
export const BACKOFF_MOST_MILLISECONDS = 300_000
export const STUCK_AFTER_MILLISECONDS = 120_000

/** What a screen may know about sending in this tab. What waits it reads from the outbox itself. */
export interface SyncStatus {
  network: NetworkState
  isSending: boolean
  /** Since when the oldest operation has not moved although the network answers, ms; null while all is well. */
  stuckSinceMilliseconds: number | null
  /** How much of the first download is here, 0 to 1; null when the end is not known. */
  downloadProgress: number | null
}

export interface SyncEngine {
  status: () => SyncStatus
  /** Told at once and with every change; returns the function that ends it. */
  subscribe: (listener: (status: SyncStatus) => void) => () => void
  start: () => void
  stop: () => void
  /** A person pressed "send now": at once, with what was kept aside too. Resolves when the round is over. */
  sendNow: () => Promise<void>
}

export interface SyncEngineOptions {
  transport?: Transport
  phone?: () => Promise<string>
  label?: string
  random?: () => number
  /** One sender of all tabs: runs `work` when it may, else answers false. */
  withLock?: (name: string, work: () => Promise<void>) => Promise<boolean>
  isVisible?: () => boolean
  isOnline?: () => boolean
}

/**
 * Sends and fetches while the app is open. One tab sends at a time; two senders would be harmless, because every operation
 * has an effect once, only wasteful.
 */
export function createSyncEngine(store: FieldStore, options: SyncEngineOptions = {}): SyncEngine {
  const transport = options.transport ?? browserTransport()
  const random = options.random ?? Math.random
  const withLock = options.withLock ?? withBrowserLock
  const isVisible = options.isVisible ?? (() => typeof document === 'undefined' || document.visibilityState !== 'hidden')
  const isOnline = options.isOnline ?? (() => typeof navigator === 'undefined' || navigator.onLine !== false)
  const label = options.label ?? phoneLabel(typeof navigator === 'undefined' ? '' : navigator.userAgent)

  let status: SyncStatus = { network: 'online', isSending: false, stuckSinceMilliseconds: null, downloadProgress: null }
  const listeners = new Set<(status: SyncStatus) => void>()
  let timer: ReturnType<typeof setTimeout> | undefined
  let timerAt = Infinity
  let failures = 0
  let isStarted = false
  let running: Promise<void> | null = null
  let isAskedAgain = false
  let stopRound: AbortController | null = null
  let batchSize: number | undefined
  /** The oldest operation, and since when it has been the oldest while somebody answered. */
  let watched: { n: number | null, since: number, isAnswered: boolean } = { n: null, since: 0, isAnswered: false }
  const { surroundings } = store

  function tell(change: Partial<SyncStatus>) {
    const next = { ...status, ...change }
    if (JSON.stringify(next) === JSON.stringify(status)) return
    status = next
    for (const listener of listeners) listener(status)
  }

  /** The sooner of two appointments wins; a round that starts makes its own next one. */
  function schedule(milliseconds: number) {
    const at = surroundings.now() + milliseconds
    if (!isStarted || at >= timerAt) return
    clearTimeout(timer)
    timerAt = at
    timer = setTimeout(() => {
      // The appointment is kept: what is scheduled from here on is a new one, also while an earlier round still runs.
      timerAt = Infinity
      void run()
    }, milliseconds)
  }

  function unschedule() {
    clearTimeout(timer)
    timerAt = Infinity
  }

  /** One round at a time; whoever asks while one runs gets another one after it, for what that one was too early to see. */
  function run(): Promise<void> {
    if (running) {
      isAskedAgain = true
      return running
    }
    running = round().finally(() => {
      running = null
      if (isAskedAgain) schedule(0)
      isAskedAgain = false
    })
    return running
  }

  async function round(): Promise<void> {
    unschedule()
    const outcomes: RoundOutcome[] = []
    stopRound = new AbortController()
    const { signal } = stopRound
    try {
      const mayRun = await withLock(`sync:${store.db.name}`, async () => {
        tell({ isSending: (await whatWaits(store)).pending > 0 })
        const context: SyncContext = { store, transport, signal, phone: await (options.phone ?? phoneId)(), label, batchSize, onPage: notePage }
        outcomes.push(await syncRound(context))
        batchSize = context.batchSize
      })
      if (!mayRun) return schedule(POLL_MILLISECONDS)
    }
    catch (error) {
      // The phone's own storage failed: nothing was settled, all is still in the outbox, and the next round tries again.
      outcomes.push({ kind: 'busy', retryAfterSeconds: null })
      console.error('Sync round failed.', error)
    }
    finally {
      tell({ isSending: false })
    }
    for (const outcome of outcomes) await afterRound(outcome)
  }

  async function afterRound(outcome: RoundOutcome) {
    const network = networkAfter(outcome)
    tell({ network, ...(outcome.kind === 'done' ? { downloadProgress: null } : {}) })
    try {
      await noteNetwork(network)
      await watch(outcome)
    }
    catch (error) {
      // What the phone's storage would not take is only told again; the next round must be made all the same.
      console.error('The state of sending could not be noted.', error)
    }
    if (outcome.kind === 'done') {
      failures = 0
      if (isVisible()) schedule(POLL_MILLISECONDS)
      return
    }
    const ceiling = Math.min(BACKOFF_MOST_MILLISECONDS, BACKOFF_FIRST_MILLISECONDS * 2 ** failures)
    failures += 1
    const asked = outcome.kind === 'busy' && outcome.retryAfterSeconds !== null ? outcome.retryAfterSeconds * 1000 : 0
    schedule(Math.max(asked, random() * ceiling))
  }

  function networkAfter(outcome: RoundOutcome): NetworkState {
    switch (outcome.kind) {
      case 'done': return 'online'
      case 'signed-out': return 'signed-out'
      case 'not-ours': return 'no-connection'
      case 'busy': return 'server-unreachable'
      case 'no-answer': return outcome.why === 'stopped' ? status.network : isOnline() ? 'server-unreachable' : 'no-connection'
    }
  }

  async function noteNetwork(network: NetworkState) {
    if (await readMeta(store.db, 'network') !== network) await writeMeta(store.db, 'network', network)
  }

  /** The oldest operation has not moved for two minutes although somebody answers: say so, and start afresh. */
  async function watch(outcome: RoundOutcome) {
    const { oldestNumber } = await whatWaits(store)
    const now = surroundings.now()
    const answers = outcome.kind === 'done' || outcome.kind === 'busy'
    if (oldestNumber !== watched.n || !answers || !watched.isAnswered) watched = { n: oldestNumber, since: now, isAnswered: answers }
    const isStuck = oldestNumber !== null && answers && now - watched.since >= STUCK_AFTER_MILLISECONDS
    tell({ stuckSinceMilliseconds: isStuck ? watched.since : null })
    if (isStuck) batchSize = 1
  }

  function notePage(page: { to: number, more: boolean, rows: readonly unknown[] }) {
    const reached = (page.rows.at(-1) as { ver?: number } | undefined)?.ver ?? page.to
    tell({ downloadProgress: page.more && page.to > 0 ? Math.min(1, reached / page.to) : null })
  }

  function afterCommit() {
    schedule(COMMIT_DEBOUNCE_MILLISECONDS)
  }

  function comesBack() {
    if (!isVisible()) return
    failures = 0
    unschedule()
    schedule(0)
  }

  return {
    status: () => status,
    subscribe(listener) {
      listeners.add(listener)
      listener(status)
      return () => { listeners.delete(listener) }
    },
    start() {
      if (isStarted) return
      isStarted = true
      store.committed.add(afterCommit)
      if (typeof window !== 'undefined') {
        window.addEventListener('online', comesBack)
        window.addEventListener('pageshow', comesBack)
        document.addEventListener('visibilitychange', comesBack)
      }
      schedule(0)
    },
    stop() {
      isStarted = false
      unschedule()
      stopRound?.abort()
      store.committed.delete(afterCommit)
      if (typeof window !== 'undefined') {
        window.removeEventListener('online', comesBack)
        window.removeEventListener('pageshow', comesBack)
        document.removeEventListener('visibilitychange', comesBack)
      }
    },
    async sendNow() {
      failures = 0
      await running
      await offerAgain(store)
      await run()
    },
  }
}

async function withBrowserLock(name: string, work: () => Promise<void>): Promise<boolean> {
  // Without a secure context there are no locks; then every tab sends, which is harmless.
  if (typeof navigator === 'undefined' || !navigator.locks) {
    await work()
    return true
  }
  return navigator.locks.request(name, { ifAvailable: true }, async (lock) => {
    if (!lock) return false
    await work()
    return true
  })
}
