// @ts-check
// The ignored folder `.data` of this checkout: secrets, the private database, stamps and locks.
// Plain Node without packages, because it runs before `npm ci`.
import { randomBytes } from 'node:crypto'
import { chownSync, existsSync, mkdirSync, readdirSync, readFileSync, realpathSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

/** The folder that holds package.json, with symbolic links resolved. */
export const checkout = realpathSync(join(dirname(fileURLToPath(import.meta.url)), '..', '..'))

/** The ignored folder for everything this machine keeps. */
export const dataFolder = join(checkout, '.data')

/** A failure whose message is a sentence for the person at the terminal; no stack is shown. */
export class Explained extends Error {}

/** Makes `.data` when it is missing. @returns {string} its path */
export function ensureDataFolder() {
  if (!existsSync(dataFolder)) {
    try {
      mkdirSync(dataFolder, { mode: 0o755 })
    }
    catch (error) {
      if (!isErrorWithCode(error, 'EEXIST')) throw new Explained(`Cannot make the folder ${dataFolder}: ${messageOf(error)}`)
    }
    giveToCheckoutOwner(dataFolder)
  }
  return dataFolder
}

/**
 * Root working in somebody's checkout leaves files that person can use again without root.
 * @param {string} path
 */
function giveToCheckoutOwner(path) {
  if (process.getuid?.() !== 0) return
  const owner = statSync(checkout)
  if (owner.uid !== 0) chownSync(path, owner.uid, owner.gid)
}

/**
 * Reads a JSON file in `.data`; a missing or broken file reads as null.
 * @param {string} name
 * @returns {Record<string, unknown> | null}
 */
export function readNote(name) {
  const path = join(dataFolder, name)
  let text
  try {
    text = readFileSync(path, 'utf8')
  }
  catch (error) {
    if (isErrorWithCode(error, 'ENOENT') || isErrorWithCode(error, 'ENOTDIR')) return null
    throw new Explained(`Cannot read ${path}: ${messageOf(error)}`)
  }
  try {
    const value = JSON.parse(text)
    return value !== null && typeof value === 'object' && !Array.isArray(value) ? value : null
  }
  catch {
    return null
  }
}

/**
 * Writes a JSON file in `.data` in one step, so that a crash leaves the old or the new file, never half of one.
 * @param {string} name
 * @param {Record<string, unknown>} value
 * @param {number} [mode]
 */
export function writeNote(name, value, mode = 0o644) {
  ensureDataFolder()
  const path = join(dataFolder, name)
  const half = `${path}.${process.pid}.half`
  writeFileSync(half, `${JSON.stringify(value, null, 2)}\n`, { mode })
  giveToCheckoutOwner(half)
  renameSync(half, path)
}

/** @param {string} name */
export function removeNote(name) {
  rmSync(join(dataFolder, name), { force: true })
}

/**
 * @typedef {object} Secrets
 * @property {string} admin password of the private cluster's superuser
 * @property {string} owner password of lapel_owner
 * @property {string} app password of lapel_app
 * @property {string} session key that seals the session cookie
 */

/**
 * The generated secrets of this checkout, kept in `.data/secrets.json` (mode 0600). Whatever is missing is made.
 * @returns {Secrets}
 */
export function readSecrets() {
  ensureDataFolder()
  const kept = readNote('secrets.json') ?? {}
  /** @type {Secrets} */
  const secrets = {
    admin: keptOrNew(kept.admin),
    owner: keptOrNew(kept.owner),
    app: keptOrNew(kept.app),
    session: keptOrNew(kept.session),
  }
  if (Object.entries(secrets).some(([name, value]) => kept[name] !== value)) writeNote('secrets.json', { ...secrets }, 0o600)
  return secrets
}

/**
 * A leading letter keeps runtime config from reading a secret such as `4848e0` as a number.
 * @param {unknown} value
 */
function keptOrNew(value) {
  return typeof value === 'string' && value.length >= 32 ? value : `s${randomBytes(24).toString('hex')}`
}

/**
 * When a process started, in clock ticks since boot: tells a process from a later one that got the same number.
 * @param {number} pid
 * @returns {string | null} null when there is no such process
 */
export function processBirth(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8')
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    if (fields[0] === 'Z') return null
    return fields[19] ?? null
  }
  catch {
    return null
  }
}

/**
 * Does a note of the form `{ pid, birth }` speak of a process that still lives?
 * @param {Record<string, unknown> | null} note
 */
export function isAlive(note) {
  if (note === null || typeof note.pid !== 'number') return false
  const birth = processBirth(note.pid)
  return birth !== null && birth === note.birth
}

/**
 * Says that this process uses the cluster, until `removeLease`. A killed process leaves a note that no longer counts.
 * @param {string} who
 */
export function addLease(who) {
  ensureDataFolder()
  const folder = join(dataFolder, 'leases')
  mkdirSync(folder, { recursive: true })
  giveToCheckoutOwner(folder)
  writeNote(join('leases', `${process.pid}.json`), { pid: process.pid, birth: processBirth(process.pid), who })
}

/** Takes back what `addLease` said. */
export function removeLease() {
  removeNote(join('leases', `${process.pid}.json`))
}

/**
 * The other living processes that use the cluster; notes of dead ones are cleared away.
 * @returns {{ pid: number, who: string }[]}
 */
export function otherLeases() {
  const folder = join(dataFolder, 'leases')
  const names = existsSync(folder) ? readdirSync(folder).filter(name => name.endsWith('.json')) : []
  const others = []
  for (const name of names) {
    const note = readNote(join('leases', name))
    if (note === null || !isAlive(note)) removeNote(join('leases', name))
    else if (note.pid !== process.pid) others.push({ pid: Number(note.pid), who: String(note.who) })
  }
  return others
}

let isWaitingEnded = false

/** From now on nobody waits for another process's long work; the lock of the database is short and is still waited for. */
export function stopWaiting() {
  isWaitingEnded = true
}

/**
 * Runs `work` while no other process of this checkout runs work under the same name.
 * @template T
 * @param {string} name
 * @param {() => Promise<T>} work
 * @param {() => void} [onWait] called once when another process holds the lock
 * @returns {Promise<T>}
 */
export async function withLock(name, work, onWait) {
  ensureDataFolder()
  const path = join(dataFolder, `${name}.lock`)
  const mine = JSON.stringify({ pid: process.pid, birth: processBirth(process.pid) })
  let hasWaited = false
  for (;;) {
    try {
      writeFileSync(path, mine, { flag: 'wx' })
      break
    }
    catch (error) {
      if (!isErrorWithCode(error, 'EEXIST')) throw new Explained(`Cannot write ${path}: ${messageOf(error)}`)
    }
    const holder = readNote(`${name}.lock`)
    const ageMilliseconds = Date.now() - (statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? Date.now())
    // An empty lock is one being written just now, unless it has stayed empty.
    if (!isAlive(holder) && (holder !== null || ageMilliseconds > 5_000)) {
      rmSync(path, { force: true })
      continue
    }
    if (isWaitingEnded && name !== 'postgres') throw new Explained('Stopped while waiting for another process.')
    if (!hasWaited) onWait?.()
    hasWaited = true
    await new Promise(resolve => setTimeout(resolve, 100))
  }
  try {
    return await work()
  }
  finally {
    rmSync(path, { force: true })
  }
}

/**
 * @param {unknown} error
 * @param {string} code
 */
export function isErrorWithCode(error, code) {
  return error instanceof Error && 'code' in error && error.code === code
}

/** @param {unknown} error */
export function messageOf(error) {
  return error instanceof Error ? error.message : String(error)
}
