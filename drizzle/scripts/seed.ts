// Fills an empty database with the invented demo organisation. Run as `tsx drizzle/scripts/seed.ts [url]`; without an address
// it takes DATABASE_URL, then the private database of this checkout.
import { realpathSync } from 'node:fs'
import { pathToFileURL } from 'node:url'
import { openDatabase } from '#server/database/client'
import { databaseUrls, MAIN_DATABASE, releaseCluster, startCluster } from './postgres.mjs'
import { seedDemo } from '../seeds/seed-demo'

async function main(): Promise<void> {
  const given = process.argv[2] ?? process.env.DATABASE_URL
  if (given === undefined || given === '') await startCluster({ who: 'npm run db:seed', say: line => console.log(line) })
  const database = openDatabase(given || databaseUrls(MAIN_DATABASE).appUrl, 2)
  try {
    const made = await seedDemo(database, new Date())
    console.log(made ? 'The demo organisation is there.' : 'The demo organisation was there already.')
  }
  finally {
    await database.$client.end()
    if (given === undefined || given === '') await releaseCluster()
  }
}

if (process.argv[1] !== undefined && import.meta.url === pathToFileURL(realpathSync(process.argv[1])).href) {
  main().catch((error: unknown) => {
    console.error(`The demo data could not be written: ${error instanceof Error ? error.stack : String(error)}`)
    process.exitCode = 1
  })
}
