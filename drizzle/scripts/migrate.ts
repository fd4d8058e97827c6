// Brings the tables of a database up to date. Run as `tsx drizzle/scripts/migrate.ts [url]`; without an address it takes
// DATABASE_OWNER_URL, then DATABASE_URL, then the private database of this checkout.
import { existsSync, realpathSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { drizzle } from 'drizzle-orm/node-postgres'
import { migrate } from 'drizzle-orm/node-postgres/migrator'
import pg from 'pg'
import { databaseUrls, MAIN_DATABASE, releaseCluster, startCluster } from './postgres.mjs'

const MIGRATIONS_FOLDER = join(dirname(fileURLToPath(import.meta.url)), '..', 'migrations')

// Any fixed number: two programs that migrate the same database take turns by it.
const MIGRATION_LOCK = 7_305_142

/**
 * Applies the migrations a database does not have yet, each once, all in one transaction.
 * @param ownerUrl address of the role that owns the tables
 * @returns how many were applied; 0 also when there is no migration at all
 * @throws when the database cannot be reached or a migration fails, and then none of them is applied
 */
export async function migrateDatabase(ownerUrl: string): Promise<number> {
  if (!existsSync(join(MIGRATIONS_FOLDER, 'meta', '_journal.json'))) return 0
  const client = new pg.Client({ connectionString: ownerUrl, application_name: 'lapel migrate', connectionTimeoutMillis: 15_000 })
  await client.connect()
  try {
    await client.query('select pg_advisory_lock($1)', [MIGRATION_LOCK])
    const before = await countApplied(client)
    await migrate(drizzle(client), { migrationsFolder: MIGRATIONS_FOLDER })
    return await countApplied(client) - before
  }
  finally {
    await client.end()
  }
}

async function countApplied(client: pg.Client): Promise<number> {
  const there = await client.query<{ name: string | null }>('select to_regclass(\'drizzle.__drizzle_migrations\')::text as name')
  if (there.rows[0]?.name == null) return 0
  const counted = await client.query<{ applied: number }>('select count(*)::int as applied from drizzle.__drizzle_migrations')
  return counted.rows[0]?.applied ?? 0
}

async function main(): Promise<void> {
  const given = process.argv[2] ?? (process.env.DATABASE_OWNER_URL || process.env.DATABASE_URL)
  if (given === undefined || given === '') await startCluster({ who: 'npm run db:migrate', say: line => console.log(line) })
  try {
    const applied = await migrateDatabase(given || databaseUrls(MAIN_DATABASE).ownerUrl)
    console.log(applied === 0 ? 'The tables are up to date.' : `The tables are up to date: ${applied} ${applied === 1 ? 'migration' : 'migrations'} applied.`)
  }
  finally {
    if (given === undefined || given === '') await releaseCluster()
  }
}

if (process.argv[1] !== undefined && import.meta.url === pathToFileURL(realpathSync(process.argv[1])).href) {
  main().catch((error: unknown) => {
    console.error(`The tables could not be brought up to date: ${describeFailure(error)}`)
    process.exitCode = 1
  })
}

/** The driver's own sentence stands behind Drizzle's, which repeats the whole statement. */
function describeFailure(error: unknown): string {
  if (!(error instanceof Error)) return String(error)
  if (error.cause instanceof Error) return `${describeFailure(error.cause)}\n${error.message}`
  if (error instanceof AggregateError) return error.errors.map(describeFailure).join('; ')
  return error.message
}
