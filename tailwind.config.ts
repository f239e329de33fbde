import type { Config } from 'tailwindcss'

/** The colour names of the drafting sheet. Each is a CSS variable that the theme on <html> decides (app/globals.css). */
const colourNames = [
  'sheet',
  'card',
  'rule',
  'faint',
  'ink',
  'soft',
  'brass',
  'brass-fill',
  'on-fill',
  'verdigris',
  'steel',
  'oxide',
  'plum',
]

const config: Config = {
  content: [],
  theme: {
    // No palette beside our own: a stray `text-blue-600` must fail to exist rather than spoil the Night theme.
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      inherit: 'inherit',
      ...Object.fromEntries(colourNames.map((name) => [name, `var(--${name})`])),
    },
    fontFamily: {
      sans: ["'Atkinson Hyperlegible Next Variable'", 'ui-sans-serif', 'system-ui', 'sans-serif'],
      mono: ["'Atkinson Hyperlegible Mono Variable'", 'ui-monospace', 'monospace'],
    },
    fontSize: {
      xs: ['0.75rem', '1rem'],
      sm: ['0.8125rem', '1.1875rem'],
      base: ['0.9375rem', '1.375rem'],
      finding: ['1.0625rem', '1.5rem'],
      figure: ['1.4375rem', '1.75rem'],
      title: ['1.6875rem', '2rem'],
    },
    borderRadius: { none: '0', control: '6px', card: '10px', full: '9999px' },
    boxShadow: { none: 'none' },
  },
}

export default config
