/**
 * A quarter of 20,000 attacks on sealed records by somebody with full rights over the database; in four files, so that
 * they run side by side. What must be found is this project's own demand, no published source.
 */
import { expect, it } from 'vitest'
import { recordsToAttack, underAttack } from './under-attack'

it('shows each of 5,000 attacks, and names the entry where one is concerned', async () => {
  const { failures, counts } = await underAttack(recordsToAttack(), 2029, 5000)
  expect(failures.slice(0, 20)).toEqual([])
  expect(Object.keys(counts).length).toBeGreaterThanOrEqual(22)
  expect(Math.min(...Object.values(counts))).toBeGreaterThan(10)
}, 300_000)
