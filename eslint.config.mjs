import nextVitals from 'eslint-config-next/core-web-vitals'
import nextTypeScript from 'eslint-config-next/typescript'

/** Folders whose files may not import from the folders listed beside them (DEVELOPERS.md, "Who may import what"). */
const zones = [
  { target: './lib/analysis', from: ['./app', './components', './db', './lib', './workers'], except: ['./analysis'] },
  {
    target: './lib/simulate',
    from: ['./app', './components', './db', './lib/client', './lib/server', './lib/formats', './workers'],
  },
  { target: './lib/formats', from: ['./app', './components', './db', './lib/client', './lib/server', './workers'] },
  { target: './lib/figures', from: ['./app', './components', './db', './lib/client', './lib/server', './workers'] },
  { target: './lib/findings', from: ['./app', './components', './db', './lib/client', './lib/server', './workers'] },
  { target: './lib/mail', from: ['./app', './components', './db', './lib/client', './lib/server', './workers'] },
  { target: './lib/schemas', from: ['./app', './components', './db', './lib/client', './lib/server', './workers'] },
  { target: './lib/cli', from: ['./app', './components', './db', './lib/client', './lib/server', './workers'] },
  { target: './workers', from: ['./app', './components', './db', './lib/client', './lib/server'] },
  { target: './db', from: ['./app', './components', './lib/client', './lib/server', './workers'] },
  { target: './lib/server', from: ['./app', './components', './lib/client', './workers'] },
  { target: './lib/client', from: ['./app', './components', './db', './lib/server'] },
  { target: './components', from: ['./app', './db', './lib/server', './workers'] },
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
    // Migrations must outlive every type of the application, so Kysely asks for an untyped connection there.
    files: ['db/migrations/**'],
    rules: { '@typescript-eslint/no-explicit-any': 'off' },
  },
]

export default config
