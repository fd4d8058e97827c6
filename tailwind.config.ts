import type { Config } from 'tailwindcss'

/** A colour token: a CSS variable of three numbers, so that Tailwind can add an alpha. */
const token = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

/** Lapel's tokens. The values of each theme stand in `app/assets/css/tailwind.css`. */
export default {
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
      'on-felt': token('on-felt'),
      'felt-soft': token('felt-soft'),
      'thread': token('thread'),
      'thread-soft': token('thread-soft'),
      'madder': token('madder'),
      'madder-soft': token('madder-soft'),
    },
    fontFamily: {
      sans: ['"Atkinson Hyperlegible"', 'system-ui', 'sans-serif'],
    },
    extend: {
      minHeight: { target: '4rem', primary: '4.5rem' },
      minWidth: { target: '4rem' },
    },
  },
} satisfies Partial<Config>
