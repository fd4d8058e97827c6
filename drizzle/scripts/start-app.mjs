// @ts-check
// Sets up all that Lapel needs, runs it until it is told to stop, and stops all it started.
//
// Settings (environment):
//   PORT, HOST                 where it listens; 3000 on 127.0.0.1, or the next free port when PORT is not set
//   DATABASE_URL               a PostgreSQL of your own; then no database is started and no demo is loaded
//   DATABASE_OWNER_URL         the role that may change tables there, when it is another than the app's
//   LAPEL_DEMO                 1 loads the demo into a database of your own; 0 keeps it out of the private one
//   NUXT_SESSION_PASSWORD      the key of the session cookie; made and kept in .data when not set
//   TLS_CERT, TLS_KEY          files, to serve https
import { spawn } from 'node:child_process'
import { join } from 'node:path'
import { appEnvironment, PortTaken, startAppServer } from './app-server.mjs'
import { checkout, Explained, processBirth, readSecrets, stopWaiting } from './local-folder.mjs'
import { freePort, isPortFree, releaseCluster, startCluster } from './postgres.mjs'
import { ensureBuild, ensurePackages, migrate, readDemoSignIns, seedDemo } from './prepare.mjs'
import { endRunningCommands } from './run-command.mjs'

const DEFAULT_PORT = 3000
const DATABASE_WATCH_MILLISECONDS = 3_000

/** Thrown to leave the set-up when the person has asked to stop meanwhile. */
class Stopped extends Error {}

let isStopRequested = false
let hasCluster = false
/** @type {(() => Promise<void>) | null} */
let stopApp = null
/** Settles when it is time to stop: null because a person asked, or the reason something ended by itself. @type {(reason: string | null) => void} */
let end
/** @type {Promise<string | null>} */
const ending = new Promise((resolve) => { end = resolve })

const say = (/** @type {string} */ line) => console.log(line)

/**
 * Runs Lapel until Ctrl-C, SIGTERM or a failure, then ends this process: 0 when asked to stop, 1 with a reason otherwise.
 * @param {boolean} isDevelopment
 */
export async function startApp(isDevelopment) {
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) process.on(signal, requestStop)
  // A closed terminal must not end us before the database is stopped.
  process.stdout.on('error', () => {})
  process.stderr.on('error', () => {})
  /** @type {string | null} */
  let reason = null
  try {
    await setUpAndRun(isDevelopment)
    reason = await ending
  }
  catch (error) {
    if (!(error instanceof Stopped)) reason = error instanceof Explained ? error.message : error instanceof Error ? error.stack ?? error.message : String(error)
  }
  try {
    if (isStopRequested) say('Stopping')
    await stopApp?.()
    if (hasCluster && await releaseCluster()) say('The database has stopped.')
  }
  catch (error) {
    reason ??= error instanceof Error ? error.message : String(error)
  }
  // Ctrl-C is an order carried out, also in the middle of setting up; what a tool said while it was being ended is noise.
  if (isStopRequested) process.exit(0)
  console.error(reason)
  process.exit(1)
}

function requestStop() {
  const isAgain = isStopRequested
  isStopRequested = true
  stopWaiting()
  endRunningCommands(isAgain ? 'SIGKILL' : 'SIGTERM')
  end(null)
}

function leaveIfStopped() {
  if (isStopRequested) throw new Stopped()
}

/** @param {boolean} isDevelopment */
async function setUpAndRun(isDevelopment) {
  const host = process.env.HOST || '127.0.0.1'
  let port = await choosePort(host, null)

  await ensurePackages(say)
  leaveIfStopped()

  const database = await haveDatabase(isDevelopment)
  leaveIfStopped()

  say(await migrate(database.ownerUrl))
  leaveIfStopped()

  if (database.isDemo) {
    const seeded = await seedDemo(database)
    if (seeded !== null) say(seeded)
    leaveIfStopped()
  }

  const sessionPassword = process.env.NUXT_SESSION_PASSWORD || readSecrets().session
  if (sessionPassword.length < 32) throw new Explained('NUXT_SESSION_PASSWORD is too short: it needs 32 characters or more.')
  const settings = { databaseUrl: database.appUrl, sessionPassword, isDemo: database.isDemo }

  if (isDevelopment) {
    sayDemoSignIns(database.isDemo)
    runDevelopmentServer(appEnvironment(settings), host, port)
    return
  }

  const builtNow = await ensureBuild(say)
  if (!builtNow) say('The build is up to date.')
  leaveIfStopped()

  port = await choosePort(host, port)
  const server = await startOnFreePort(settings, host, port)
  stopApp = server.stop
  void server.ended.then(how => end(how))
  leaveIfStopped()
  say(`\nLapel is at ${server.url}`)
  sayDemoSignIns(database.isDemo)
  say('Stop it with Ctrl-C.')
}

