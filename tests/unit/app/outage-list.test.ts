// Orders and words are this project's own; no published source.
import { describe, expect, it } from 'vitest'
import { PHASES } from '~~/shared/record/phases'
import type { OutageItem } from '~~/shared/schemas/outage-list'
import { byUrgency, outagePath, standing, waitsForSupervisor, workWords } from '~/utils/outage-list'

const item = (more: Partial<OutageItem>): OutageItem => ({
  id: 'b', code: 'Q027-0041', phase: 'plan', planned: true,
  site: { id: 's', code: 'Q027', name: 'Quarry Street', timeZone: 'America/Chicago' },
  controller: { id: 'c', name: 'Rack A' },
  workKind: 'Software update', pointsInHand: 0, size: 3, openedAt: '2026-03-01T00:00:00.000Z', startsAt: null, darkAt: null, endedAt: null, held: false, planSubmitted: false, voices: 0, voicesLate: 0,
  ...more,
})

describe('byUrgency', () => {
  it('puts the longest dark first, then the phases by their nearness to dark', () => {
    const items = [
      item({ id: 'plan' }),
      item({ id: 'hand', phase: 'in-hand' }),
      item({ id: 'short', phase: 'dark', darkAt: '2026-03-03T08:20:00.000Z' }),
      item({ id: 'sealed', phase: 'sealed' }),
      item({ id: 'long', phase: 'dark', darkAt: '2026-03-03T08:10:00.000Z' }),
      item({ id: 'approved', phase: 'approved' }),
    ]
    expect(byUrgency(items).map(one => one.id)).toEqual(['long', 'short', 'hand', 'approved', 'plan', 'sealed'])
    expect(byUrgency([...items].reverse())).toEqual(byUrgency(items))
  })

  it('breaks ties on id and leaves what it was given as it was', () => {
    const items = [item({ id: 'b' }), item({ id: 'a' })]
    expect(byUrgency(items).map(one => one.id)).toEqual(['a', 'b'])
    expect(items.map(one => one.id)).toEqual(['b', 'a'])
  })
})

describe('outagePath', () => {
  it('opens the run while somebody works on it, the record afterwards', () => {
    expect(PHASES.filter(phase => outagePath({ id: '1', phase }, 'technician') === '/records/1')).toEqual(['submitted', 'sealed', 'called-off'])
    expect(outagePath({ id: '1', phase: 'dark' }, 'supervisor')).toBe('/outages/1')
  })

  it('leads an auditor to the record always', () => {
    expect(PHASES.every(phase => outagePath({ id: '1', phase }, 'auditor') === '/records/1')).toBe(true)
  })
})

describe('waitsForSupervisor', () => {
  it('holds of plans sent for approval and of submitted records', () => {
    expect(waitsForSupervisor(item({ planSubmitted: true }))).toBe(true)
    expect(waitsForSupervisor(item({ planSubmitted: false }))).toBe(false)
    expect(waitsForSupervisor(item({ voices: 1 }))).toBe(true)
    expect(waitsForSupervisor(item({ phase: 'submitted' }))).toBe(true)
    expect(waitsForSupervisor(item({ phase: 'dark', planSubmitted: true }))).toBe(false)
  })
})

describe('workWords', () => {
  it('says once that nobody planned it', () => {
    expect(workWords({ workKind: 'Software update', planned: true })).toBe('Software update')
    expect(workWords({ workKind: 'Controller swap', planned: false })).toBe('Controller swap, unplanned')
    expect(workWords({ workKind: 'Unplanned', planned: false })).toBe('Unplanned')
  })
})

describe('standing', () => {
  it('tells the time of the site, not of the reader', () => {
    expect(standing(item({ phase: 'dark', darkAt: '2026-03-03T08:11:00.000Z', pointsInHand: 26 }))).toBe('Without control since 02:11, 26 points in hand')
    expect(standing(item({ planSubmitted: true, startsAt: '2026-03-04T09:00:00.000Z' }))).toBe('Plan asks for approval, starts Wed 03:00')
    expect(standing(item({ phase: 'submitted', size: 64 }))).toBe('Record submitted, 64 entries')
  })

  it('has words for every phase', () => {
    for (const phase of PHASES) expect(standing(item({ phase }))).toMatch(/^[A-Z]/)
  })
})
