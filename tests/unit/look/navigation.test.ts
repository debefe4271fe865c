import { describe, expect, it } from 'vitest'
import { isWithin, navigationFor } from '../../../app/utils/navigation'

// The rooms of each role are the product's own decision.
describe('navigationFor', () => {
  const paths = (role: string | null) => navigationFor(role).map(item => item.to)

  it('shows people to the administrator alone', () => {
    expect(paths('administrator')).toContain('/people')
    for (const role of ['technician', 'supervisor', 'auditor']) expect(paths(role)).not.toContain('/people')
  })

  it('shows nothing without a known role', () => {
    expect(paths(null)).toEqual([])
    expect(paths('toString')).toEqual([])
  })

  it('marks the room that a page lies in', () => {
    expect(isWithin('/records/7', '/records')).toBe(true)
    expect(isWithin('/recordings', '/records')).toBe(false)
    expect(isWithin('/outages/7', '/')).toBe(true)
    expect(isWithin('/records', '/')).toBe(false)
  })
})
