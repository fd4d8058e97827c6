// @ts-check
// `npm test`: sets up all the tests need, runs the parts in order and counts.
//
//   npm test                        every part: lint, types, unit, nuxt, build, server, e2e
//   npm test unit server            only these
//   npm test -- e2e --grep offline  what follows the parts goes to Vitest or Playwright
//
// The last line is always `N passed, M failed`, and the exit code is 1 when M is not 0. Lint, types and build count as one
// check each; a part that breaks down, or in which no test ran, is a failure.
//
// The browser tests get the built app on a port of its own with a fresh, seeded database, and these variables:
//   BASE_URL             where the app is
//   E2E_DATABASE_URL     the database as its owner, to look behind the app
//   E2E_SERVER_CONTROL   a small page of ours on 127.0.0.1 that starts and stops the app; POST to it:
//     /stop                                     end the server as Ctrl-C would
//     /kill                                     end it as a power cut would
//     /start                                    start it on the same port; answers when it is ready
//     /restart                                  /kill, then /start
//     /restart-database                         end the database as a power cut would, let it recover
//   tests/e2e/support/server-control.ts wraps them.
import { randomBytes } from 'node:crypto'
import { appendFileSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:http'
import { dirname, join } from 'node:path'
import { nodeVersionProblem } from '../drizzle/scripts/node-version.mjs'

const tooOld = nodeVersionProblem(process.versions.node)
if (tooOld !== null) {
  console.error(`${tooOld}\n0 passed, 1 failed`)
  process.exit(1)
}

const { PortTaken, startAppServer } = await import('../drizzle/scripts/app-server.mjs')
const { installPackages } = await import('../drizzle/scripts/debian-packages.mjs')
const { checkout, dataFolder, ensureDataFolder, Explained, readSecrets, stopWaiting, withLock } = await import('../drizzle/scripts/local-folder.mjs')
const { createDatabase, freePort, releaseCluster, restartCluster, startCluster } = await import('../drizzle/scripts/postgres.mjs')
const { ensureBuild, ensureGeneratedTypes, ensurePackages, migrate, seedDemo } = await import('../drizzle/scripts/prepare.mjs')
const { endRunningCommands, runCommand } = await import('../drizzle/scripts/run-command.mjs')

/**
 * @typedef {object} Count
 * @property {number} passed
 * @property {number} failed
 * @property {number} skipped
 */

const E2E_DATABASE = 'lapel_e2e'
const E2E_FIRST_PORT = 4310
const DEBIAN_CHROMIUM = '/usr/bin/chromium'

/** The parts in the order they run. @type {Record<string, () => Promise<Count>>} */
const parts = {
  lint: () => check('eslint', join('node_modules', 'eslint', 'bin', 'eslint.js'), ['.', '--max-warnings', '0']),
  types: () => check('nuxt typecheck', join('node_modules', 'nuxt', 'bin', 'nuxt.mjs'), ['typecheck']),
  unit: () => runVitest('unit'),
  nuxt: () => runVitest('nuxt'),
  build: buildApp,
  server: () => runVitest('server'),
  e2e: runBrowserTests,
}

const say = (/** @type {string} */ line) => console.log(line)

let isStopRequested = false
let hasCluster = false
/** What runs beside the tests, to be stopped last first. @type {(() => Promise<unknown>)[]} */
const stops = []

const { chosen, extraWords } = readWords(process.argv.slice(2))

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, () => {
    stopWaiting()
    endRunningCommands(isStopRequested ? 'SIGKILL' : 'SIGTERM')
    isStopRequested = true
  })
}
process.stdout.on('error', () => {})

/** @type {{ name: string, count: Count, seconds: number }[]} */
const results = []
try {
  await withLock('tests', runAll, () => say('Waiting for another run of the tests in this checkout'))
}
catch (error) {
  say(error instanceof Explained ? error.message : error instanceof Error ? error.stack ?? error.message : String(error))
  results.push({ name: 'set-up', count: { passed: 0, failed: 1, skipped: 0 }, seconds: 0 })
}
if (isStopRequested) {
  say('Stopped before the end.')
  results.push({ name: 'stopped', count: { passed: 0, failed: 1, skipped: 0 }, seconds: 0 })
}
process.exit(sayResults() === 0 ? 0 : 1)

/** @param {string[]} words */
function readWords(words) {
  const firstExtra = words.findIndex(word => !(word in parts))
  const named = firstExtra === -1 ? words : words.slice(0, firstExtra)
  const extra = firstExtra === -1 ? [] : words.slice(firstExtra)
  if (extra[0] !== undefined && (named.length === 0 || !/^-/.test(extra[0]))) {
    say(`"${extra[0]}" is no part of the tests. The parts are: ${Object.keys(parts).join(', ')}.\n0 passed, 1 failed`)
    process.exit(1)
  }
  return { chosen: named.length === 0 ? Object.keys(parts) : Object.keys(parts).filter(name => named.includes(name)), extraWords: extra }
}

