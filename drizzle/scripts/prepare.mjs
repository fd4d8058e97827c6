// @ts-check
// What must be there before the app can run: packages, tables, demo data, a build. Each step does nothing when nothing
// changed. Plain Node without packages, because the first step is to get them.
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { findProgram } from './debian-packages.mjs'
import { checkout, dataFolder, ensureDataFolder, Explained, readNote, removeNote, withLock, writeNote } from './local-folder.mjs'
import { lastLines, runCommand } from './run-command.mjs'

const BUILD_NOTE = 'build.json'
const BUILT_FROM = ['app', 'server', 'shared', 'public', 'nuxt.config.ts', 'tailwind.config.ts', 'tsconfig.json', 'package.json', 'package-lock.json']

/** The program of the built app. */
export const SERVER_ENTRY = join(checkout, '.output', 'server', 'index.mjs')

/** What the tools of the project see besides the person's own settings. */
function toolEnvironment() {
  return { ...process.env, NUXT_TELEMETRY_DISABLED: '1', NO_UPDATE_NOTIFIER: '1', npm_config_update_notifier: 'false' }
}

/**
 * Installs the packages of package-lock.json when they are missing or other versions than it says.
 * @param {(line: string) => void} say
 * @returns {Promise<boolean>} whether anything was installed
 */
export async function ensurePackages(say) {
  if (arePackagesInstalled()) return false
  return withLock('packages', async () => {
    if (arePackagesInstalled()) return false
    say('Installing the packages (npm ci, a minute or two the first time)')
    const npm = process.env.npm_execpath?.endsWith('.js') ? process.env.npm_execpath : findProgram('npm')
    if (npm === null) throw new Explained('npm was not found. It comes with Node: install both, then start again.')
    const [command, first] = npm.endsWith('.js') ? [process.execPath, [npm]] : [npm, []]
    // tsx and vite are development packages and needed to run, so NODE_ENV=production must not leave them out.
    const installed = await runCommand(command, [...first, 'ci', '--include=dev', '--no-audit', '--no-fund'], { cwd: checkout, env: toolEnvironment() })
    if (installed.code !== 0) throw new Explained(`npm ci failed:\n${lastLines(installed)}${logLine('npm-ci.log', installed)}`)
    return true
  }, () => say('Waiting for another start that installs the packages'))
}

/**
 * npm notes what it really installed in node_modules/.package-lock.json, last of all; so a broken install is seen too.
 * @returns {boolean}
 */
function arePackagesInstalled() {
  /** @type {Record<string, { version?: string, optional?: boolean, devOptional?: boolean, peer?: boolean }>} */
  let wanted
  /** @type {typeof wanted} */
  let there
  try {
    wanted = JSON.parse(readFileSync(join(checkout, 'package-lock.json'), 'utf8')).packages
    there = JSON.parse(readFileSync(join(checkout, 'node_modules', '.package-lock.json'), 'utf8')).packages
  }
  catch {
    return false
  }
  return Object.entries(wanted).every(([path, entry]) => {
    if (path === '') return true
    // Optional packages are mostly builds for other kinds of machine.
    if (there[path] === undefined) return entry.optional === true || entry.devOptional === true
    return there[path].version === entry.version
  }) && existsSync(join(checkout, 'node_modules', 'nuxt', 'package.json'))
}

/** Makes `.nuxt`, from which the type contexts and the tests read, when it is missing. */
export async function ensureGeneratedTypes() {
  if (existsSync(join(checkout, '.nuxt', 'tsconfig.shared.json')) && existsSync(join(checkout, '.nuxt', 'tsconfig.server.json'))) return
  const prepared = await runNuxt(['prepare'])
  if (prepared.code !== 0) throw new Explained(`nuxt prepare failed:\n${lastLines(prepared)}`)
}

/**
 * Builds the app unless the build there is of these very sources.
 * @param {(line: string) => void} say
 * @returns {Promise<boolean>} whether it was built now
 */
