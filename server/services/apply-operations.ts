import { and, eq, sql } from 'drizzle-orm'
import { can, type Actor } from '#shared/access/policy'
import { RECORD_SCOPES, type RecordKind } from '#shared/records/kinds'
import { held, merge, rowKeysOf, type StepGuard } from '#shared/sync/merge'
import type { StampedOperation } from '#shared/sync/operations'
import type { Outcome } from '#shared/sync/outcomes'
import type { ObjectData, Row, RowChange, RowType, SetData } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { rowState } from '#server/database/tables/row-state'
import { grantScope } from '#server/database/tables/grant-scope'
import { heldScope, isSurvey } from './held-scope'
import { projectRows } from './project/project-rows'
import { loadStepCheck, type StepCheck } from './step-check'

export interface Applied { outcome: Outcome, reason: string | null, detail: string | null }

export interface ApplyContext {
  actor: Actor
  /** The version that everything written here carries; the organisation's counter is held by the caller. */
  ver: number
  /** The instant of receipt. */
  receivedAt: string
}

/**
 * Applies operations in their order: merges each into the rows, stamps them with one version, and keeps grants and
 * projections in step. The organisation's counter row must be locked by the same transaction.
 *
 * @returns one answer an operation, in the same order; none of them stops the others (PUSH5)
 */
export async function applyOperations(tx: Transaction, context: ApplyContext, operations: readonly StampedOperation[]): Promise<Applied[]> {
  const organisation = context.actor.organisationId
  const rows = await loadRows(tx, organisation, operations)
  const crews = await loadGrants(tx, context.actor)
  const changed = new Map<string, RowChange>()
  const read = (t: RowType, id: string) => rows.get(`${t} ${id}`)
  const write = (row: RowChange) => {
    rows.set(`${row.t} ${row.id}`, row)
    changed.set(`${row.t} ${row.id}`, row)
    if (row.t === 'set' && row.data.set === 'crew' && row.data.element === context.actor.id) crews[row.data.isPresent ? 'add' : 'delete'](row.object)
  }
  const check = await loadStepCheck(tx, organisation, operations, rows)

  const answers: Applied[] = []
  for (const operation of operations) {
    const result = applyOne(operation, read, context, crews, check)
    for (const row of result.rows) write(row)
    answers.push({
      outcome: result.outcome,
      reason: result.reason,
      detail: result.outcome === 'held' ? result.detail : null,
    })
  }

  const writes = [...changed.values()]
  await storeRows(tx, organisation, writes, context.ver)
  await storeGrants(tx, organisation, writes, context.ver)
  await projectRows(tx, organisation, writes)
  return answers
}

function applyOne(operation: StampedOperation, read: (t: RowType, id: string) => RowChange | Row | undefined, context: ApplyContext, crews: Set<string>, check: StepCheck): ReturnType<typeof merge> {
  const organisation = context.actor.organisationId
  try {
    const refusal = refuseByRights(operation, read, context, crews)
    if (refusal) return held(operation, refusal, null, heldScope(operation, read, organisation))
    return merge(operation, read, organisation, stepGuard(context, read, crews, check))
  }
  catch (error) {
    // Only a fault of ours gets here: the operation is kept and shown, the others go on.
    console.error(`Operation ${operation.id} could not be merged: ${error instanceof Error ? error.message : String(error)}`)
    return held(operation, 'error', null, heldScope(operation, read, organisation))
  }
}

/** Rights at receipt: what the person may write now, whatever was allowed when it was written. */
function refuseByRights(operation: StampedOperation, read: (t: RowType, id: string) => RowChange | undefined, context: ApplyContext, crews: Set<string>): 'no-access' | 'not-allowed' | null {
  const target = read('obj', operation.object)
  // A step has its own guard; what names nothing known is for the merge to say.
  if (operation.kind === 'st.req' || (!target && operation.kind !== 'obj.new')) return null
  const isNew = operation.kind === 'obj.new' && !target
  const kind = isNew ? operation.body.type : (target!.data as unknown as ObjectData).type as RecordKind
  if (isNew && RECORD_SCOPES[kind] === 'survey' && kind !== 'survey' && !isSurvey(read('obj', operation.body.parent ?? ''))) return 'no-access'
  const scope = heldScope(operation, read, context.actor.organisationId)
  const action = { do: isNew ? 'create' : 'change', kind } as const
  if (can(context.actor, action, { isInCrew: scope === context.actor.organisationId ? undefined : crews.has(scope) })) return null
  return can(context.actor, action, { isInCrew: true }) ? 'no-access' : 'not-allowed'
}

