/** What a page of the browser bench runs: the same fold and the same check as the program's own screens. */
import { foldLog } from '~~/shared/record/fold'
import { verifyRecord, webSignatures } from '~~/shared/record/verify'
import { microseconds } from '../measure'

export const benches = {
  /** @returns ms */
  fold: (id: string, entries: Parameters<typeof foldLog>[1]) => microseconds(() => foldLog(id, entries), 1, 7) / 1_000,
  /** @returns ms, and how many faults were found */
  async verify(document: unknown) {
    const check = await webSignatures()
    const began = performance.now()
    const { faults } = await verifyRecord(document, { check })
    return { ms: performance.now() - began, faults: faults.length }
  },
}

Object.assign(globalThis, { benches })
