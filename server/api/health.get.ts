import { useDatabase } from '../utils/database'
import { defineHandler } from '../utils/handler'

/** GET /api/health: the server runs and reaches its database. Tells nothing else. */
export default defineHandler(async () => {
  await useDatabase().$client.query('select 1')
  return { ok: true }
})
