import { eq } from 'drizzle-orm'
import type { Transaction } from '#server/database/client'
import { orgClock } from '#server/database/tables/org-clock'

/** The version of the organisation's last change, and the life of the database that it belongs to. */
export async function organisationVersion(tx: Transaction, organisation: string): Promise<{ ver: number, epoch: string }> {
  const [clock] = await tx.select().from(orgClock).where(eq(orgClock.organisation, organisation))
  if (!clock) throw new Error(`organisationVersion: no counter for organisation ${organisation}`)
  return { ver: clock.v, epoch: clock.epoch }
}
