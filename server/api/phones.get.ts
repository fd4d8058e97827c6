import { listPhones } from '#server/services/list-phones'
import { defineHandler } from '../utils/handler'
import { requireOffice } from '../utils/require-user'
import { readOrganisation } from '../utils/with-organisation'

/** GET /api/phones: every phone that was heard of and what it still owes. */
export default defineHandler(async (event) => {
  const user = await requireOffice(event)
  return readOrganisation(user, tx => listPhones(tx, user))
})
