import { isOpenForField } from '#shared/access/policy'
import { exportUnsent } from '~/local/export-unsent'
import { markSeen as writeSeen } from '~/local/outbox'
import type { Operation } from '#shared/sync/operations'

/** A change on this phone that the office does not have in the record yet. */
export interface WaitingEntry {
  n: number
  id: string
  sheetId: string | null
  sheetNumber: string | null
  what: string
  at: string
  state: 'waiting' | 'sending' | 'needs-you'
  /** In words, for what needs somebody. */
  reason: string | null
  /** The code behind the words. */
  code: string | null
}

/** A sheet on which two phones gave fields different values, and nobody has chosen yet. */
export interface OpenConflicts { sheetId: string, name: string, fields: string[] }

/** What waits on this phone, oldest first, and what was received and not applied. */
export function useOutbox() {
  const session = useSessionStore()
  session.followPhone()
  const sync = useSyncStore()
  const { refusal } = useErrorText()

  const entries = computed<WaitingEntry[]>(() => {
    const { view } = session
    if (!view) return []
    const refused = new Map(view.refusals.map(entry => [entry.id, entry]))
    const waiting = view.outbox.filter(entry => !refused.has(entry.id)).map(entry => ({
      ...common(entry.n, entry.op), state: sync.isSending ? 'sending' as const : 'waiting' as const, reason: null, code: null,
    }))
    const needing = view.refusals.map(entry => ({
      ...common(entry.n, entry.op), state: 'needs-you' as const, reason: refusal(entry.outcome, entry.reason), code: entry.reason,
    }))
    return [...needing, ...waiting].sort((a, b) => a.n - b.n)
  })

  function common(n: number, op: Operation) {
    const sheetNumber = op.sheet === null ? null : session.sheets?.bundle(op.sheet)?.document.sheet.number ?? null
    return { n, id: op.id, sheetId: op.sheet, sheetNumber, what: operationWords(op), at: op.at }
  }

  const conflicts = computed<OpenConflicts[]>(() => (session.sheets?.source.sheets() ?? [])
    .filter(document => isOpenForField(document.standing.state))
    .map(document => ({
      sheetId: document.id,
      name: document.sheet.number ?? session.sheets?.bundle(document.id)?.worker?.code ?? document.sheet.areaName ?? 'Sheet without a number',
      fields: document.conflicts.filter(conflict => conflict.isOpen).map(conflict => fieldInWords(conflict.field)),
    }))
    .filter(({ fields }) => fields.length > 0))

  return {
    entries,
    conflicts,
    sendNow: () => sync.sendNow(),
    /** A copy of all of it as a file; the phone keeps its own. */
    async exportCopy(): Promise<Blob> {
      if (!session.fieldStore) throw new Error('Nobody is signed in on this phone.')
      return exportUnsent(session.fieldStore)
    },
    /** The person has read why a change was not taken; it stays kept and asks no more. */
    async markSeen(id: string): Promise<void> {
      if (session.fieldStore) await writeSeen(session.fieldStore, id)
    },
  }
}
