import nextVitals from 'eslint-config-next/core-web-vitals'
import nextTypeScript from 'eslint-config-next/typescript'

/** Folders whose files may not import from the folders listed beside them (DEVELOPERS.md, "Who may import what"). */
const IMPURE = ['./app', './components', './db', './lib/client', './lib/server', './workers']
const PURE_FOLDERS = ['formats', 'figures', 'findings', 'mail', 'schemas']

const zones = [
  { target: './lib/analysis', from: [...IMPURE, './lib'], except: ['./analysis'] },
  { target: './lib/simulate', from: [...IMPURE, './lib'], except: ['./analysis', './simulate'] },
  ...PURE_FOLDERS.map((folder) => ({ target: `./lib/${folder}`, from: [...IMPURE, './lib/cli'] })),
  { target: './lib/*.ts', from: [...IMPURE, './lib/cli'] },
  { target: './lib/cli', from: IMPURE },
  { target: './workers', from: ['./app', './components', './db', './lib/cli', './lib/client', './lib/server'] },
  { target: './db', from: ['./app', './components', './lib/cli', './lib/client', './lib/server', './workers'] },
  { target: './lib/server', from: ['./app', './components', './lib/cli', './lib/client', './workers'] },
  { target: './lib/client', from: ['./app', './components', './db', './lib/cli', './lib/server'] },
  { target: './components', from: ['./app', './db', './lib/cli', './lib/server', './workers'] },
  { target: './app', from: ['./tests'] },
]

const flatZones = zones.flatMap(({ target, from, except }) =>
  from.map((source) => ({ target, from: source, ...(source === './lib' && except ? { except } : {}) })),
)

const config = [
  {
    ignores: [
      '.next/**',
      '.data/**',
      'node_modules/**',
      'next-env.d.ts',
      'test-results/**',
      'playwright-report/**',
      'public/**',
    ],
  },
  ...nextVitals,
  ...nextTypeScript,
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      'import/no-restricted-paths': ['error', { zones: flatZones }],
    },
  },
  {
    files: ['lib/*.ts', ...['analysis', 'simulate', ...PURE_FOLDERS].map((folder) => `lib/${folder}/**`)],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            { regex: '^(react|react-dom|next|swr|kysely|pg|node:.*)($|/)', message: 'This part of lib is pure.' },
          ],
        },
      ],
    },
  },
  {
    // Migrations must outlive every type of the application, so Kysely asks for an untyped connection there.
    files: ['db/migrations/**'],
    rules: { '@typescript-eslint/no-explicit-any': 'off' },
  },
]

export default config
