/** A plan copied from an earlier outage; common practice, no source. Equipment is invented. */
import { describe, expect, it } from 'vitest'
import { workKindSchema } from '~~/shared/schemas/work'
import { quarryStreet } from '~~/server/database/seed/quarry-street'
import { WORK_KINDS } from '~~/server/database/seed/work-kinds'
import { copyPlan } from '~~/server/utils/order/copy-plan'
import { proposePlan } from '~~/server/utils/order/propose-plan'
import { snapshotOfSeed } from '../seed/snapshot'

const snapshot = snapshotOfSeed(quarryStreet)
const START = '2026-03-10T08:00:00.000Z'
const first = proposePlan(snapshot, { id: null, ...workKindSchema.parse(WORK_KINDS[0]) }, '2026-03-03T08:00:00.000Z')
const deli = snapshot.cases.find(item => item.name === 'Deli island 2')!.id
const earlier = {
  ...first,
  points: first.points.map(point => point.tag === 'LT-1' ? { ...point, hand: 'off' as const, reason: 'less heat in the cases' } : point),
  measures: [{ kind: 'night-covers' as const, caseIds: [deli], factor: 1.5, words: '' }],
  census: [{ tag: 'C-1', words: 'in hand since autumn' }],
}

describe('a copied plan', () => {
  it('keeps hand positions with their reasons, measures and steps; the start and the census are today\'s', () => {
    const { plan, gone, fresh } = copyPlan(earlier, 'Q027-0041', snapshot, START)
    expect([gone, fresh]).toEqual([[], []])
    expect(plan.points.find(point => point.tag === 'LT-1')).toEqual({ tag: 'LT-1', hand: 'off', reason: 'less heat in the cases' })
    expect(plan).toMatchObject({ startsAt: START, census: [], measures: earlier.measures, steps: earlier.steps, note: 'Copied from Q027-0041.' })
    expect(plan.order).toHaveLength(plan.points.length)
  })

  it('names what is no longer there, and takes in what is new as proposed', () => {
    const changed = { ...snapshot, points: snapshot.points.filter(point => point.tag !== 'LT-1'), cases: snapshot.cases.filter(item => item.id !== deli) }
    const without = { ...earlier, points: earlier.points.filter(point => point.tag !== 'C-4') }
    const { plan, gone, fresh } = copyPlan(without, 'Q027-0041', changed, START)
    expect([gone, fresh]).toEqual([['LT-1'], ['C-4']])
    expect(plan.note).toBe('Copied from Q027-0041. No longer there: LT-1. New since, as proposed: C-4.')
    expect(plan.points.some(point => point.tag === 'LT-1')).toBe(false)
    expect(plan.points.find(point => point.tag === 'C-4')!.hand).toBe('off')
    expect(plan.measures).toEqual([])
    expect(plan.cases.map(item => item.id)).toEqual(changed.cases.map(item => item.id))
  })
})
