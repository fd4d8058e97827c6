import { connectDatabase, disconnectDatabase } from '../utils/database'

/** Opens the pool on start, insists on durable commits, closes it on shutdown. */
export default defineNitroPlugin((nitro) => {
  const { databaseUrl } = useRuntimeConfig()
  if (!databaseUrl) {
    // While pages are pre-rendered there is no database, and none is needed.
    if (import.meta.prerender) return
    throw new Error('NUXT_DATABASE_URL is not set. Start Lapel with `npm start`, or name a PostgreSQL database.')
  }
  const database = connectDatabase(databaseUrl)
  void insistOnDurability(database)
  nitro.hooks.hook('close', disconnectDatabase)
})

/** A commit that may be forgotten after a crash would hand the same version out twice: such a server must not run. */
async function insistOnDurability(database: ReturnType<typeof connectDatabase>): Promise<void> {
  const answer = await database.$client.query<{ synchronous_commit: string }>('show synchronous_commit').catch(() => null)
  if (answer && answer.rows[0]?.synchronous_commit === 'off') {
    console.error('PostgreSQL runs with synchronous_commit = off: a sample could be lost. Lapel stops.')
    process.exit(1)
  }
}
