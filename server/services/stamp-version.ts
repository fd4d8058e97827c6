import { eq, sql } from 'drizzle-orm'
import type { Transaction } from '#server/database/client'
import { orgClock } from '#server/database/tables/org-clock'

export interface Stamp { ver: number, epoch: string, officeN: number }

/**
 * Takes the organisation's counter for the rest of the transaction and gives its next version. Whoever writes rows holds
 * it until commit: that is what makes a pull complete (PULL1).
 */
export async function lockCounter(tx: Transaction, organisation: string): Promise<Stamp> {
  const [clock] = await tx.select().from(orgClock).where(eq(orgClock.organisation, organisation)).for('update')
  if (!clock) throw new Error(`lockCounter: no counter for organisation ${organisation}`)
  return { ver: clock.v + 1, epoch: clock.epoch, officeN: clock.officeN }
}

/** Writes the version that was taken; `officeOperations` counts the office's own numbers on. */
export async function advanceCounter(tx: Transaction, organisation: string, ver: number, officeOperations = 0): Promise<void> {
  await tx.update(orgClock).set({ v: ver, officeN: sql`${orgClock.officeN} + ${officeOperations}` }).where(eq(orgClock.organisation, organisation))
}