async function runAll() {
  try {
    ensureDataFolder()
    await ensurePackages(say)
    await ensureGeneratedTypes()
    for (const name of chosen) {
      if (isStopRequested) return
      const run = parts[name]
      if (run === undefined) continue
      say(`\n== ${name}`)
      const startedAt = performance.now()
      /** @type {Count} */
      let count
      try {
        count = await run()
      }
      catch (error) {
        say(error instanceof Explained ? error.message : error instanceof Error ? error.stack ?? error.message : String(error))
        count = { passed: 0, failed: 1, skipped: 0 }
      }
      const seconds = (performance.now() - startedAt) / 1000
      results.push({ name, count, seconds })
      say(`== ${name}: ${count.passed} passed, ${count.failed} failed in ${seconds.toFixed(1)} s`)
    }
  }
  finally {
    for (const stop of stops.reverse()) await stop().catch((/** @type {unknown} */ error) => say(String(error)))
    if (hasCluster) await releaseCluster()
  }
}

/**
 * @returns {number} how many failed
 */
function sayResults() {
  const sum = { passed: 0, failed: 0, skipped: 0 }
  say(`\n${'part'.padEnd(8)} ${'passed'.padStart(7)} ${'failed'.padStart(7)} ${'skipped'.padStart(8)} ${'seconds'.padStart(8)}`)
  for (const { name, count, seconds } of results) {
    sum.passed += count.passed
    sum.failed += count.failed
    sum.skipped += count.skipped
    say(`${name.padEnd(8)} ${String(count.passed).padStart(7)} ${String(count.failed).padStart(7)} ${String(count.skipped).padStart(8)} ${seconds.toFixed(1).padStart(8)}`)
  }
  say(`\n${sum.passed} passed, ${sum.failed} failed`)
  return sum.failed
}

/**
 * A tool that either passes or fails as a whole.
 * @param {string} title
 * @param {string} program
 * @param {string[]} words
 * @returns {Promise<Count>}
 */
async function check(title, program, words) {
  const result = await runCommand(process.execPath, [program, ...words], { cwd: checkout, env: testEnvironment(), onLine: say })
  if (result.code !== 0) say(`${title} ended with exit code ${result.code}.`)
  return { passed: result.code === 0 ? 1 : 0, failed: result.code === 0 ? 0 : 1, skipped: 0 }
}

/** @returns {Promise<Count>} */
async function buildApp() {
  if (!await ensureBuild(say)) say('The build is up to date.')
  return { passed: 1, failed: 0, skipped: 0 }
}

/**
 * @param {string} project
 * @returns {Promise<Count>}
 */
async function runVitest(project) {
  if (project === 'server') {
    await haveCluster()
    // The server's tests ask the built app.
    if (await ensureBuild(say)) say('Built for the tests.')
  }
  const report = reportPath(project)
  const result = await runCommand(process.execPath, [
    join('node_modules', 'vitest', 'vitest.mjs'), 'run', '--project', project,
    '--reporter=default', '--reporter=json', `--outputFile.json=${report}`, ...extraWords,
  ], { cwd: checkout, env: testEnvironment(), onLine: say })
  const read = readReport(report)
  if (read === null) return brokenDown(`Vitest left no report (exit code ${result.code}).`)
  // A file that could not even be loaded holds no test, failed or not.
  const unloaded = read.testResults.filter((/** @type {{ status: string, assertionResults: { status: string }[] }} */ file) => (
    file.status === 'failed' && !file.assertionResults.some(test => test.status === 'failed')
  )).length
  return judge({
    passed: read.numPassedTests,
    failed: read.numFailedTests + unloaded,
    skipped: read.numPendingTests + (read.numTodoTests ?? 0),
  }, result.code)
}

/** @returns {Promise<Count>} */
async function runBrowserTests() {
  const chromium = await haveChromium()
  if (!await ensureBuild(say)) say('The build is up to date.')
  const { baseUrl, control, ownerUrl } = await startAppUnderTest()
  const report = reportPath('e2e')
  const result = await runCommand(process.execPath, [join('node_modules', '@playwright', 'test', 'cli.js'), 'test', '--reporter=list,json', ...extraWords], {
    cwd: checkout,
    env: {
      ...testEnvironment(),
      BASE_URL: baseUrl,
      E2E_SERVER_CONTROL: control,
      E2E_DATABASE_URL: ownerUrl,
      CHROMIUM: chromium,
      PLAYWRIGHT_JSON_OUTPUT_NAME: report,
      PLAYWRIGHT_JSON_OUTPUT_FILE: report,
    },
    onLine: say,
  })
  const read = readReport(report)
  if (read === null) return brokenDown(`Playwright left no report (exit code ${result.code}).`)
  return judge({
    passed: read.stats.expected + read.stats.flaky,
    failed: read.stats.unexpected,
    skipped: read.stats.skipped,
  }, result.code)
}

/**
 * A runner that fails without a failed test, and a part without any test, are failures too.
 * @param {Count} count
 * @param {number} exitCode
 * @returns {Count}
 */
function judge(count, exitCode) {
  if (exitCode !== 0 && count.failed === 0) return { ...count, failed: brokenDown(`No test failed, yet the exit code is ${exitCode}.`).failed }
  if (count.passed + count.failed === 0) return { ...count, failed: brokenDown('No test ran.').failed }
  return count
}

