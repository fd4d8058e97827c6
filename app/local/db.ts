import Dexie, { type Table } from 'dexie'
import type { Operation } from '#shared/sync/operations'
import type { Row } from '#shared/sync/rows'

/** An operation that waits on this phone. It is written once and never changed; only what became of sending it is noted beside it. */
export interface OutboxEntry {
  n: number
  id: string
  sheet: string | null
  /** `kept`: the server answered with something this version does not know, or could not read it. It stays and is shown. */
  state: 'new' | 'kept'
  reason: string | null
  op: Operation
}

/** An operation that the server has received durably. Kept until the server says it is backed up. */
export interface AcknowledgedEntry {
  n: number
  id: string
  sheet: string | null
  /** This person on this phone, as it was sent. */
  dev: string
  /** The organisation's version at the answer: until the phone has pulled this far, the operation is still laid over. */
  ver: number
  outcome: string
  reason: string | null
  /** 1 while a person should look at it: held, parked or refused, and not seen yet. */
  needsYou: 0 | 1
  acknowledgedAt: string
  op: Operation
}

/** Text that is typed and not an operation yet. */
export interface Draft { key: string, text: string, changedAt: string }

/** How far this phone has pulled. */
export interface Cursor {
  epoch: string | null
  ver: number
  /** Scopes that are here whole. */
  scopes: string[]
  /** A pull that was cut off between two pages goes on here. */
  paging: { ver: number, to: number, after: string | null, plus: string[] } | null
  /** The first pull came to its end once. */
  isComplete: boolean
}

/** Raised with every change of the rows; another generation means that rows may have gone and all are read anew. */
export interface RowsRevision { generation: number, counter: number }

export interface MetaValues {
  dev: string
  n: number
  hlc: string
  cursor: Cursor
  rowsRevision: RowsRevision
  /** Operations up to this n are backed up by the server. */
  stable: number
  lastOkAt: string
  /** Server minus phone at the last contact, ms. */
  offset: number
  network: NetworkState
}
export type NetworkState = 'online' | 'no-connection' | 'server-unreachable' | 'signed-out'
export interface MetaEntry { k: keyof MetaValues, value: unknown }

export const EMPTY_CURSOR: Cursor = { epoch: null, ver: 0, scopes: [], paging: null, isComplete: false }

/**
 * What one person has on this phone. One database a person: work is never mixed on a shared phone.
 * Strict durability: "saved" means that it survives a power cut.
 */
export class FieldDatabase extends Dexie {
  declare meta: Table<MetaEntry, string>
  declare rows: Table<Row, [string, string]>
  declare outbox: Table<OutboxEntry, number>
  declare acked: Table<AcknowledgedEntry, number>
  declare drafts: Table<Draft, string>

  constructor(organisationId: string, userId: string) {
    super(fieldDatabaseName(organisationId, userId), { chromeTransactionDurability: 'strict' })
    this.version(1).stores({
      meta: '&k',
      rows: '&[t+id], object, scope, ver',
      outbox: '&n, id, sheet, state',
      acked: '&n, id, sheet, ver, needsYou',
      drafts: '&key',
    })
  }
}

export function fieldDatabaseName(organisationId: string, userId: string): string {
  return `f:${organisationId}:${userId}`
}

export async function readMeta<K extends keyof MetaValues>(db: FieldDatabase, key: K): Promise<MetaValues[K] | undefined> {
  return (await db.meta.get(key))?.value as MetaValues[K] | undefined
}

export async function writeMeta<K extends keyof MetaValues>(db: FieldDatabase, key: K, value: MetaValues[K]): Promise<void> {
  await db.meta.put({ k: key, value })
}

/** The name of this person on this phone, made at its first use; call it inside a transaction that may write `meta`. */
export async function deviceName(db: FieldDatabase, newId: () => string): Promise<string> {
  const known = await readMeta(db, 'dev')
  if (known) return known
  const dev = `d_${newId()}`
  await writeMeta(db, 'dev', dev)
  return dev
}
