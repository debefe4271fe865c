// Mutation testing of the holding engine: `npm run mutate`. See docs/mutation.md.
export default {
  testRunner: 'plain',
  plugins: ['./scripts/mutate/runner.mjs'],
  mutate: ['server/utils/holding/*.ts', 'server/utils/holding/rules/*.ts', '!server/utils/holding/{for-outage,site-settings,index,types}.ts'],
  ignorePatterns: ['.*', 'app', 'bench', 'coverage', 'dist', 'docs', 'e2e', 'public', 'reports', 'scripts', 'tests/api', 'tests/support', 'tools', '!.nuxt'],
  coverageAnalysis: 'off',
  concurrency: 1,
  timeoutMS: 20_000,
  reporters: ['progress-append-only', 'clear-text', 'json'],
  clearTextReporter: { allowColor: false, logTests: false, skipFull: true },
  jsonReporter: { fileName: 'reports/mutation.json' },
  tempDirName: 'reports/mutants',
  // What has been tried and is unchanged is not tried again.
  incremental: true,
  incrementalFile: 'reports/mutation-incremental.json',
  thresholds: { high: 95, low: 90, break: 90 },
  allowConsoleColors: false,
}
