import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

const serverOnlyStub = fileURLToPath(new URL('./tests/support/server-only.ts', import.meta.url))
const shared = { resolve: { tsconfigPaths: true, alias: { 'server-only': serverOnlyStub } } }

export default defineConfig({
  test: {
    projects: [
      {
        ...shared,
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/**/*.test.ts'],
          exclude: ['tests/e2e/**', 'tests/db/**', 'tests/server/**'],
          setupFiles: ['tests/support/fail-on-console.ts'],
        },
      },
      {
        ...shared,
        test: {
          name: 'database',
          environment: 'node',
          include: ['tests/db/**/*.test.ts', 'tests/server/**/*.test.ts'],
          globalSetup: ['tests/support/database-template.ts'],
          setupFiles: ['tests/support/fail-on-console.ts'],
        },
      },
      {
        ...shared,
        test: {
          name: 'components',
          environment: 'happy-dom',
          include: ['tests/**/*.test.tsx'],
          setupFiles: ['tests/support/fail-on-console.ts'],
        },
      },
    ],
  },
})
