// The rooms of each role are this project's own; no published source.
import { describe, expect, it } from 'vitest'
import { isWithin, navigationFor } from '~/utils/navigation'

const paths = (role: string | null) => navigationFor(role).map(item => item.to)

describe('navigationFor', () => {
  it('gives people to administrators alone', () => {
    expect(paths('administrator')).toContain('/people')
    for (const role of ['technician', 'supervisor', 'auditor']) expect(paths(role)).not.toContain('/people')
  })

  it('begins with the first page and ends with the account', () => {
    for (const role of ['technician', 'supervisor', 'auditor', 'administrator']) {
      expect(paths(role)[0]).toBe(role === 'supervisor' ? '/watch' : '/')
      expect(paths(role).at(-1)).toBe('/account')
    }
  })

  it('leads supervisors, auditors and administrators to the watch', () => {
    for (const role of ['supervisor', 'auditor', 'administrator']) expect(paths(role)).toContain('/watch')
    expect(paths('technician')).not.toContain('/watch')
  })

  it.each([null, undefined, '', 'owner', 'toString', '__proto__'])('gives nothing to %j', (role) => {
    expect(navigationFor(role)).toEqual([])
  })
})

describe('isWithin', () => {
  it.each([
    ['/', '/', true],
    ['/outages/1/rounds', '/', true],
    ['/records', '/', false],
    ['/records/1', '/records', true],
    ['/recordsets', '/records', false],
    ['/people/new', '/people', true],
    ['/admin/mailbox/1', '/admin/mail', true],
  ])('%s in the room of %s: %s', (path, to, within) => {
    expect(isWithin(path, to)).toBe(within)
  })
})
