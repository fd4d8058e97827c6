import { and, eq, lte } from 'drizzle-orm'
import type { Actor } from '#shared/access/policy'
import type { Transaction } from '#server/database/client'
import { grantScope } from '#server/database/tables/grant-scope'
import { surveys } from '#server/database/tables/surveys'

/**
 * What a person may see: the organisation's own records, and the surveys of its crew; the office sees every survey.
 *
 * @param upTo version up to which a grant counts: one that came while a pull is under way waits for the next pull, because
 *   the pages so far did not hold its rows
 */
export async function scopesOf(tx: Transaction, actor: Actor, upTo: number): Promise<string[]> {
  const organisation = actor.organisationId
  const isOffice = actor.roles.includes('reviewer') || actor.roles.includes('administrator')
  const found = isOffice
    ? await tx.select({ scope: surveys.id }).from(surveys).where(eq(surveys.organisation, organisation))
    : await tx.select({ scope: grantScope.scope }).from(grantScope)
        .where(and(eq(grantScope.organisation, organisation), eq(grantScope.person, actor.id), eq(grantScope.gone, false), lte(grantScope.ver, upTo)))
  return [organisation, ...found.map(row => row.scope)]
}
