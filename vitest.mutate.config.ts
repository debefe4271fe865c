import { defineConfig } from 'vitest/config'
import base from './vitest.config'

/** The tests of the holding engine alone, for `npm run mutate`. */
export default defineConfig({
  resolve: base.resolve,
  test: {
    environment: 'node',
    isolate: false,
    include: ['tests/unit/holding/every.ts'],
    // A mutant that outlives so many logs outlives more of them.
    env: { ORACLE_LOGS: '2000' },
  },
})
