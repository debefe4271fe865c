// Addresses of entries are this project's own.
import { describe, expect, it } from 'vitest'
import { entryAnchor, entryOfAnchor } from '../../../app/utils/entry-anchor'

describe('the place of an entry in an address', () => {
  it('names the entry that it was made for', () => {
    for (const seq of [1, 108, 2_000]) expect(entryOfAnchor(entryAnchor(seq))).toBe(seq)
  })

  it.each(['', '#', '#entry-', '#entry-0', '#entry-01', '#entry-1.5', '#entry-1x', '#record-plan', 'entry-3', '#entry-1234567890'])('is none in "%s"', (hash) => {
    expect(entryOfAnchor(hash)).toBeNull()
  })
})
