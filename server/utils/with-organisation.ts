import type { Transaction } from '#server/database/client'
import { inOrganisation } from '#server/database/with-organisation'
import { useDatabase } from './database'

/** The only way from a handler to an organisation's tables; the organisation comes from the session, never from the request. */
export function withOrganisation<T>(user: { organisationId: string }, work: (tx: Transaction) => Promise<T>): Promise<T> {
  return inOrganisation(useDatabase(), user.organisationId, work)
}

/** The same for reading: one snapshot for everything that is read. */
export function readOrganisation<T>(user: { organisationId: string }, work: (tx: Transaction) => Promise<T>): Promise<T> {
  return inOrganisation(useDatabase(), user.organisationId, work, { readOnly: true })
}
