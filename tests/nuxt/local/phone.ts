import { effectiveStamp, HLC_ZERO } from '#shared/sync/hlc'
import { merge } from '#shared/sync/merge'
import { operationSchema, type StampedOperation } from '#shared/sync/operations'
import { PROTOCOL_VERSION, type PushRequest, type PushResponse } from '#shared/sync/protocol'
import { canonicalJson } from '#shared/sync/same-value'
import type { Row, RowChange } from '#shared/sync/rows'
import type { SignedIn } from '#shared/records/office-views'
import { NoAnswer, type Answer, type PullRequest, type Transport } from '~/local/transport'
import { openFieldStore, type FieldStore } from '~/local/field-store'
import type { SyncContext } from '~/local/sync-round'
import { commit, type OperationDraft } from '~/local/commit'

export const ORGANISATION = '00000000-0000-4000-8000-00000000000a'
export const SURVEY = '00000000-0000-4000-8000-00000000000b'
export const PUMP = '00000000-0000-4000-8000-00000000000e'
export const CALIBRATOR = '00000000-0000-4000-8000-00000000000f'

let people = 0

export function aPerson(name = 'Ada Field'): SignedIn {
  people += 1
  return {
    id: `00000000-0000-4000-8000-${(0xABC000 + people).toString(16).padStart(12, '0')}`, organisationId: ORGANISATION, organisationName: 'Test organisation',
    name, email: `${people}@example.test`, roles: ['technician'],
  }
}

/** A phone with a clock of its own that a test can turn. */
export interface TestPhone { store: FieldStore, clock: { milliseconds: number, monotonic: number }, person: SignedIn }

export function aPhone(person: SignedIn = aPerson(), start = Date.parse('2026-03-03T07:00:00.000Z')): TestPhone {
  const clock = { milliseconds: start, monotonic: 1000 }
  let ids = 0
  const phoneNumber = phones += 1
  const store = openFieldStore(person, {
    now: () => clock.milliseconds, zone: () => 'Europe/Dublin', page: `page-${phoneNumber}`, monotonic: () => clock.monotonic,
    newId: () => `0192${(ids += 1).toString(16).padStart(4, '0')}-0000-7000-8000-${phoneNumber.toString(16).padStart(12, '0')}`,
  })
  return { store, clock, person }
}
let phones = 0

export async function forget(...list: TestPhone[]): Promise<void> {
  for (const { store } of list) await store.db.delete()
}

export const newSheet = (object: string, initial: Record<string, unknown> = {}): OperationDraft => (
  { kind: 'obj.new', object, sheet: object, body: { type: 'sheet', parent: SURVEY, initial } }
)
export const setTask = (sheet: string, value: string, base: string | null = null): OperationDraft => (
  { kind: 'reg.set', object: sheet, sheet, body: { key: 'task', value, base, resolves: false } }
)
export const reading = (sheet: string, litresPerMinute: number): OperationDraft => ({
  kind: 'ev.add', object: sheet, sheet,
  body: {
    type: 'flow-reading', corrects: null, reason: null,
    data: { when: 'before', pumpId: PUMP, calibratorId: CALIBRATOR, samplerInLine: 'Cassette', typed: `${litresPerMinute}`.replace('.', ','), unit: 'L/min', litresPerMinute },
  },
})

export async function startedSheet(phone: TestPhone, initial: Record<string, unknown> = {}): Promise<string> {
  const id = phone.store.surroundings.newId()
  await commit(phone.store, [newSheet(id, initial)])
  return id
}

/** What a test may make the network do with the next requests. */
export type Mishap = 'none' | 'no-network' | 'timeout' | 'reply-lost' | 'portal' | 'wrong-version' | 'signed-out' | 'too-large' | 'not-understood' | 'broken'

/**
 * A server of a few lines that keeps the promises of the rules: it receives, merges with the one merge, stamps versions from
 * one counter, and pages. It is a double of the real one for the phone's tests only.
 */
export class TestServer implements Transport {
  epoch = 'e1'
  ver = 0
  now = Date.parse('2026-03-03T07:00:00.000Z')
  rows = new Map<string, Row>()
  ledger = new Map<string, StampedOperation>()
  pushes: PushRequest[] = []
  pulls: PullRequest[] = []
  scopes = [ORGANISATION, SURVEY]
  mishaps: Mishap[] = []
  pageSize = 500
  /** Answers that a test puts in the place of the real ones, by operation id. */
  answers = new Map<string, [outcome: string, reason: string | null]>()
  fork = false
  private stamps = new Map<string, string>()

  constructor(private readonly author: (dev: string) => string = () => 'somebody') {}

