// @ts-check
// Starts the built app and waits until it answers. Plain Node without packages.
import { spawn } from 'node:child_process'
import { existsSync, readFileSync } from 'node:fs'
import { get as getPlain } from 'node:http'
import { get as getSecure } from 'node:https'
import { networkInterfaces } from 'node:os'
import { join } from 'node:path'
import { checkout, Explained, messageOf } from './local-folder.mjs'
import { SERVER_ENTRY } from './prepare.mjs'

const START_LIMIT_MILLISECONDS = 60_000
const GRACE_MILLISECONDS = 5_000

/** Somebody else took the port between our look at it and the server's. */
export class PortTaken extends Explained {}

/**
 * @typedef {object} RunningServer
 * @property {number} pid
 * @property {string} url what a person opens
 * @property {Promise<string>} ended says how the server ended, whenever it does
 * @property {() => Promise<void>} stop asks it to end and waits; after its grace it is killed
 * @property {() => Promise<void>} kill ends it at once, as a power cut would
 */

/**
 * @param {{ databaseUrl: string, sessionPassword: string, host: string, port: number, isDemo: boolean, environment?: NodeJS.ProcessEnv, onLine: (line: string) => void, onSpawn?: (stop: () => Promise<void>) => void }} options
 *   `onLine` sees every line the server writes; `onSpawn` gets the way to stop it before it is ready
 * @returns {Promise<RunningServer>} once GET /api/health says all is well
 * @throws {PortTaken} when another program listens there
 * @throws {Explained} when it ends or stays silent
 */
export async function startAppServer({ databaseUrl, sessionPassword, host, port, isDemo, environment = {}, onLine, onSpawn }) {
  const certificate = readTls()
  const child = spawn(process.execPath, ['--import', join(checkout, 'drizzle', 'scripts', 'end-with-parent.mjs'), SERVER_ENTRY], {
    cwd: checkout,
    detached: true,
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      ...environment,
      ...appEnvironment({ databaseUrl, sessionPassword, isDemo }),
      HOST: host,
      PORT: String(port),
      NITRO_HOST: host,
      NITRO_PORT: String(port),
      NITRO_SHUTDOWN_TIMEOUT: String(GRACE_MILLISECONDS),
      ...(certificate === null ? {} : { NITRO_SSL_CERT: certificate.cert, NITRO_SSL_KEY: certificate.key }),
    },
  })
  // Until the server says so itself, what answers on the port may be somebody else.
  let isListening = false
  let isPortTaken = false
  /** The last lines, for the sentence about a failure. @type {string[]} */
  const said = []
  for (const stream of [child.stdout, child.stderr]) {
    let rest = ''
    stream?.setEncoding('utf8').on('data', (/** @type {string} */ text) => {
      const lines = (rest + text).split('\n')
      rest = lines.pop() ?? ''
      for (const line of lines) {
        if (line.startsWith('Listening on ')) {
          // Our own line with the address comes when the app answers, and it is the only one.
          isListening = true
          continue
        }
        if (line.includes('EADDRINUSE')) isPortTaken = true
        said.push(line)
        if (said.length > 25) said.shift()
        if (!isPortTaken) onLine(line)
      }
    })
  }
  /** @type {Promise<string>} */
  const ended = new Promise((resolve) => {
    child.on('error', error => resolve(`The server could not be started: ${error.message}`))
    child.on('close', (code, signal) => resolve(signal === null ? `The server ended with exit code ${code}.` : `The server was ended by ${signal}.`))
  })
  const end = async (/** @type {NodeJS.Signals} */ signal) => {
    if (child.exitCode === null && child.signalCode === null) child.kill(signal)
    const patience = setTimeout(() => child.kill('SIGKILL'), GRACE_MILLISECONDS + 3_000)
    await ended
    clearTimeout(patience)
  }
  const server = {
    pid: child.pid ?? 0,
    url: `${certificate === null ? 'http' : 'https'}://${shownHost(host)}:${port}`,
    ended,
    stop: () => end('SIGTERM'),
    kill: () => end('SIGKILL'),
  }
  onSpawn?.(server.stop)
  const checked = `${certificate === null ? 'http' : 'https'}://${urlHost(isEveryAddress(host) ? '127.0.0.1' : host)}:${port}/api/health`
  const deadline = Date.now() + START_LIMIT_MILLISECONDS
  let answer = 'no answer'
  /** @type {string | null} */
  let early = null
  void ended.then((how) => { early = how })
  while (answer !== '200') {
    if (isPortTaken) {
      await server.kill()
      throw new PortTaken(`Port ${port} on ${host} is taken. Stop what uses it, or set PORT to another number.`)
    }
    if (early !== null) throw new Explained(`${early}${said.length === 0 ? '' : `\n${said.join('\n')}`}`)
    if (Date.now() > deadline) {
      await server.kill()
      throw new Explained(`The server did not become ready within ${START_LIMIT_MILLISECONDS / 1000} seconds; ${checked} gave: ${answer}`)
    }
    if (isListening) answer = await askHealth(checked)
    if (answer !== '200') await new Promise(resolve => setTimeout(resolve, 100))
  }
  return server
}

/**
 * The settings the app reads, in development and in production alike.
 * @param {{ databaseUrl: string, sessionPassword: string, isDemo: boolean }} options
 */
export function appEnvironment({ databaseUrl, sessionPassword, isDemo }) {
  return { NUXT_DATABASE_URL: databaseUrl, NUXT_SESSION_PASSWORD: sessionPassword, NUXT_DEMO: isDemo ? '1' : '' }
}

/**
 * TLS_CERT and TLS_KEY name files; the server wants their contents.
 * @returns {{ cert: string, key: string } | null}
 */
function readTls() {
  const { TLS_CERT: certPath, TLS_KEY: keyPath } = process.env
  if (!certPath && !keyPath) return null
  if (!certPath || !keyPath) throw new Explained('TLS_CERT and TLS_KEY belong together: set both to a file, or neither.')
  for (const path of [certPath, keyPath]) {
    if (!existsSync(path)) throw new Explained(`The file ${path} named by TLS_CERT or TLS_KEY is not there.`)
  }
  try {
    return { cert: readFileSync(certPath, 'utf8'), key: readFileSync(keyPath, 'utf8') }
  }
  catch (error) {
    throw new Explained(`The TLS files cannot be read: ${messageOf(error)}`)
  }
}

/**
 * The status of one look at the health page, or what went wrong.
 * @param {string} url
 * @returns {Promise<string>}
 */
function askHealth(url) {
  return new Promise((resolve) => {
    const get = url.startsWith('https:') ? getSecure : getPlain
    // It is our own server on this machine, whose certificate may be made for another name.
    const request = get(url, { rejectUnauthorized: false, timeout: 5_000, agent: false }, (response) => {
      response.resume()
      response.on('error', () => {})
      resolve(String(response.statusCode))
    })
    request.on('timeout', () => request.destroy(new Error('no answer within 5 seconds')))
    request.on('error', error => resolve(error.message))
  })
}

/** @param {string} host */
function isEveryAddress(host) {
  return host === '0.0.0.0' || host === '::'
}

/**
 * A server on every address is shown by the one another device on the network can open.
 * @param {string} host
 */
function shownHost(host) {
  if (!isEveryAddress(host)) return urlHost(host)
  const addresses = Object.values(networkInterfaces()).flat()
  return addresses.find(address => address?.family === 'IPv4' && !address.internal)?.address ?? '127.0.0.1'
}

/** @param {string} host */
function urlHost(host) {
  return host.includes(':') ? `[${host}]` : host
}
