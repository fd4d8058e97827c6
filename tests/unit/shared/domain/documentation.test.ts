import { readdirSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'

/**
 * Reads the docstrings of the formulas and runs their examples, so that no example can grow stale.
 * An example is `call // result`, over one line or several; numbers must agree to one part in ten thousand,
 * and of an object only the fields that the example shows are compared.
 */
const FOLDER = resolve(import.meta.dirname, '../../../../shared/domain')
/** Guards are no formulas: their docstrings say when they throw, and that is all there is. */
const FILES = readdirSync(FOLDER).filter(file => file.endsWith('.ts') && file !== 'check.ts')

const modules = await Promise.all(FILES.map(file => import(`../../../../shared/domain/${file.replace(/\.ts$/, '')}.ts`)))
const everything = Object.assign({}, ...modules) as Record<string, unknown>

const documented = FILES.flatMap(file => functionsOf(readFileSync(resolve(FOLDER, file), 'utf8')).map(found => ({ file, ...found })))

describe('every formula is documented', () => {
  it('finds the formulas', () => {
    expect(documented.length).toBeGreaterThan(50)
  })

  it.each(documented)('$name in $file states its parameters, result, source and example', ({ name, docstring, parameters }) => {
    expect(docstring, `${name} needs a docstring directly above it`).not.toBe('')
    for (const tag of ['@returns', '@source', '@example']) expect(docstring, `${name} needs ${tag}`).toContain(tag)
    for (const parameter of parameters) expect(docstring, `${name} needs @param ${parameter}`).toContain(`@param ${parameter} `)
  })

  it.each(documented)('$name in $file gives what its example says', ({ name, docstring }) => {
    const { call, result } = exampleOf(name, docstring)
    expectShown(run(call), run(`(${result})`), `${call} // ${result}`)
  })
})

function functionsOf(source: string) {
  const pattern = /(\/\*\*(?:(?!\*\/)[\s\S])*\*\/\n)?export function (\w+)\(([^)]*)\)/g
  return [...source.matchAll(pattern)].map(([, docstring = '', name = '', list = '']) => ({
    name,
    docstring,
    // Optional parameters may go without words, and the fields of an object type are documented where the type stands.
    parameters: [...list.replace(/\{[^}]*\}/g, '').matchAll(/(\w+)(\??):/g)].filter(([, , optional]) => !optional).map(([, parameter = '']) => parameter),
  }))
}

function exampleOf(name: string, docstring: string) {
  const text = (docstring.split('@example')[1] ?? '').replace(/\*\/\s*$/, '').replace(/^\s*\* ?/gm, '').replace(/\s+/g, ' ')
  const [call, result] = text.split(' // ')
  if (!call || !result) throw new Error(`${name}: write the example as "call // result"`)
  return { call: call.trim(), result: result.trim() }
}

function run(expression: string): unknown {
  return new Function(...Object.keys(everything), `return ${expression}`)(...Object.values(everything))
}

function expectShown(actual: unknown, shown: unknown, example: string): void {
  if (typeof shown === 'number') {
    expect(actual, example).toBeTypeOf('number')
    expect(Math.abs(Number(actual) - shown), `${example}, got ${actual}`).toBeLessThanOrEqual(Math.abs(shown) * 1e-4 + 1e-9)
  }
  else if (typeof shown === 'object' && shown !== null) {
    expect(actual, example).toBeTypeOf('object')
    if (Array.isArray(shown)) expect(actual, example).toHaveLength(shown.length)
    for (const [key, value] of Object.entries(shown)) expectShown((actual as Record<string, unknown>)[key], value, `${example} at ${key}`)
  }
  else {
    expect(actual, example).toBe(shown)
  }
}
