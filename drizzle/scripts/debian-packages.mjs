// @ts-check
// Installs Debian packages the project needs, as root or through sudo. Plain Node without packages.
import { accessSync, constants, existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { Explained } from './local-folder.mjs'
import { lastLines, runProtected } from './run-command.mjs'

/**
 * Finds a program on the PATH or in Debian's system folders.
 * @param {string} name
 * @returns {string | null}
 */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? '').split(delimiter), '/usr/local/sbin', '/usr/local/bin', '/usr/sbin', '/usr/bin', '/sbin', '/bin']
  for (const folder of folders) {
    if (folder === '') continue
    const path = join(folder, name)
    try {
      accessSync(path, constants.X_OK)
      return path
    }
    catch {
      // Not in this folder; look in the next.
    }
  }
  return null
}

/**
 * Installs packages by apt-get, after an update of its lists.
 * @param {string[]} packages
 * @param {{ purpose: string, prepare?: string, say: (line: string) => void }} options
 *   `prepare` is a shell line run as root before the install
 * @returns {Promise<void>}
 * @throws {Explained} with what to type when we may not or cannot install
 */
export async function installPackages(packages, { purpose, prepare, say }) {
  const byHand = [prepare, 'apt-get update', `apt-get install -y --no-install-recommends ${packages.join(' ')}`]
    .filter(line => line !== undefined)
    .map(line => `  sudo sh -c ${quote(line)}`)
    .join('\n')
  if (!existsSync('/usr/bin/apt-get')) {
    throw new Explained(`${purpose} needs ${packages.join(' and ')}, and this machine has no apt-get to install it with. Install it, then start again.`)
  }
  const asRoot = await waysToRoot()
  if (asRoot === null) {
    throw new Explained(`${purpose} needs ${packages.join(' and ')}, and installing needs root. Run this, then start again:\n${byHand}`)
  }
  say(`Installing ${packages.join(' and ')} (Debian packages)`)
  const environment = ['DEBIAN_FRONTEND=noninteractive', 'UCF_FORCE_CONFFOLD=1', 'LC_ALL=C.UTF-8', 'PATH=/usr/local/sbin:/usr/local/bin:/usr/sbin:/usr/bin:/sbin:/bin']
  const steps = [
    ...(prepare === undefined ? [] : [['sh', '-c', prepare]]),
    ['apt-get', '-q', '-o', 'DPkg::Lock::Timeout=120', 'update'],
    ['apt-get', '-q', '-y', '-o', 'DPkg::Lock::Timeout=120', '-o', 'Dpkg::Options::=--force-confold', 'install', '--no-install-recommends', ...packages],
  ]
  for (const step of steps) {
    const isUpdate = step.at(-1) === 'update'
    const [command, ...rest] = [...asRoot.prefix, 'env', ...environment, ...step]
    const result = await runProtected(String(command), rest, { show: asRoot.isInteractive })
    // One unreachable source makes an update fail although the package can be had; the install decides.
    if (result.code !== 0 && !isUpdate) {
      throw new Explained(`Installing ${packages.join(' and ')} failed:\n${lastLines(result)}\nTo do it by hand:\n${byHand}`)
    }
  }
}

/**
 * How this process may act as root: it is root, sudo asks for nothing, or sudo can ask the person at the terminal.
 * @returns {Promise<{ prefix: string[], isInteractive: boolean } | null>}
 */
async function waysToRoot() {
  if (process.getuid?.() === 0) return { prefix: [], isInteractive: false }
  const sudo = findProgram('sudo')
  if (sudo === null) return null
  if ((await runProtected(sudo, ['-n', 'true'])).code === 0) return { prefix: [sudo, '-n'], isInteractive: false }
  if (process.stdin.isTTY && process.stdout.isTTY) return { prefix: [sudo], isInteractive: true }
  return null
}

/** @param {string} text */
function quote(text) {
  return `'${text.replaceAll('\'', '\'\\\'\'')}'`
}
