/** Checkpoints: the growing root against the whole tree's (RFC 9162, 2.1.1), and logs that part from what was seen. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkpointSchema, follow, shortfall, statementBytes } from '../../../shared/record/checkpoint'
import { addLeaf, EMPTY_FRONTIER, frontierOf, frontierRoot, leafHash, logRoot, rootOf } from '../../../shared/record/merkle'
import { verifyBytes } from '../../../server/utils/record/keys'
import { server } from '../../support/record'
import { storyTo } from './store'

const { entries, checkpoints } = storyTo('dark')

describe('the root of a growing tree', () => {
  it('is at every size that of the whole tree', () => {
    fc.assert(fc.property(fc.array(fc.uint8Array({ maxLength: 8 }), { maxLength: 130 }), (data) => {
      const leaves = data.map(leafHash)
      let frontier = EMPTY_FRONTIER
      expect(frontierRoot(frontier)).toBe(Buffer.from(rootOf([])).toString('hex'))
      for (const [index, leaf] of leaves.entries()) {
        frontier = addLeaf(frontier, leaf)
        expect(frontierRoot(frontier)).toBe(Buffer.from(rootOf(leaves.slice(0, index + 1))).toString('hex'))
        expect(frontier.peaks).toHaveLength((index + 1).toString(2).replaceAll('0', '').length)
      }
    }), { numRuns: 60, seed: 9162 })
  })

  it('goes on from any earlier frontier', () => {
    for (const cut of [0, 1, 7, 8, entries.length]) expect(frontierRoot(frontierOf(entries.slice(cut), frontierOf(entries.slice(0, cut))))).toBe(logRoot(entries))
  })
})

describe('a checkpoint', () => {
  it('stands after every entry, signed by the server over the root so far', () => {
    expect(checkpoints).toHaveLength(entries.length)
    for (const { statement, signature } of checkpoints) {
      expect(checkpointSchema.safeParse({ statement, signature }).success).toBe(true)
      expect(statement.root).toBe(logRoot(entries.slice(0, statement.size)))
      expect(verifyBytes(statementBytes(statement), signature, server.publicKey)).toBe(true)
    }
  })

  it('is given by the log that it was seen in, wherever the log is read on from', () => {
    const seen = [checkpoints[4]!, checkpoints.at(-1)!]
    for (const from of [0, 3, 5]) expect(follow(frontierOf(entries.slice(0, from)), entries.slice(from), seen).parting).toBe(null)
  })

  it.each([
    ['an entry edited before it', 2, 6],
    ['an entry edited at it', 5, 6],
  ])('is not given by a log with %s', (_what, at, size) => {
    const other = entries.map((stored, index) => index === at ? { ...stored, receivedAt: '2026-03-02T00:00:00.000Z' } : stored)
    const { parting } = follow(EMPTY_FRONTIER, other, [checkpoints[size - 1]!])
    expect(parting).toEqual({ checkpoint: checkpoints[size - 1], root: logRoot(other.slice(0, size)) })
  })

  it('is still given where only a later entry differs', () => {
    const other = entries.map((stored, index) => index === 6 ? { ...stored, standing: 'questioned' as const } : stored)
    expect(follow(EMPTY_FRONTIER, other, [checkpoints[5]!]).parting).toBe(null)
  })

  it('beyond the end of a log shows that entries are gone', () => {
    expect(shortfall(5, [checkpoints[5]!])).toEqual({ checkpoint: checkpoints[5], root: null })
    expect(shortfall(6, [checkpoints[5]!])).toBe(null)
    expect(follow(EMPTY_FRONTIER, entries.slice(0, 5), [checkpoints[5]!]).parting).toBe(null)
  })
})