  async push(request: PushRequest): Promise<Answer> {
    this.pushes.push(request)
    const mishap = this.mishaps.shift() ?? 'none'
    const early = this.answerOf(mishap, request.ops.length)
    if (early) return early
    if (request.epoch !== null && request.epoch !== this.epoch) return this.otherEpoch()
    const res: PushResponse['res'] = []
    const before = this.ver
    for (const loose of request.ops) {
      const operation = operationSchema.parse(loose)
      const given = this.answers.get(operation.id)
      if (given) {
        res.push([operation.n, ...given])
        continue
      }
      if (this.ledger.has(operation.id)) {
        res.push([operation.n, 'dup', null])
        continue
      }
      const hlcEffective = effectiveStamp(operation.hlc, this.now, this.stamps.get(request.dev) ?? HLC_ZERO)
      this.stamps.set(request.dev, hlcEffective)
      const stamped: StampedOperation = { ...operation, hlcEffective, dev: request.dev, author: this.author(request.dev), isWaiting: false }
      this.ledger.set(operation.id, stamped)
      const result = merge(stamped, (t, id) => this.rows.get(`${t} ${id}`), ORGANISATION)
      if (result.rows.length > 0) this.put(result.rows, before + 1)
      res.push([operation.n, result.outcome, result.reason])
    }
    this.ver = Math.max(this.ver, ...[...this.rows.values()].map(row => row.ver))
    if (mishap === 'reply-lost') throw new NoAnswer('network')
    const response: PushResponse = { v: PROTOCOL_VERSION, time: new Date(this.now).toISOString(), epoch: this.epoch, ver: this.ver, stable: 0, fork: this.fork, res }
    this.fork = false
    return { status: 200, body: response, retryAfterSeconds: null }
  }

  async pull(request: PullRequest): Promise<Answer> {
    this.pulls.push(request)
    const early = this.answerOf(this.mishaps.shift() ?? 'none', 0)
    if (early) return early
    if (request.epoch !== undefined && request.epoch !== this.epoch) return this.otherEpoch()
    const have = request.have ? request.have.split(',') : []
    const gained = this.scopes.filter(scope => !have.includes(scope))
    const lost = have.filter(scope => !this.scopes.includes(scope))
    const to = Math.min(request.to ?? this.ver, this.ver)
    const keyOf = (row: { ver: number, t: string, id: string }) => `${String(row.ver).padStart(9, '0')},${row.t},${row.id}`
    const found = [...this.rows.values()]
      .filter(row => this.scopes.includes(row.scope) && row.ver <= to && row.ver > (gained.includes(row.scope) ? 0 : request.ver))
      .filter(row => !request.after || keyOf(row) > request.after)
      .sort((a, b) => (keyOf(a) < keyOf(b) ? -1 : 1))
    const rows = found.slice(0, this.pageSize)
    const more = found.length > rows.length
    return {
      status: 200, retryAfterSeconds: null,
      body: {
        v: PROTOCOL_VERSION, time: new Date(this.now).toISOString(), epoch: this.epoch, to, rows, scopes: { '+': gained, '-': lost },
        next: more ? { ver: request.ver, after: keyOf(rows.at(-1)!) } : { ver: to, after: null }, more,
      },
    }
  }

  /** Puts rows as if somebody else had written them. */
  put(rows: readonly RowChange[], ver = this.ver + 1): void {
    this.ver = ver
    for (const row of rows) this.rows.set(`${row.t} ${row.id}`, { ...row, ver })
  }

  text(): string {
    return canonicalJson([...this.rows.values()].map(({ ver: _ver, ...row }) => row).sort((a, b) => (`${a.t} ${a.id}` < `${b.t} ${b.id}` ? -1 : 1)))
  }

  private otherEpoch(): Answer {
    return { status: 409, retryAfterSeconds: null, body: { statusCode: 409, data: { code: 'other-epoch', epoch: this.epoch } } }
  }

  private answerOf(mishap: Mishap, operations: number): Answer | null {
    switch (mishap) {
      case 'no-network': throw new NoAnswer('network')
      case 'timeout': throw new NoAnswer('timeout')
      case 'portal': return { status: 200, body: undefined, retryAfterSeconds: null }
      case 'wrong-version': return { status: 200, body: { v: 99, rows: [], res: [] }, retryAfterSeconds: null }
      case 'signed-out': return { status: 401, body: { statusCode: 401, data: { code: 'signed-out' } }, retryAfterSeconds: null }
      case 'too-large': return operations > 0 ? { status: 413, body: undefined, retryAfterSeconds: null } : null
      case 'not-understood': return { status: 422, body: { statusCode: 422, data: { code: 'invalid-request' } }, retryAfterSeconds: null }
      case 'broken': return { status: 500, body: { statusCode: 500 }, retryAfterSeconds: null }
      default: return null
    }
  }
}

export function aContext(phone: TestPhone, server: Transport): SyncContext {
  return { store: phone.store, transport: server, signal: new AbortController().signal, phone: 'p_test', label: 'Test phone' }
}
