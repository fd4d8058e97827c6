import { readdirSync, readFileSync } from 'node:fs'
import { dirname } from 'node:path'
import { fileURLToPath } from 'node:url'
import ts from 'typescript'
import { describe, expect, test } from 'vitest'

// `nuxt typecheck` looks at the files of four generated contexts and at nothing else; a file in none of them may hold any error.
const root = fileURLToPath(new URL('../../', import.meta.url))
const CONTEXTS = ['app', 'server', 'shared', 'node']
const UNCHECKED = ['eslint.config.mjs']

function filesOfContext(name: string): string[] {
  const path = `${root}.nuxt/tsconfig.${name}.json`
  const read = ts.readConfigFile(path, file => ts.sys.readFile(file))
  if (read.error !== undefined) throw new Error(`${path}: run npx nuxt prepare first`)
  return ts.parseJsonConfigFileContent(read.config, ts.sys, dirname(path)).fileNames
}

/** The scripts of the project, from its top; generated and installed folders are left out. */
function scripts(folder = ''): string[] {
  return readdirSync(root + folder, { withFileTypes: true }).flatMap((entry) => {
    if (entry.name.startsWith('.') || ['node_modules', 'public', 'test-results', 'playwright-report', 'coverage', 'dev-dist'].includes(entry.name)) return []
    if (entry.isDirectory()) return scripts(`${folder}${entry.name}/`)
    return /\.(?:ts|mts|mjs)$/.test(entry.name) ? [folder + entry.name] : []
  })
}

describe('the type contexts', () => {
  test('leave no file of the project unseen', () => {
    const seen = new Set(CONTEXTS.flatMap(filesOfContext))
    const all = scripts()
    expect(all).toContain('nuxt.config.ts')
    expect(all).toContain('tests/unit/type-contexts.test.ts')
    expect(all.filter(path => !seen.has(root + path) && !UNCHECKED.includes(path))).toEqual([])
  })

  test('check every plain script too', () => {
    const plain = scripts().filter(path => path.endsWith('.mjs') && !UNCHECKED.includes(path))
    expect(plain.length).toBeGreaterThan(0)
    expect(plain.filter(path => !/^(?:#!.*\n)?\/\/ @ts-check\n/.test(readFileSync(root + path, 'utf8')))).toEqual([])
  })

  test('are strict and none of them is left out of the check', () => {
    for (const name of CONTEXTS) {
      const config = ts.readConfigFile(`${root}.nuxt/tsconfig.${name}.json`, file => ts.sys.readFile(file)).config
      expect(config.compilerOptions.strict, name).toBe(true)
      expect(config.compilerOptions.allowJs, name).toBe(true)
    }
    const references: { path: string }[] = ts.readConfigFile(`${root}tsconfig.json`, file => ts.sys.readFile(file)).config.references
    expect(references.map(reference => reference.path).sort()).toEqual(CONTEXTS.map(name => `./.nuxt/tsconfig.${name}.json`).sort())
  })
})
