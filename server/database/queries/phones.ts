import { desc, eq } from 'drizzle-orm'
import type { Transaction } from '#server/database/client'
import { device } from '#server/database/tables/device'

/** Every person on every phone that was ever heard of, the latest first. */
export async function phonesOf(tx: Transaction, organisation: string): Promise<(typeof device.$inferSelect)[]> {
  return tx.select().from(device).where(eq(device.organisation, organisation)).orderBy(desc(device.lastSeenAt), device.dev)
}
