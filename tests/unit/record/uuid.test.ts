/** Ids against RFC 9562, 5.7 and its example in appendix A.6. */
import { describe, expect, it } from 'vitest'
import { uuidv7 } from '../../../shared/record/uuid'

describe('UUIDv7', () => {
  // RFC 9562, A.6: 2022-02-22T19:22:22.000Z is 017F22E2-79B0.
  it('begins with the milliseconds of the example', () => {
    expect(uuidv7(Date.UTC(2022, 1, 22, 19, 22, 22))).toMatch(/^017f22e2-79b0-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/)
  })

  it.each([0, 1, 2 ** 32 - 1, 2 ** 32, 2 ** 48 - 1])('carries %i ms', (now) => {
    const id = uuidv7(now)
    expect(Number.parseInt(id.slice(0, 8) + id.slice(9, 13), 16)).toBe(now)
    expect([id[14], '89ab'.includes(id[19]!)]).toEqual(['7', true])
  })

  it('sorts by time and does not repeat within a millisecond', () => {
    expect(uuidv7(1000) < uuidv7(1001)).toBe(true)
    expect(new Set(Array.from({ length: 1000 }, () => uuidv7(1000))).size).toBe(1000)
  })
})
