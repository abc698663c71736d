import { defineConfig } from 'vitest/config'

/** What judges a mutant of the verdict core, `npm run mutants`: exact tests, none that tries random systems. */
export default defineConfig({
  test: {
    include: [
      'tests/unit/checks/{identity,layers,outcomes,pair-states,stack-ratio,stand-ins,token-standing,verdict,waivers}.test.ts',
      'tests/unit/color/{difference,luminance,render}.test.ts',
    ],
  },
})
