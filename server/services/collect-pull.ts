import { and, eq, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/policy'
import { PROTOCOL_VERSION, type PullQuery, type PullResponse } from '#shared/sync/protocol'
import type { Row } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { device } from '#server/database/tables/device'
import { orgClock } from '#server/database/tables/org-clock'
import { scopesOf } from './scopes'

/** The phone holds rows of another life of this database: keep the outbox, drop the rows, pull from 0 (PULL5). */
export class OtherEpoch extends Error {
  constructor(readonly epoch: string) { super('The database was rebuilt.') }
}

/**
 * One page of what a phone has not seen: rows of its scopes beyond its cursor, and scopes that came or went. Must run in a
 * repeatable-read transaction: the upper bound is read first, in the same snapshot as the rows.
 */
export async function collectPull(tx: Transaction, actor: Actor, query: PullQuery, now: Date): Promise<PullResponse> {
  const organisation = actor.organisationId
  const [clock] = await tx.select().from(orgClock).where(eq(orgClock.organisation, organisation))
  if (!clock) throw new Error(`collectPull: no counter for organisation ${organisation}`)
  if (query.epoch !== undefined && query.epoch !== '' && query.epoch !== clock.epoch) throw new OtherEpoch(clock.epoch)

  const to = Math.min(query.to ?? clock.v, clock.v)
  const mine = await scopesOf(tx, actor, to)
  const have = query.have === undefined || query.have === '' ? [] : query.have.split(',')
  const gained = mine.filter(scope => !have.includes(scope))
  const lost = have.filter(scope => !mine.includes(scope))
  const after = parseAfter(query.after)

  // A scope that the phone does not hold yet starts at 0, the others at its cursor (PULL4); one query a scope, so that the index gives the order.
  const pages: Row[][] = []
  for (const scope of mine) pages.push(await pageOfScope(tx, organisation, scope, gained.includes(scope) ? 0 : query.ver, to, after, query.limit))
  const rows = pages.flat().sort(byFeed).slice(0, query.limit)
  const more = pages.some(page => page.length === query.limit) || pages.reduce((sum, page) => sum + page.length, 0) > query.limit
  const last = rows.at(-1)
  return {
    v: PROTOCOL_VERSION, time: now.toISOString(), epoch: clock.epoch, to, rows,
    scopes: { '+': gained, '-': lost },
    next: more && last ? { ver: query.ver, after: afterOf(last) } : { ver: to, after: null },
    more,
  }
}

interface After { ver: number, t: string, id: string }

async function pageOfScope(tx: Transaction, organisation: string, scope: string, from: number, to: number, after: After | null, limit: number): Promise<Row[]> {
  const found = await tx.execute<Row & { ver: string | number }>(sql`
    select t, id, scope, object, ver, gone, data from row_state
    where organisation = ${organisation} and scope = ${scope} and ver > ${from} and ver <= ${to}
      ${after ? sql`and (ver, t, id) > (${after.ver}, ${after.t}, ${after.id})` : sql``}
    order by ver, t, id limit ${limit}`)
  return found.rows.map(row => ({ ...row, ver: Number(row.ver) }))
}

function byFeed(a: Row, b: Row): number {
  return a.ver - b.ver || compare(a.t, b.t) || compare(a.id, b.id)
}

const compare = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0)

function afterOf(row: Row): string {
  return `${row.ver},${row.t},${row.id}`
}

function parseAfter(text: string | undefined): After | null {
  if (!text) return null
  const match = /^(\d{1,15}),([a-z]+),(.+)$/.exec(text)
  return match ? { ver: Number(match[1]), t: match[2]!, id: match[3]! } : null
}

/** A pull is a sign of life too; it runs after the read-only page, in a transaction of its own. */
export async function noteSeen(tx: Transaction, actor: Actor, dev: string, now: Date): Promise<void> {
  await tx.update(device).set({ lastSeenAt: now.toISOString() })
    .where(and(eq(device.organisation, actor.organisationId), eq(device.dev, dev), eq(device.person, actor.id)))
}
