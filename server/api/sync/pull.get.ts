import { pullQuerySchema } from '#shared/sync/protocol'
import { collectPull, noteSeen, OtherEpoch } from '#server/services/collect-pull'
import { defineHandler } from '../../utils/handler'
import { httpError } from '../../utils/http-error'
import { readValidQuery } from '../../utils/read-valid'
import { requireUser } from '../../utils/require-user'
import { readOrganisation, withOrganisation } from '../../utils/with-organisation'

/** GET /api/sync/pull: what a phone has not seen yet, in pages. 409 with the epoch when the database was rebuilt. */
export default defineHandler(async (event) => {
  const user = await requireUser(event)
  const query = readValidQuery(event, pullQuerySchema)
  const now = new Date()
  try {
    const page = await readOrganisation(user, tx => collectPull(tx, user, query, now))
    if (query.dev && !page.more) await withOrganisation(user, tx => noteSeen(tx, user, query.dev!, now))
    return page
  }
  catch (error) {
    if (error instanceof OtherEpoch) throw httpError('other-epoch', 409, { epoch: error.epoch })
    throw error
  }
})