function stepGuard(context: ApplyContext, read: (t: RowType, id: string) => RowChange | undefined, crews: Set<string>, check: StepCheck): StepGuard {
  return (operation, state) => {
    const scope = read('obj', operation.object)?.scope
    const subject = { state, isInCrew: scope !== undefined && crews.has(scope) }
    if (!can(context.actor, { do: 'step', transition: operation.body.transition }, subject)) return 'not-allowed'
    return check(operation, context.receivedAt)
  }
}

async function loadRows(tx: Transaction, organisation: string, operations: readonly StampedOperation[]): Promise<Map<string, RowChange>> {
  const keys = new Map<string, [RowType, string]>()
  const add = (t: RowType, id: string) => keys.set(`${t} ${id}`, [t, id])
  for (const operation of operations) {
    for (const [t, id] of rowKeysOf(operation)) add(t, id)
    if (operation.kind === 'obj.new' && operation.body.parent) add('obj', operation.body.parent)
  }
  if (keys.size === 0) return new Map()
  const types = [...keys.values()].map(([t]) => t)
  const ids = [...keys.values()].map(([, id]) => id)
  const found = await tx.execute<Row & { object: string }>(sql`
    select r.t, r.id, r.scope, r.object, r.ver::int as ver, r.gone, r.data
    from unnest(${sql.param(types)}::text[], ${sql.param(ids)}::text[]) as k(t, id)
    join row_state r on r.organisation = ${organisation} and r.t = k.t and r.id = k.id`)
  return new Map(found.rows.map(row => [`${row.t} ${row.id}`, row]))
}

/** Surveys whose crew the person is in; a reviewer sees every survey, see `scopesOf`. */
async function loadGrants(tx: Transaction, actor: Actor): Promise<Set<string>> {
  const grants = await tx.select({ scope: grantScope.scope }).from(grantScope)
    .where(and(eq(grantScope.organisation, actor.organisationId), eq(grantScope.person, actor.id), eq(grantScope.gone, false)))
  return new Set(grants.map(grant => grant.scope))
}

/** The crew of a survey is who may see it. */
async function storeGrants(tx: Transaction, organisation: string, rows: readonly RowChange[], ver: number): Promise<void> {
  const grants = grantsOf(rows).map(({ person, scope, gone }) => ({ organisation, person, scope, ver, gone }))
  if (grants.length === 0) return
  await tx.insert(grantScope).values(grants).onConflictDoUpdate({
    target: [grantScope.organisation, grantScope.person, grantScope.scope], set: { ver, gone: sql`excluded.gone` },
  })
}

/** Who may see which survey, as the rows of its crew say. */
export function grantsOf<R extends RowChange>(rows: readonly R[]): { person: string, scope: string, gone: boolean, row: R }[] {
  return rows.flatMap((row) => {
    const data = row.data as unknown as SetData
    return row.t === 'set' && data.set === 'crew' ? [{ person: data.element, scope: row.object, gone: !data.isPresent, row }] : []
  })
}

/** One statement for all rows, whatever their number. */
export async function storeRows(tx: Transaction, organisation: string, rows: readonly RowChange[], ver: number): Promise<void> {
  if (rows.length === 0) return
  await tx.execute(sql`
    insert into ${rowState} (organisation, t, id, scope, object, ver, gone, data)
    select ${organisation}::uuid, x.t, x.id, x.scope, x.object, ${ver}::bigint, x.gone, x.data
    from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as x(t text, id text, scope uuid, object uuid, gone boolean, data jsonb)
    on conflict (organisation, t, id) do update set scope = excluded.scope, object = excluded.object, ver = excluded.ver, gone = excluded.gone, data = excluded.data`)
}