/**
 * @param {string} why
 * @returns {Count}
 */
function brokenDown(why) {
  say(why)
  return { passed: 0, failed: 1, skipped: 0 }
}

/** @param {string} name */
function reportPath(name) {
  const path = join(dataFolder, 'test-reports', `${name}.json`)
  mkdirSync(dirname(path), { recursive: true })
  // A report of an earlier run must not speak for this one.
  rmSync(path, { force: true })
  return path
}

/** @param {string} path */
function readReport(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'))
  }
  catch {
    return null
  }
}

/** The tests never see a database of the person's own. */
function testEnvironment() {
  const environment = { ...process.env, NUXT_TELEMETRY_DISABLED: '1', NO_COLOR: '1' }
  for (const name of ['FORCE_COLOR', 'DATABASE_URL', 'DATABASE_OWNER_URL', 'NUXT_DATABASE_URL', 'PORT', 'HOST', 'TLS_CERT', 'TLS_KEY', 'NODE_ENV']) {
    Reflect.deleteProperty(environment, name)
  }
  return environment
}

async function haveCluster() {
  if (hasCluster) return
  hasCluster = true
  await startCluster({ who: 'npm test', say })
}

/** @returns {Promise<string>} the browser's program */
async function haveChromium() {
  const path = process.env.CHROMIUM ?? DEBIAN_CHROMIUM
  if (!existsSync(path) && path === DEBIAN_CHROMIUM) await installPackages(['chromium'], { purpose: 'A browser test', say })
  if (!existsSync(path)) throw new Explained(`There is no browser at ${path}. Set CHROMIUM to one, or install Debian's package chromium.`)
  return path
}

/**
 * Starts the built app on a free port, with a fresh database that holds the demo, and the page that controls it.
 */
async function startAppUnderTest() {
  await haveCluster()
  const { ownerUrl, appUrl } = await createDatabase(E2E_DATABASE, { fresh: true })
  say(await migrate(ownerUrl))
  const seeded = await seedDemo({ ownerUrl, appUrl })
  if (seeded !== null) say(seeded)

  for (const name of ['HOST', 'TLS_CERT', 'TLS_KEY']) Reflect.deleteProperty(process.env, name)
  let port = await freePort(E2E_FIRST_PORT)
  const log = join(dataFolder, 'logs', 'e2e-server.log')
  mkdirSync(dirname(log), { recursive: true })
  writeFileSync(log, '')
  const start = () => startAppServer({
    databaseUrl: appUrl,
    sessionPassword: readSecrets().session,
    host: '127.0.0.1',
    port,
    isDemo: true,
    onLine: line => appendFileSync(log, `${line}\n`),
  })
  /** @type {import('../drizzle/scripts/app-server.mjs').RunningServer | null} */
  let server = await start().catch(async (/** @type {unknown} */ error) => {
    // Another checkout's tests may have taken it at the same moment.
    if (!(error instanceof PortTaken)) throw error
    port = await freePort(port + 1 + Math.floor(Math.random() * 50))
    return start()
  })
  const baseUrl = server.url
  stops.push(async () => server?.stop())
  say(`The app under test is at ${baseUrl}; it writes to ${log}`)

  /** @type {Record<string, () => Promise<void>>} */
  const acts = {
    '/stop': async () => {
      await server?.stop()
      server = null
    },
    '/kill': async () => {
      await server?.kill()
      server = null
    },
    '/start': async () => { server ??= await start() },
    '/restart': async () => {
      await server?.kill()
      server = null
      server = await start()
    },
    '/restart-database': () => restartCluster({ crash: true }),
  }
  return { baseUrl, ownerUrl, control: await openControl(acts) }
}

/**
 * A page on 127.0.0.1 under an address nobody can guess; one act at a time.
 * @param {Record<string, () => Promise<void>>} acts
 * @returns {Promise<string>} its address, to which the name of an act is added
 */
function openControl(acts) {
  const secret = randomBytes(16).toString('hex')
  /** @type {Promise<unknown>} */
  let turn = Promise.resolve()
  const page = createServer((request, response) => {
    const act = request.url?.startsWith(`/${secret}/`) ? acts[request.url.slice(secret.length + 1)] : undefined
    request.resume()
    if (request.method !== 'POST' || act === undefined) {
      response.writeHead(404).end('There is no such act.')
      return
    }
    turn = turn.then(act).then(
      () => response.writeHead(204).end(),
      (/** @type {unknown} */ error) => response.writeHead(500).end(error instanceof Error ? error.message : String(error)),
    )
  })
  stops.push(() => new Promise((resolve) => {
    page.close(resolve)
    page.closeAllConnections()
  }))
  return new Promise((resolve, reject) => {
    page.on('error', reject)
    page.listen({ port: 0, host: '127.0.0.1' }, () => {
      const address = page.address()
      resolve(`http://127.0.0.1:${address !== null && typeof address === 'object' ? address.port : 0}/${secret}`)
    })
  })
}
