/**
 * Mutation testing of the domain: `npm run mutation`, or one part with `npm run mutation -- --mutate 'shared/domain/measuring/*.ts'`.
 * Definitions of sheets are data, frozen by their hash in tests; vocabularies hold no logic.
 */
export default {
  packageManager: 'npm',
  testRunner: 'vitest',
  plugins: ['@stryker-mutator/vitest-runner'],
  vitest: { configFile: 'tests/support/vitest.mutation.config.ts' },
  mutate: ['shared/domain/**/*.ts', '!shared/domain/measuring/sheets/**', '!shared/domain/**/index.ts'],
  ignorePatterns: ['/.nuxt', '/.output', '/.data', '/db', '/server', '/pages', '/components', '/public', '/assets'],
  tempDirName: '.cache/stryker',
  concurrency: 2,
  coverageAnalysis: 'perTest',
  ignoreStatic: true,
  timeoutMS: 20_000,
  reporters: ['clear-text', 'progress', 'json'],
  jsonReporter: { fileName: 'reports/mutation.json' },
  thresholds: { high: 95, low: 90, break: 90 },
}
