import type { Actor } from '#shared/access/policy'
import type { PhoneView } from '#shared/records/office-views'
import type { Transaction } from '#server/database/client'
import { peopleNames } from '#server/database/queries/people-names'
import { phonesOf } from '#server/database/queries/phones'

/** Who still owes what since when, as the phones last said, the latest first. */
export async function listPhones(tx: Transaction, actor: Actor): Promise<PhoneView[]> {
  const names = await peopleNames(tx, actor.organisationId)
  return (await phonesOf(tx, actor.organisationId)).map(phone => ({
    dev: phone.dev, phone: phone.phone, label: phone.label, personName: names.get(phone.person) ?? '', lastSeenAt: phone.lastSeenAt,
    pending: phone.pending, oldestAt: phone.oldestAt, clockOffsetMilliseconds: phone.clockOffsetMilliseconds,
    lastNumber: phone.maxN, missingNumbers: Math.max(0, phone.maxN - phone.received),
  }))
}
