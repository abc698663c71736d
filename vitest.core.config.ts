import { defineConfig } from 'vitest/config'

/** Branch coverage of the engine, `npm run coverage`: every test without a database that calls it. */
export default defineConfig({
  test: {
    include: [
      'tests/unit/{api,checks,color,demo,formats,gate}/**/*.test.ts',
      'tests/conformance/*.test.ts',
    ],
    exclude: ['tests/conformance/{boundaries,openapi}.test.ts'],
    testTimeout: 300_000,
    coverage: {
      enabled: true,
      include: ['shared/{checks,color}/**'],
      reporter: ['text', 'json'],
      reportOnFailure: true,
      reportsDirectory: 'dist/coverage',
      thresholds: { branches: 100 },
    },
  },
})
