import { can, type Actor } from '#shared/access/policy'
import type { Decision } from '#shared/records/office-views'
import type { Transaction } from '#server/database/client'
import { sheetStanding } from '#server/database/queries/sheet-standing'
import { applyOffice } from './apply-office'
import { Refusal } from './refusal'

/**
 * Takes a step in a sheet's life as the reviewer decided it, on the revision that was shown.
 *
 * @throws Refusal `not-found` for a sheet that is not there, `not-allowed` for somebody without the right, and the merge's own
 *   reasons when the sheet moved on or a finding stands against it
 */
export async function decideSheet(tx: Transaction, actor: Actor, sheetId: string, decision: Decision, now: Date): Promise<{ ver: number, revision: number }> {
  if (!can(actor, { do: 'see-office' })) throw new Refusal('not-allowed', 403)
  const standing = await sheetStanding(tx, actor.organisationId, sheetId)
  if (!standing) throw new Refusal('not-found', 404)
  const { ver, answers } = await applyOffice(tx, actor, [{
    kind: 'st.req', object: sheetId, sheet: sheetId, zone: standing.zone,
    body: { transition: decision.transition, expect: decision.expect, fit: decision.fit, reason: decision.reason },
  }], now)
  const answer = answers[0]!
  if (answer.outcome !== 'ok') throw new Refusal(answer.reason ?? answer.outcome, answer.reason === 'not-allowed' ? 403 : 409)
  return { ver, revision: decision.expect + 1 }
}
