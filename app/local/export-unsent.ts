import { PROTOCOL_VERSION } from '#shared/sync/protocol'
import { readMeta } from './db'
import { phoneId } from './device'
import type { FieldStore } from './field-store'
import { instantOf } from './surroundings'

/**
 * A copy of everything that waits on this phone, and of what was received and not applied, as a JSON file: the last
 * resort when sending does not work. The operations are word for word what would have been sent. The phone keeps its own.
 */
export async function exportUnsent(store: FieldStore): Promise<Blob> {
  const { db, person, surroundings } = store
  const content = {
    format: 'lapel-unsent',
    v: PROTOCOL_VERSION,
    exportedAt: instantOf(surroundings.now()),
    organisationId: person.organisationId,
    person: { id: person.id, name: person.name },
    phone: await phoneId(),
    dev: await readMeta(db, 'dev') ?? null,
    operations: (await db.outbox.orderBy('n').toArray()).map(entry => entry.op),
    notApplied: (await db.acked.where('needsYou').equals(1).sortBy('n')).map(({ op, outcome, reason }) => ({ op, outcome, reason })),
    drafts: (await db.drafts.toArray()).map(({ key, text, changedAt }) => ({ key, text, changedAt })),
  }
  return new Blob([JSON.stringify(content, null, 2)], { type: 'application/json' })
}
