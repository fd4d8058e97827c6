import { createHash } from 'node:crypto'
import * as z from 'zod'
import { HLC_ZERO } from '#shared/sync/hlc'
import { looseOperationSchema, operationSchema, SCHEMA_VERSION, type LooseOperation, type Operation } from '#shared/sync/operations'
import { Refusal } from './refusal'
import { MAX_DEPTH, MAX_TEXT, shapeOf } from './json-shape'
import { storable } from './storable'
import { operationHash } from './write-ledger'

/** Beyond this nobody's program nests; what is deeper cannot be written down again. */
const UNWRITABLE_DEPTH = 200

export type Unread = { outcome: 'held', reason: 'malformed' | 'error', detail: string | null } | { outcome: 'parked', reason: 'newer-schema', detail: null }

/** An operation as it came from a phone: whole, or kept as it is with the reason why it cannot be read. */
export interface Received {
  loose: LooseOperation
  /** As it goes into the ledger, less names and contacts. */
  body: Record<string, unknown>
  personal: Record<string, string> | null
  hash: string
  operation: Operation | null
  unread: Unread | null
}

const numberedSchema = z.looseObject({ n: z.int().min(1) })

/**
 * Reads one operation of a batch. Whatever carries a number can be received and answered (PUSH1); the rest of the batch does
 * not depend on it (PUSH5).
 *
 * @throws Refusal 422 when there is no number to answer to, or nothing that could be written down: the phone finds it by halving
 */
export function readOperation(raw: unknown): Received {
  const numbered = numberedSchema.safeParse(raw)
  const { depth, longestText, isStorable } = shapeOf(raw)
  if (!numbered.success || depth > UNWRITABLE_DEPTH) throw new Refusal('invalid-request', 422, { issues: [{ path: 'ops', message: 'An operation cannot be received.' }] })

  const kept = isStorable ? numbered.data : storable(numbered.data)
  const hash = operationHash(kept)
  const parts = partsOf(kept)
  if (depth <= MAX_DEPTH && longestText <= MAX_TEXT) {
    const whole = operationSchema.safeParse(kept)
    if (whole.success && whole.data.sv <= SCHEMA_VERSION) return { loose: whole.data, ...parts, hash, operation: whole.data, unread: null }
  }
  return { ...parts, hash, operation: null, ...readLoosely(kept, hash, depth, longestText) }
}

/** Why an operation cannot be applied, and what can be said of it all the same. */
function readLoosely(kept: z.infer<typeof numberedSchema>, hash: string, depth: number, longestText: number): { loose: LooseOperation, unread: Unread } {
  const asLoose = looseOperationSchema.safeParse(kept)
  if (!asLoose.success) return { loose: standIn(kept, hash), unread: malformed(messageOf(asLoose.error)) }
  const loose = asLoose.data
  if (depth > MAX_DEPTH) return { loose, unread: malformed(`Nested deeper than ${MAX_DEPTH}.`) }
  if (longestText > MAX_TEXT) return { loose, unread: malformed(`A text is longer than ${MAX_TEXT} characters.`) }
  if (loose.sv > SCHEMA_VERSION) return { loose, unread: { outcome: 'parked', reason: 'newer-schema', detail: null } }
  const whole = operationSchema.safeParse(loose)
  return { loose, unread: malformed(whole.success ? '' : messageOf(whole.error)) }
}

/** The same operation as text, for one that the database would not take in its own shape. */
export function asText(received: Received): Received {
  return { ...received, body: { at: received.loose.at, text: JSON.stringify(received.body) }, operation: null, unread: { outcome: 'held', reason: 'error', detail: null } }
}

function malformed(detail: string): Unread {
  return { outcome: 'held', reason: 'malformed', detail }
}

function partsOf(raw: Record<string, unknown>): { body: Record<string, unknown>, personal: Record<string, string> | null } {
  const { personal, ...body } = raw
  const isPlain = personal !== null && typeof personal === 'object' && !Array.isArray(personal)
  return { body, personal: isPlain ? personal as Record<string, string> : null }
}

/** What the ledger needs, for an operation without it. The id is made from the content, so that the same one sent again is known. */
function standIn(raw: z.infer<typeof numberedSchema>, hash: string): LooseOperation {
  const named = looseOperationSchema.shape
  const id = named.id.safeParse(raw.id)
  const sv = named.sv.safeParse(raw.sv)
  const hlc = named.hlc.safeParse(raw.hlc)
  return {
    ...raw,
    id: id.success ? id.data : idOf(`${hash} ${raw.n}`),
    sv: sv.success ? sv.data : 1,
    hlc: hlc.success ? hlc.data : HLC_ZERO,
    kind: typeof raw.kind === 'string' ? raw.kind.slice(0, 40) : '',
  }
}

/** A UUID of version 8 from a text's SHA-256. */
function idOf(text: string): string {
  const hex = createHash('sha256').update(text).digest('hex')
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}

function messageOf(error: z.ZodError): string {
  return error.issues.slice(0, 5).map(issue => `${issue.path.map(String).join('.')}: ${issue.message}`).join('; ').slice(0, 1000)
}
