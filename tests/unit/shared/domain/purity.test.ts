import { readdirSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'

const FOLDER = resolve(import.meta.dirname, '../../../../shared/domain')
const files = readdirSync(FOLDER).map(file => ({ file, text: readFileSync(resolve(FOLDER, file), 'utf8') }))

describe('the formulas', () => {
  it.each(files)('in $file import nothing but each other', ({ text }) => {
    for (const [, from] of text.matchAll(/from '([^']+)'/g)) expect(from).toMatch(/^\.\/[a-z-]+$/)
    expect(text).not.toMatch(/\bimport\(|\brequire\(/)
  })

  it.each(files)('in $file ask neither clock nor chance nor language', ({ text }) => {
    expect(text).not.toMatch(/Date\.now|new Date\(\)|performance\.|Math\.random|crypto|toLocale|navigator|Intl\.NumberFormat|resolvedOptions/)
  })

  it.each(files)('in $file round nothing on the way', ({ file, text }) => {
    if (file !== 'rounding.ts') expect(text).not.toMatch(/Math\.round|toFixed|toPrecision/)
  })
})