/**
 * Looks at the port before the long steps, so that a taken one is known at once, and again after them.
 * @param {string} host
 * @param {number | null} earlier what the first look chose
 */
async function choosePort(host, earlier) {
  const wanted = process.env.PORT
  if (wanted === undefined || wanted === '') {
    const port = await freePort(DEFAULT_PORT, host)
    if (port !== DEFAULT_PORT && port !== earlier) say(`Port ${DEFAULT_PORT} is taken, so this is port ${port}.`)
    return port
  }
  const port = Number(wanted)
  if (!Number.isInteger(port) || port < 1 || port > 65_535) throw new Explained(`PORT=${wanted} is no port: give a number from 1 to 65535.`)
  if (!await isPortFree(port, host)) throw new Explained(`Port ${port} on ${host} is taken or not allowed. Stop what uses it, or set PORT to another number.`)
  return port
}

/**
 * Two starts at once may both see the same free port; the later one moves on, unless the port was set.
 * @param {{ databaseUrl: string, sessionPassword: string, isDemo: boolean }} settings
 * @param {string} host
 * @param {number} firstPort
 */
async function startOnFreePort(settings, host, firstPort) {
  for (let port = firstPort; ;) {
    try {
      return await startAppServer({ ...settings, host, port, onLine: say, onSpawn: (stop) => { stopApp = stop } })
    }
    catch (error) {
      if (!(error instanceof PortTaken) || process.env.PORT) throw error
      port = await freePort(port + 1, host)
      say(`Another program was quicker, so this is port ${port}.`)
    }
  }
}

/**
 * @param {boolean} isDevelopment
 * @returns {Promise<{ ownerUrl: string, appUrl: string, isDemo: boolean }>}
 */
async function haveDatabase(isDevelopment) {
  const given = process.env.DATABASE_URL
  if (given) return { appUrl: given, ownerUrl: process.env.DATABASE_OWNER_URL || given, isDemo: process.env.LAPEL_DEMO === '1' }
  hasCluster = true
  const { ownerUrl, appUrl, startedHere, serverPid, log } = await startCluster({ who: isDevelopment ? 'npm run dev' : 'npm start', say })
  say(startedHere ? 'The database has started.' : 'The database was already running.')
  setInterval(() => {
    if (processBirth(serverPid) === null) end(`The database has stopped, so Lapel stops too. Its log is ${log}`)
  }, DATABASE_WATCH_MILLISECONDS).unref()
  return { ownerUrl, appUrl, isDemo: process.env.LAPEL_DEMO !== '0' }
}

/**
 * @param {NodeJS.ProcessEnv} environment
 * @param {string} host
 * @param {number} port
 */
function runDevelopmentServer(environment, host, port) {
  const child = spawn(process.execPath, [join(checkout, 'node_modules', 'nuxt', 'bin', 'nuxt.mjs'), 'dev', '--host', host, '--port', String(port)], {
    cwd: checkout,
    detached: true,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, ...environment, NUXT_TELEMETRY_DISABLED: '1' },
  })
  const ended = new Promise((resolve) => {
    child.on('error', error => resolve(`nuxt dev could not be started: ${error.message}`))
    child.on('close', (code, signal) => resolve(`nuxt dev ended (${signal ?? `exit code ${code}`}).`))
  })
  void ended.then(how => end(String(how)))
  stopApp = async () => {
    const patience = setTimeout(() => signalGroup(child.pid, 'SIGKILL'), 8_000)
    if (child.exitCode === null && child.signalCode === null) signalGroup(child.pid, 'SIGTERM')
    await ended
    clearTimeout(patience)
  }
}

/**
 * nuxt dev starts programs of its own, which end with it.
 * @param {number | undefined} pid
 * @param {NodeJS.Signals} signal
 */
function signalGroup(pid, signal) {
  if (pid === undefined) return
  try {
    process.kill(-pid, signal)
  }
  catch {
    // The group is gone already.
  }
}

/** @param {boolean} isDemo */
function sayDemoSignIns(isDemo) {
  const people = isDemo ? readDemoSignIns() : []
  if (people.length === 0) return
  const widest = Math.max(...people.map(person => person.email.length))
  const widestPassword = Math.max(...people.map(person => person.password.length))
  say('Demo sign-ins:')
  for (const { email, password, role } of people) say(`  ${email.padEnd(widest)}  ${password.padEnd(widestPassword)}  ${role}`)
}