export async function ensureBuild(say) {
  return withLock('build', async () => {
    const sources = hashSources()
    if (readNote(BUILD_NOTE)?.sources === sources && existsSync(SERVER_ENTRY)) return false
    say('Building the app (a minute or two)')
    removeNote(BUILD_NOTE)
    const built = await runNuxt(['build'])
    if (built.code !== 0 || !existsSync(SERVER_ENTRY)) throw new Explained(`The build failed:\n${lastLines(built, 40)}${logLine('build.log', built)}`)
    writeNote(BUILD_NOTE, { sources })
    return true
  }, () => say('Waiting for another build'))
}

/**
 * One hash over the names and contents of everything a build reads, and over the Node that builds.
 * @returns {string}
 */
function hashSources() {
  const hash = createHash('sha256').update(process.versions.node)
  for (const name of BUILT_FROM) hashPath(hash, name)
  return hash.digest('hex')
}

/**
 * @param {import('node:crypto').Hash} hash
 * @param {string} path relative to the checkout
 */
function hashPath(hash, path) {
  const full = join(checkout, path)
  /** @type {import('node:fs').Dirent[]} */
  let entries
  try {
    entries = readdirSync(full, { withFileTypes: true })
  }
  catch {
    if (existsSync(full)) hash.update(`\0${path}\0`).update(readFileSync(full))
    return
  }
  for (const entry of entries.sort((a, b) => (a.name < b.name ? -1 : 1))) {
    if (entry.isDirectory() || entry.isFile()) hashPath(hash, join(path, entry.name))
  }
}

/**
 * @param {string[]} words
 * @param {import('node:child_process').SpawnOptions['env']} [environment]
 */
function runNuxt(words, environment = {}) {
  return runCommand(process.execPath, [join(checkout, 'node_modules', 'nuxt', 'bin', 'nuxt.mjs'), ...words], {
    cwd: checkout,
    env: { ...toolEnvironment(), NODE_ENV: 'production', ...environment },
  })
}

/**
 * Brings the tables up to date.
 * @param {string} ownerUrl
 * @returns {Promise<string>} what the migrator said
 */
export async function migrate(ownerUrl) {
  return runScript('migrate.ts', { DATABASE_OWNER_URL: ownerUrl, DATABASE_URL: ownerUrl }, 'The tables could not be brought up to date.')
}

/**
 * Puts the demo organisation into the database, unless it is there.
 * @param {{ ownerUrl: string, appUrl: string }} urls
 * @returns {Promise<string | null>} what the seed script said; null when the project has none
 */
export async function seedDemo({ ownerUrl, appUrl }) {
  if (!existsSync(join(checkout, 'drizzle', 'scripts', 'seed.ts'))) return null
  // Two first starts at once must not both find the database empty.
  return withLock('seed', () => runScript('seed.ts', { DATABASE_OWNER_URL: ownerUrl, DATABASE_URL: appUrl, NUXT_DATABASE_URL: appUrl, LAPEL_DEMO: '1' }, 'The demo data could not be loaded.'))
}

/**
 * @param {string} name
 * @param {Record<string, string>} environment
 * @param {string} failure
 */
async function runScript(name, environment, failure) {
  const result = await runCommand(process.execPath, ['--import', 'tsx', join('drizzle', 'scripts', name)], {
    cwd: checkout,
    env: { ...toolEnvironment(), ...environment },
  })
  if (result.code !== 0) throw new Explained(`${failure}\n${lastLines(result)}`)
  return result.output.trim().split('\n').at(-1) ?? ''
}

/**
 * @typedef {object} DemoSignIn
 * @property {string} email
 * @property {string} password
 * @property {string} role
 */

/**
 * The people of the demo who can sign in.
 * @returns {DemoSignIn[]}
 */
export function readDemoSignIns() {
  const path = join(checkout, 'drizzle', 'seeds', 'demo-sign-ins.json')
  if (!existsSync(path)) return []
  return JSON.parse(readFileSync(path, 'utf8'))
}

/**
 * Keeps the whole of what a failed tool said.
 * @param {string} name
 * @param {import('./run-command.mjs').CommandResult} result
 */
function logLine(name, result) {
  ensureDataFolder()
  const folder = join(dataFolder, 'logs')
  mkdirSync(folder, { recursive: true })
  const path = join(folder, name)
  writeFileSync(path, `${result.output}\n${result.errors}`)
  return `\nAll it said is in ${path}`
}
