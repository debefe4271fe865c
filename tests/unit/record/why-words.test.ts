/** Reasons in the site's time; the offsets are those of the IANA time zone data. */
import { describe, expect, it } from 'vitest'
import { localWhy } from '../../../shared/record/why-words'

const beside = Date.UTC(2026, 2, 3, 8, 24)

describe('a reason', () => {
  it('says instants in the site\'s time of day', () => {
    expect(localWhy('Counted: 2026-03-03 07:44 UTC to 2026-03-03 08:24:09 UTC, 40.15 minutes.', 'America/Chicago', beside)).toBe('Counted: 01:44 to 02:24:09, 40.15 minutes.')
  })
  it('with the date where it is not that day at the site', () => {
    expect(localWhy('began at 2026-03-03 05:30 UTC', 'America/Chicago', beside)).toBe('began at Mon 2 Mar 2026, 23:30')
  })
  it('through a change of the clocks: 01:59 and two minutes later 03:01', () => {
    const change = Date.UTC(2026, 2, 8, 8, 0)
    expect(localWhy('2026-03-08 07:59 UTC to 2026-03-08 08:01 UTC', 'America/Chicago', change)).toBe('01:59 to 03:01')
  })
  it('leaves all else as it is', () => {
    expect(localWhy('3-501.16(A)(2); FDA Food Code 2022 (read in a law).', 'UTC', beside)).toBe('3-501.16(A)(2); FDA Food Code 2022 (read in a law).')
  })
})
