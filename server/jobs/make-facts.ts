import { makeMissingFacts } from '../utils/insights/keep'
import type { Job } from './job'

const SECONDS = 240

/** Makes what finished outages add to the insights where an older program left none. */
export const makeFactsJob: Job = {
  name: 'make-facts',
  every: 300,
  async run(db, now) {
    await makeMissingFacts(db, Date.now, now + SECONDS * 1000)
  },
}
