import { organisationVersion } from '#server/database/queries/organisation-version'
import { defineHandler } from '../utils/handler'
import { requireOffice } from '../utils/require-user'
import { readOrganisation } from '../utils/with-organisation'

/** GET /api/changes: the version of the last change; asked for often, so it reads one row. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  const { ver } = await readOrganisation(user, tx => organisationVersion(tx, user.organisationId))
  return { ver }
})
