import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'

// WCAG 2.2: contrast ratio and relative luminance as defined in its glossary; 7:1 is success criterion 1.4.6 (enhanced),
// 4.5:1 for large text, icons and borders in the field is our own rule (1.4.11 asks for 3:1).
const TEXT = 7
const SHAPE = 4.5

/** Every ink that may stand on a ground as running text. */
const TEXT_PAIRS: Record<string, string[]> = {
  'ink': ['paper', 'surface', 'sunken', 'felt-soft', 'thread-soft', 'madder-soft'],
  'muted': ['paper', 'surface', 'sunken', 'felt-soft', 'thread-soft', 'madder-soft'],
  'felt': ['paper', 'surface'],
  'felt-deep': ['paper', 'surface', 'sunken', 'felt-soft'],
  'thread': ['paper', 'surface', 'sunken', 'thread-soft'],
  'madder': ['paper', 'surface', 'sunken', 'madder-soft'],
  'on-felt': ['felt', 'felt-deep'],
  'on-madder': ['madder'],
  'surface': ['ink'],
}

/** Edges, icons and drawn shapes on their grounds. */
const SHAPE_PAIRS: Record<string, string[]> = {
  line: ['paper', 'surface', 'sunken', 'felt-soft', 'thread-soft', 'madder-soft'],
  felt: ['paper', 'surface', 'sunken', 'felt-soft', 'thread-soft'],
  thread: ['surface', 'thread-soft'],
  madder: ['surface', 'madder-soft'],
  ink: ['surface', 'paper'],
}

const themes = readThemes(readFileSync('app/assets/css/tailwind.css', 'utf8'))

describe('contrast', () => {
  it('finds the themes and the same names in each', () => {
    expect(Object.keys(themes)).toEqual(expect.arrayContaining(['day', 'sun']))
    const names = Object.keys(themes.day ?? {})
    for (const theme of Object.values(themes)) expect(Object.keys(theme)).toEqual(names)
  })

  it('computes the ratios of the standard', () => {
    expect(contrast([0, 0, 0], [255, 255, 255])).toBe(21)
    // #777777 on white is the well-known grey just below 4.5:1.
    expect(contrast([119, 119, 119], [255, 255, 255])).toBeCloseTo(4.48, 2)
  })

  for (const [themeName, theme] of Object.entries(themes)) {
    for (const [pairs, least] of [[TEXT_PAIRS, TEXT], [SHAPE_PAIRS, SHAPE]] as const) {
      for (const [ink, grounds] of Object.entries(pairs)) {
        it.each(grounds)(`gives ${ink} in ${themeName} at least ${least}:1 on %s`, (ground) => {
          expect(contrast(colour(theme, ink), colour(theme, ground))).toBeGreaterThanOrEqual(least)
        })
      }
    }
  }
})

type Colour = readonly [number, number, number]
type Theme = Record<string, Colour>

/** Reads each block that belongs to a theme: `:root[data-theme='day'] { --paper: 250 248 243; ... }`. */
function readThemes(css: string): Record<string, Theme> {
  const found: Record<string, Theme> = {}
  for (const [, name = '', block = ''] of css.matchAll(/:root\[data-theme='(\w+)'\]\s*\{([^}]*)\}/g)) {
    const colours = [...block.matchAll(/--([\w-]+):\s*(\d+) (\d+) (\d+);/g)]
    found[name] = Object.fromEntries(colours.map(([, token = '', red, green, blue]) => [token, [Number(red), Number(green), Number(blue)]]))
  }
  return found
}

function colour(theme: Theme, name: string): Colour {
  const value = theme[name]
  if (!value) throw new Error(`The theme has no colour --${name}: add it to its block in tailwind.css`)
  return value
}

function contrast(one: Colour, other: Colour): number {
  const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b)
  return (light + 0.05) / (dark + 0.05)
}

function luminance(colour: Colour): number {
  const [red = 0, green = 0, blue = 0] = colour.map((part) => {
    const share = part / 255
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}
