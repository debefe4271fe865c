// Promises of this project's own (docs/decisions/0007-offline.md); fault injection from a seed: common practice, no source.
import { describe, expect, it } from 'vitest'
import { BROKEN } from './broken'
import { history } from './history'

/** `npm run test:faults` sets more, and may begin elsewhere. */
const HISTORIES = Number(process.env.HOLDOVER_HISTORIES ?? 1000)
const FIRST = Number(process.env.HOLDOVER_FIRST_HISTORY ?? 1)
const PATIENCE_MS = 15 * 60_000

describe('the outbox', () => {
  it(`loses, doubles, reorders and misnames nothing, and drains, in ${HISTORIES} histories of faults`, async () => {
    const wrong: { seed: number, faults: string[] }[] = []
    for (let seed = FIRST; seed < FIRST + HISTORIES && wrong.length < 5; seed++) {
      const faults = await history(seed)
      if (faults.length > 0) wrong.push({ seed, faults })
    }
    expect(wrong).toEqual([])
  }, PATIENCE_MS)

  it('goes the same way each time from one seed', async () => {
    const [one, other] = [await history(7, BROKEN['sends an entry ahead of those before it']), await history(7, BROKEN['sends an entry ahead of those before it'])]
    expect(one).toEqual(other)
  })
})

describe('the same histories find an outbox that', () => {
  it.each(Object.entries(BROKEN))('%s', async (_words, broken) => {
    let found: string[] = []
    for (let seed = FIRST; seed < FIRST + 300 && found.length === 0; seed++) found = await history(seed, broken)
    expect(found).not.toEqual([])
  }, PATIENCE_MS)
})
