import type { FieldStore } from './field-store'
import { pruneAcknowledged } from './outbox'
import { pullRows } from './pull'
import { pushOutbox } from './push'
import type { Transport } from './transport'

export interface SyncContext {
  store: FieldStore
  transport: Transport
  signal: AbortSignal
  /** The phone's own id and what it calls itself. */
  phone: string
  label: string
  /** How many operations the last batch that went through had; smaller on a slow connection. */
  batchSize?: number
  onPage?: (page: { to: number, rows: readonly unknown[], more: boolean }) => void
}

export type RoundOutcome
  = | { kind: 'done' }
    | { kind: 'signed-out' }
    | { kind: 'not-ours' }
    | { kind: 'busy', retryAfterSeconds: number | null }
    | { kind: 'no-answer', why: 'network' | 'timeout' | 'stopped' }

/** One round: send what waits, then fetch what is new. */
export async function syncRound(context: SyncContext): Promise<RoundOutcome> {
  const pushed = await pushOutbox(context)
  // A server that refuses a batch may still answer a pull, but a phone that cannot send has no business waiting twice.
  if (pushed.kind !== 'done') return pushed
  const pulled = await pullRows(context)
  if (pulled.kind === 'done') await pruneAcknowledged(context.store)
  return pulled
}
