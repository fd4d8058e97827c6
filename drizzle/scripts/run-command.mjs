// @ts-check
// Runs another program and waits for it. Plain Node without packages.
import { spawn } from 'node:child_process'

/**
 * @typedef {object} CommandResult
 * @property {number} code exit code; 128 plus the signal's number when a signal ended it; 127 when it could not be started
 * @property {string} output
 * @property {string} errors
 */

/** Children still running, so that a person's Ctrl-C can end them. @type {Set<import('node:child_process').ChildProcess>} */
const children = new Set()

/**
 * Runs a program to its end. It gets its own process group, so that Ctrl-C reaches only us and we decide the order of stopping.
 * @param {string} command
 * @param {string[]} commandArguments
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, uid?: number, gid?: number, input?: string, show?: boolean, isProtected?: boolean, onLine?: (line: string) => void }} [options]
 *   `isProtected` keeps it from `endRunningCommands`: a database or a Debian package half made is worse than a wait;
 *   `show` gives the program this terminal, for a password prompt or long progress; `onLine` sees each line as it comes
 * @returns {Promise<CommandResult>}
 */
export function runCommand(command, commandArguments, options = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, commandArguments, {
      cwd: options.cwd ?? '/',
      env: options.env ?? process.env,
      uid: options.uid,
      gid: options.gid,
      detached: !options.show,
      stdio: options.show ? 'inherit' : 'pipe',
    })
    if (!options.isProtected) children.add(child)
    let output = ''
    let errors = ''
    let rest = ''
    child.stdout?.setEncoding('utf8').on('data', (/** @type {string} */ text) => {
      output += text
      if (options.onLine) rest = passLines(rest + text, options.onLine)
    })
    child.stderr?.setEncoding('utf8').on('data', (/** @type {string} */ text) => {
      errors += text
      if (options.onLine) rest = passLines(rest + text, options.onLine)
    })
    child.on('error', (error) => {
      children.delete(child)
      resolve({ code: 127, output, errors: errors + error.message })
    })
    child.on('close', (code, signal) => {
      children.delete(child)
      if (rest !== '') options.onLine?.(rest)
      resolve({ code: code ?? (signal === 'SIGINT' ? 130 : signal === 'SIGKILL' ? 137 : 143), output, errors })
    })
    // A program that ends without reading its input is judged by its exit code, not by the broken pipe.
    child.stdin?.on('error', () => {})
    child.stdin?.end(options.input ?? '')
  })
}

/**
 * `runCommand` for what must not be ended midway.
 * @param {string} command
 * @param {string[]} commandArguments
 * @param {Parameters<typeof runCommand>[2]} [options]
 */
export function runProtected(command, commandArguments, options = {}) {
  return runCommand(command, commandArguments, { ...options, isProtected: true })
}

/**
 * @param {string} text
 * @param {(line: string) => void} onLine
 */
function passLines(text, onLine) {
  const lines = text.split('\n')
  const rest = lines.pop() ?? ''
  for (const line of lines) onLine(line)
  return rest
}

/**
 * Sends a signal to every unprotected program `runCommand` still waits for, and to what those started.
 * @param {NodeJS.Signals} [signal]
 */
export function endRunningCommands(signal = 'SIGTERM') {
  for (const child of children) {
    if (child.pid === undefined) continue
    try {
      process.kill(-child.pid, signal)
    }
    catch {
      child.kill(signal)
    }
  }
}

/**
 * The last lines of what a program said, for the sentence about its failure.
 * @param {CommandResult} result
 * @param {number} [count]
 */
export function lastLines(result, count = 25) {
  return `${result.output}\n${result.errors}`.split('\n').filter(line => line.trim() !== '').slice(-count).join('\n')
}
