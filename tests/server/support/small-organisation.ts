import { randomUUID } from 'node:crypto'
import type { Actor } from '#shared/access/policy'
import type { Role } from '#shared/records/person'
import { formatHlc } from '#shared/sync/hlc'
import type { OperationKind, OperationOf } from '#shared/sync/operations'
import { PROTOCOL_VERSION, type PullResponse, type PushResponse } from '#shared/sync/protocol'
import type { Row } from '#shared/sync/rows'
import type { Database, Transaction } from '#server/database/client'
import { inOrganisation } from '#server/database/with-organisation'
import { applyOffice } from '#server/services/apply-office'
import { collectPull } from '#server/services/collect-pull'
import { createOrganisation } from '#server/services/create-organisation'
import { receivePush } from '#server/services/receive-push'

/** An organisation with one survey, a technician in its crew, one outside it, and a reviewer; nobody needs a password. */
export interface SmallOrganisation {
  id: string
  surveyId: string
  technician: Actor
  outsider: Actor
  reviewer: Actor
  run: <T>(work: (tx: Transaction) => Promise<T>) => Promise<T>
  read: <T>(work: (tx: Transaction) => Promise<T>) => Promise<T>
}

export async function aSmallOrganisation(database: Database, name: string): Promise<SmallOrganisation> {
  const id = randomUUID()
  const surveyId = randomUUID()
  const person = (...roles: Role[]): Actor => ({ id: randomUUID(), organisationId: id, roles })
  const technician = person('technician')
  const outsider = person('technician')
  const reviewer = person('reviewer', 'administrator')
  const siteId = randomUUID()
  const run: SmallOrganisation['run'] = work => inOrganisation(database, id, work)
  await run(async (tx) => {
    await createOrganisation(tx, { id, name }, new Date())
    const { answers } = await applyOffice(tx, reviewer, [
      { kind: 'obj.new', object: technician.id, sheet: null, body: { type: 'person', parent: null, initial: { name: 'Tess', roles: ['technician'] } } },
      { kind: 'obj.new', object: siteId, sheet: null, body: { type: 'site', parent: null, initial: { name: 'Foundry', zone: 'Europe/Dublin' } } },
      { kind: 'obj.new', object: surveyId, sheet: null, body: { type: 'survey', parent: null, initial: { title: 'Dust', siteId, startsOn: '2026-03-02', endsOn: '2026-03-06', zone: 'Europe/Dublin' } } },
      { kind: 'set.add', object: surveyId, sheet: null, body: { set: 'crew', element: technician.id, meta: {} } },
    ], new Date())
    if (answers.some(answer => answer.outcome !== 'ok')) throw new Error(`The organisation of the test is not whole: ${JSON.stringify(answers)}`)
  })
  return { id, surveyId, technician, outsider, reviewer, run, read: work => inOrganisation(database, id, work, { readOnly: true }) }
}

/** A person's phone as the server sees it: gives numbers and stamps, sends, and pulls into a map of rows. */
export class TestPhone {
  n = 0
  /** How many sheets this phone made. */
  sheets = 0
  clock = Date.now()
  readonly rows = new Map<string, Row>()
  scopes: string[] = []
  cursor = 0
  epoch: string | undefined

  constructor(readonly organisation: SmallOrganisation, readonly actor: Actor, readonly dev = `d_${randomUUID().slice(0, 8)}`) {}

  operation<K extends OperationKind>(kind: K, object: string, body: OperationOf<K>['body'], more: Record<string, unknown> = {}): OperationOf<K> {
    this.n++
    this.clock += 1
    const at = new Date(this.clock).toISOString()
    return {
      id: randomUUID(), n: this.n, hlc: formatHlc(this.clock, 0), sv: 1, kind, object, sheet: object, at, enteredAt: at, zone: 'Europe/Dublin',
      mono: null, offset: 0, by: null, personal: null, ...more, body,
    } as unknown as OperationOf<K>
  }

  newSheet(initial: Record<string, unknown> = {}, object: string = randomUUID()): OperationOf<'obj.new'> {
    this.sheets++
    return this.operation('obj.new', object, { type: 'sheet', parent: this.organisation.surveyId, initial })
  }

  set(object: string, key: string, value: unknown, base: string | null = null): OperationOf<'reg.set'> {
    return this.operation('reg.set', object, { key, value, base, resolves: false })
  }

  note(object: string, text: string): OperationOf<'ev.add'> {
    return this.operation('ev.add', object, { type: 'note', data: { text }, corrects: null, reason: null })
  }

  step(object: string, transition: OperationOf<'st.req'>['body']['transition'], expect: number, fit: boolean | null, reason: string | null = null): OperationOf<'st.req'> {
    return this.operation('st.req', object, { transition, expect, fit, reason })
  }

  push(ops: readonly unknown[], more: Record<string, unknown> = {}): Promise<PushResponse> {
    return receivePush(this.organisation.run, this.actor, {
      v: PROTOCOL_VERSION, dev: this.dev, phone: 'p_1', label: 'Test phone', epoch: null, sv: 1, pending: ops.length, oldest: null, blobs: 0,
      cursor: this.cursor, now: new Date().toISOString(), ...more, ops: [...ops],
    }, new Date())
  }

  page(query: Record<string, unknown> = {}): Promise<PullResponse> {
    return this.organisation.read(tx => collectPull(tx, this.actor, { ver: this.cursor, limit: 500, have: this.scopes.join(','), epoch: this.epoch, ...query }, new Date()))
  }

  /** Pulls until there is no more, as a phone does; returns the number of pages. */
  async pull(limit = 500, between: (page: number) => Promise<void> = async () => {}): Promise<number> {
    const gained = new Set<string>()
    let after: string | undefined
    let to: number | undefined
    for (let pages = 1; ; pages++) {
      const page = await this.page({ limit, ...(after ? { after } : {}), ...(to === undefined ? {} : { to }) })
      for (const scope of page.scopes['+']) gained.add(scope)
      for (const scope of page.scopes['-']) {
        this.scopes = this.scopes.filter(known => known !== scope)
        for (const [key, row] of this.rows) if (row.scope === scope) this.rows.delete(key)
      }
      for (const row of page.rows) this.rows.set(`${row.t} ${row.id}`, row)
      this.epoch = page.epoch
      if (!page.more) {
        this.cursor = Math.max(this.cursor, page.next.ver)
        this.scopes = [...new Set([...this.scopes, ...gained])]
        return pages
      }
      after = page.next.after ?? undefined
      to = page.to
      await between(pages)
    }
  }
}

/** Outcome and reason by number. */
export function answersOf(response: PushResponse): Record<number, string> {
  return Object.fromEntries(response.res.map(([n, outcome, reason]) => [n, reason === null ? outcome : `${outcome} ${reason}`]))
}
