import { writeMeta } from './db'
import type { FieldStore } from './field-store'
import { instantOf } from './surroundings'

/**
 * Notes that the server answered, and how far this phone's clock is from the server's: the server's time is taken to be
 * that of the middle of the round trip. Raw times are never rewritten with it; it is stamped beside them.
 */
export async function noteContact({ db, surroundings }: FieldStore, contact: { serverTime: string, sentAt: number, roundTripMilliseconds: number }): Promise<void> {
  const offset = clockOffset(contact)
  await db.transaction('rw', db.meta, async () => {
    await writeMeta(db, 'lastOkAt', instantOf(surroundings.now()))
    await writeMeta(db, 'offset', offset)
  })
}

/** Server minus phone, ms. */
export function clockOffset({ serverTime, sentAt, roundTripMilliseconds }: { serverTime: string, sentAt: number, roundTripMilliseconds: number }): number {
  return Math.round(Date.parse(serverTime) - (sentAt + roundTripMilliseconds / 2))
}
