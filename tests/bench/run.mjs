// @ts-check
// `npm run bench -- <what>`: sets up all a measurement needs, as the tests do, and prints figures. It writes nothing into the
// project. Machines differ and are noisy: read the ratios, which come from one run, before the milliseconds.
import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { nodeVersionProblem } from '../../drizzle/scripts/node-version.mjs'

/** What can be measured, and with which program. @type {Record<string, { does: string, program: string }>} */
const BENCHES = {
  field: { does: 'the phone: digit to verdict, commit to saved, cold start, weight of the script', program: 'field.ts' },
}
const DATABASE = 'lapel_bench'
const FIRST_PORT = 4410
const DEBIAN_CHROMIUM = '/usr/bin/chromium'

const tooOld = nodeVersionProblem(process.versions.node)
if (tooOld !== null) {
  console.error(tooOld)
  process.exit(1)
}
const name = process.argv[2]
const bench = name === undefined ? undefined : BENCHES[name]
if (bench === undefined) {
  console.log(`${name === undefined ? 'Say what to measure' : `There is no bench "${name}"`}: npm run bench -- <what>\n${Object.entries(BENCHES).map(([what, { does }]) => `  ${what.padEnd(8)} ${does}`).join('\n')}`)
  process.exit(name === undefined ? 0 : 1)
}

const { startAppServer } = await import('../../drizzle/scripts/app-server.mjs')
const { installPackages } = await import('../../drizzle/scripts/debian-packages.mjs')
const { checkout, ensureDataFolder, Explained, readSecrets } = await import('../../drizzle/scripts/local-folder.mjs')
const { createDatabase, dropDatabase, freePort, releaseCluster, startCluster } = await import('../../drizzle/scripts/postgres.mjs')
const { ensureBuild, ensureGeneratedTypes, ensurePackages, migrate, seedDemo } = await import('../../drizzle/scripts/prepare.mjs')
const { runCommand } = await import('../../drizzle/scripts/run-command.mjs')

const say = (/** @type {string} */ line) => console.log(line)
let code = 1
try {
  ensureDataFolder()
  await ensurePackages(say)
  await ensureGeneratedTypes()
  const chromium = process.env.CHROMIUM ?? DEBIAN_CHROMIUM
  if (!existsSync(chromium) && chromium === DEBIAN_CHROMIUM) await installPackages(['chromium'], { purpose: 'A measurement in a browser', say })
  if (!existsSync(chromium)) throw new Explained(`There is no browser at ${chromium}. Set CHROMIUM to one, or install Debian's package chromium.`)
  await ensureBuild(say)
  await startCluster({ who: 'npm run bench', say })
  try {
    const { ownerUrl, appUrl } = await createDatabase(DATABASE, { fresh: true })
    await migrate(ownerUrl)
    await seedDemo({ ownerUrl, appUrl })
    const server = await startAppServer({
      databaseUrl: appUrl, sessionPassword: readSecrets().session, host: '127.0.0.1', port: await freePort(FIRST_PORT), isDemo: true, onLine: () => {},
    })
    try {
      const result = await runCommand(process.execPath, ['--import', 'tsx', join('tests', 'bench', bench.program)], {
        cwd: checkout, env: { ...process.env, BASE_URL: server.url, CHROMIUM: chromium, NO_COLOR: '1' }, onLine: say,
      })
      code = result.code ?? 1
    }
    finally {
      await server.stop()
      await dropDatabase(DATABASE)
    }
  }
  finally {
    await releaseCluster()
  }
}
catch (error) {
  say(error instanceof Explained ? error.message : error instanceof Error ? error.stack ?? error.message : String(error))
}
process.exit(code)
