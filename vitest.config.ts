import tailwindcss from '@tailwindcss/vite'
import { defineConfig } from 'vitest/config'

/**
 * Five suites. `unit` and `conformance` are pure; `api`, `e2e` and `load` share one throw-away MariaDB
 * (tests/support/database.setup.ts), each file in a database of its own.
 */
export default defineConfig({
  plugins: [tailwindcss()],
  test: {
    reporters: ['default', './tests/support/closing-line-reporter.ts'],
    projects: [
      { test: { name: 'unit', include: ['tests/unit/**/*.test.{ts,tsx}'], testTimeout: 60_000 } },
      {
        test: {
          name: 'conformance',
          include: ['tests/conformance/**/*.test.ts'],
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'api',
          include: ['tests/api/**/*.test.ts'],
          globalSetup: ['tests/support/database.setup.ts'],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: ['tests/support/database.setup.ts', 'tests/support/build.setup.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
      {
        test: {
          name: 'load',
          include: ['tests/load/**/*.test.ts'],
          globalSetup: ['tests/support/database.setup.ts'],
          testTimeout: 180_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
})
