// Gives every test of the server project a database of its own making: the private cluster of this checkout, with
// `lapel_test` made afresh and migrated. A test reads the addresses with `inject('databaseUrl')`.
import type { TestProject } from 'vitest/node'
import { migrateDatabase } from '../../drizzle/scripts/migrate'
import { createDatabase, releaseCluster, startCluster } from '../../drizzle/scripts/postgres.mjs'

declare module 'vitest' {
  export interface ProvidedContext {
    /** Address for the app's role, which owns nothing: what the running server uses. */
    databaseUrl: string
    /** Address for the role that owns the tables: to set up and to look behind row-level security. */
    ownerUrl: string
  }
}

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  await startCluster({ who: 'the server tests' })
  const { appUrl, ownerUrl } = await createDatabase('lapel_test', { fresh: true })
  await migrateDatabase(ownerUrl)
  project.provide('databaseUrl', appUrl)
  project.provide('ownerUrl', ownerUrl)
  return async () => {
    await releaseCluster()
  }
}
