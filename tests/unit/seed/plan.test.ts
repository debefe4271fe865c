/** What the demo's equipment must be able to carry: a plan that no rule of overrides speaks against. */
import { describe, expect, it } from 'vitest'
import { planSchema } from '~~/shared/record/plan'
import { handWords } from '~~/shared/schemas/point-kinds'
import { workKindSchema } from '~~/shared/schemas/work'
import { abbotGreen } from '~~/server/database/seed/abbot-green'
import { millLane } from '~~/server/database/seed/mill-lane'
import { quarryStreet } from '~~/server/database/seed/quarry-street'
import { WORK_KINDS } from '~~/server/database/seed/work-kinds'
import { proposePlan } from '~~/server/utils/order/propose-plan'
import { inHandOrder } from '~~/server/utils/order/for-outage'
import { snapshotOfSeed } from './snapshot'

const work = { id: null, ...workKindSchema.parse(WORK_KINDS[0]) }

describe('the demo\'s equipment', () => {
  for (const seed of [quarryStreet, millLane, abbotGreen]) {
    it(`gives ${seed.site.name} a plan without refusals`, () => {
      const snapshot = snapshotOfSeed(seed)
      const plan = planSchema.parse(proposePlan(snapshot, work, '2026-03-03T08:00:00.000Z'))
      expect(inHandOrder(snapshot, plan.points).refusals).toEqual([])
      expect(plan.points).toHaveLength(snapshot.points.length)
      expect(plan.order).toHaveLength(snapshot.points.length)
    })
  }

  it('holds two compressors on at Quarry Street\'s medium-temperature rack and one at the other', () => {
    const plan = proposePlan(snapshotOfSeed(quarryStreet), work, null)
    const held = Object.fromEntries(plan.points.map(point => [point.tag, handWords(point.hand)]))
    const on = Object.keys(held).filter(tag => tag.startsWith('C-') && held[tag] === 'on')
    expect(on).toEqual(['C-1', 'C-2', 'C-5'])
    expect(held['DR-1']).toBe('60 Hz')
    expect(['DH-A4', 'DH-B1', 'DH-B2'].map(tag => held[tag])).toEqual(['off', 'off', 'off'])
  })

  it('has the numbers of machines that the demo promises', () => {
    const { points, circuits, cases, racks } = snapshotOfSeed(quarryStreet)
    expect([racks.length, circuits.length, cases.length, points.length]).toEqual([2, 6, 11, 30])
    expect(points.filter(point => point.kind === 'compressor')).toHaveLength(7)
    expect(points.filter(point => point.kind === 'condenser-fan')).toHaveLength(4)
    expect(points.filter(point => point.kind === 'compressor' && point.guards.length === 0)).toEqual([])
  })

  it('keeps control away between 22 and 30 minutes in the mean during a software update', () => {
    const { duration } = proposePlan(snapshotOfSeed(quarryStreet), work, null)
    expect(duration.darkMean).toBeGreaterThan(22)
    expect(duration.darkMean).toBeLessThan(30)
    expect(duration.dark19in20).toBeGreaterThan(duration.darkMean)
  })
})
