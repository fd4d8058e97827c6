import { formatHlc } from '#shared/sync/hlc'
import type { Actor } from '#shared/access/policy'
import type { SaidBy } from '#shared/records/sheet-event'
import { SCHEMA_VERSION, type OperationKind, type OperationOf, type StampedOperation } from '#shared/sync/operations'
import type { Transaction } from '#server/database/client'
import { applyOperations, type Applied } from './apply-operations'
import { newId } from './new-id'
import { advanceCounter, lockCounter } from './stamp-version'
import { operationHash, writeLedger, type LedgerEntry } from './write-ledger'

/** The name under which the office's own changes stand in the ledger. */
export const OFFICE_DEVICE = 'office'

/** A change by the office; numbers and stamps are given here. */
export type OfficeDraft = {
  [K in OperationKind]: { kind: K, object: string, sheet: string | null, at?: string, body: OperationOf<K>['body'], by?: SaidBy | null, personal?: Record<string, string> | null, id?: string, zone?: string }
}[OperationKind]

/**
 * Applies changes of the office as operations, through the same ledger and the same merge as those of a phone.
 *
 * @returns one answer a draft, in the same order, and the version they carry
 */
export async function applyOffice(tx: Transaction, actor: Actor, drafts: readonly OfficeDraft[], now: Date): Promise<{ ver: number, answers: Applied[] }> {
  const organisation = actor.organisationId
  const stamp = await lockCounter(tx, organisation)
  const receivedAt = now.toISOString()
  const operations = drafts.map((draft, index) => {
    const stampText = formatHlc(now.getTime(), Math.min(index, 0xFFFF))
    return {
      id: draft.id ?? newId(), n: stamp.officeN + index + 1, hlc: stampText, hlcEffective: stampText, sv: SCHEMA_VERSION,
      kind: draft.kind, object: draft.object, sheet: draft.sheet, at: draft.at ?? receivedAt, enteredAt: receivedAt, zone: draft.zone ?? 'UTC',
      mono: null, offset: 0, by: draft.by ?? null, personal: draft.personal ?? null, body: draft.body,
      dev: OFFICE_DEVICE, author: actor.id, isWaiting: false,
    } as StampedOperation
  })
  const answers = await applyOperations(tx, { actor, ver: stamp.ver, receivedAt }, operations)
  await writeLedger(tx, organisation, stamp.ver, operations.map((operation, index) => entryOf(operation, answers[index]!, receivedAt)))
  await advanceCounter(tx, organisation, stamp.ver, drafts.length)
  return { ver: stamp.ver, answers }
}

function entryOf(operation: StampedOperation, answer: Applied, receivedAt: string): LedgerEntry {
  const { hlcEffective, dev, author, isWaiting: _isWaiting, personal, ...body } = operation
  return {
    id: operation.id, dev, phone: OFFICE_DEVICE, n: operation.n, author, sv: operation.sv, kind: operation.kind, object: operation.object, sheet: operation.sheet,
    hlcClaimed: operation.hlc, hlcEffective, body, bodyHash: operationHash(body), personal, claimedId: null, receivedAt, ...answer,
  }
}
