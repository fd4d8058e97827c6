import type { Config } from 'tailwindcss'

/** A colour token: a CSS variable of three numbers, so that Tailwind can add an alpha. */
const token = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

/** A type size as a share of the room's body text (18 px in the field, 15 px in the office), with its line height. */
const size = (share: number, lineHeight: string): [string, string] => [`calc(var(--text) * ${share})`, lineHeight]

/**
 * Lapel's tokens. The values of each theme stand in `app/assets/css/tailwind.css`; `tests/unit/app/contrast.test.ts`
 * holds the pairs of ink and ground that may be used together.
 */
export default {
  future: { hoverOnlyWhenSupported: true },
  theme: {
    colors: {
      'transparent': 'transparent',
      'current': 'currentColor',
      'paper': token('paper'),
      'surface': token('surface'),
      'sunken': token('sunken'),
      'ink': token('ink'),
      'muted': token('muted'),
      'chalk': token('chalk'),
      'line': token('line'),
      'felt': token('felt'),
      'felt-deep': token('felt-deep'),
      'on-felt': token('on-felt'),
      'felt-soft': token('felt-soft'),
      'thread': token('thread'),
      'thread-soft': token('thread-soft'),
      'madder': token('madder'),
      'on-madder': token('on-madder'),
      'madder-soft': token('madder-soft'),
    },
    fontFamily: {
      sans: ['"Atkinson Hyperlegible"', 'system-ui', 'sans-serif'],
    },
    fontSize: {
      'xs': size(0.8, '1.35'),
      'sm': size(0.889, '1.4'),
      'base': size(1, '1.5'),
      'lg': size(1.14, '1.4'),
      'xl': size(1.34, '1.3'),
      '2xl': size(1.67, '1.2'),
      '3xl': size(2.1, '1.12'),
      '4xl': size(2.67, '1.05'),
      '5xl': size(3.5, '1'),
    },
    borderRadius: { none: '0', sm: '2px', DEFAULT: '3px', full: '9999px' },
    extend: {
      borderWidth: { hair: 'var(--hairline)', edge: 'var(--edge)' },
      // control: a button or field of this room; target and primary: the field's sizes wherever they are used.
      minHeight: { control: 'var(--control)', small: 'var(--control-small)', target: '4rem', primary: '4.5rem' },
      minWidth: { control: 'var(--control)', small: 'var(--control-small)', target: '4rem' },
      height: { control: 'var(--control)' },
      maxWidth: { measure: '38rem' },
      keyframes: {
        rise: { from: { transform: 'translateY(1.5rem)', opacity: '0' }, to: { transform: 'none', opacity: '1' } },
        breathe: { '0%, 100%': { opacity: '1' }, '50%': { opacity: '0.45' } },
      },
      animation: { rise: 'rise 160ms ease-out', breathe: 'breathe 1.6s ease-in-out infinite' },
    },
  },
} satisfies Partial<Config>
