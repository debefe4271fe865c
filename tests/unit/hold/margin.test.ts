/**
 * The margin of a plan. Formula of the hold: lumped capacitance, t = τ·ln((T∞ − T0)/(T∞ − L)) (Çengel, Heat and Mass
 * Transfer, ch. 4), worked out here by hand; factors, shares and gaps are our own estimates. Equipment is invented.
 */
import { describe, expect, it } from 'vitest'
import { otherMeasure } from '~~/shared/record/measures'
import type { Measure, Plan } from '~~/shared/record/plan'
import type { Snapshot } from '~~/shared/record/snapshot'
import { workKindSchema } from '~~/shared/schemas/work'
import { millLane } from '~~/server/database/seed/mill-lane'
import { quarryStreet } from '~~/server/database/seed/quarry-street'
import { WORK_KINDS } from '~~/server/database/seed/work-kinds'
import { planNotices } from '~~/server/utils/hold/notices'
import { leadMinutesOf, lengthenings, marginOf } from '~~/server/utils/hold/margin'
import type { PlanMargin } from '~~/server/utils/hold/margin'
import { proposePlan } from '~~/server/utils/order/propose-plan'
import { windowOf } from '~~/server/utils/window/for-plan'
import { snapshotOfSeed } from '../seed/snapshot'

const quarry = snapshotOfSeed(quarryStreet)
const mill = snapshotOfSeed(millLane)
const work = (kind: number) => ({ id: null, ...workKindSchema.parse(WORK_KINDS[kind]) })
/** 02:08 at Quarry Street, with A3's defrost of 22:30 behind it. */
const update = proposePlan(quarry, work(0), '2026-03-03T08:08:00.000Z')
const swap = proposePlan(mill, work(1), '2026-03-03T01:00:00.000Z')
const caseOf = (snapshot: Snapshot, name: string) => snapshot.cases.find(item => item.name === name)!
const holdOf = (margin: PlanMargin, name: string) => margin.cases.find(item => item.name === name)!
/** Every compressor off, and every valve with it. */
const uncovered = (plan: Plan): Plan => ({ ...plan, points: plan.points.map(point => point.tag.startsWith('C-') || point.tag.startsWith('K-') ? { ...point, hand: 'off' as const } : point) })
const measure = (kind: Measure['kind'], factor: number, ...caseIds: string[]): Measure => ({ kind, caseIds, factor, words: '' })

describe('with nothing running', () => {
  const margin = marginOf(quarry, uncovered(update))

  it('each case holds by its time constant, and the shortest makes the margin', () => {
    const dairy = holdOf(margin, 'Dairy wall 4–7')
    expect(dairy.plannedMinutes).toBeCloseTo(180 * Math.log((24 - 1.8) / (24 - 5)), 6)
    expect(dairy.plannedMinutes).toBe(dairy.bareMinutes)
    expect(margin.shortest).toBe('Dairy wall 4–7')
    expect(margin.minutes).toBeCloseTo(dairy.plannedMinutes! - update.duration.dark19in20, 9)
    expect(margin.minutes).toBeLessThan(0)
  })

  it('the rulebook\'s clock runs from the limit: four hours by FDA Food Code practice (Iowa DIAL)', () => {
    const { bareDeadline, bareMinutes } = holdOf(margin, 'Dairy wall 4–7')
    expect(bareDeadline! - bareMinutes!).toBeGreaterThan(228)
    expect(bareDeadline! - bareMinutes!).toBeLessThanOrEqual(241)
  })

  it('where the rulebook has no clock the deadline is the limit (SI 2013/2996 Sch 4: para 5(1) is for display alone)', () => {
    const cold = holdOf(marginOf(mill, uncovered(swap)), 'Cold room')
    expect(cold.bareDeadline).toBeCloseTo(720 * Math.log((24 - 2.6) / (24 - 8)), 6)
  })
})

describe('held on by hand', () => {
  const margin = marginOf(quarry, update)

  it('a case whose cover is near its load warms to nothing until its coil is iced', () => {
    const dairy = holdOf(margin, 'Dairy wall 4–7')
    expect(dairy.heldOn).toBe(true)
    expect(dairy.ends).toBe('iced')
    // Defrost over at 23:10, one and a half gaps of 6 h later iced, dark from 02:08 + lead.
    const iced = 8 * 60 + 10 - (2 * 60 + 8) - leadMinutesOf(update)
    expect(dairy.plannedMinutes).toBeCloseTo(iced + dairy.bareMinutes!, 6)
  })

  it('under far too little cover it warms toward the air that is left', () => {
    const meals = holdOf(marginOf(mill, swap), 'Ready meals')
    const supplyC = meals.supplyC!
    expect(supplyC).toBeGreaterThan(8)
    expect(meals.plannedMinutes).toBeCloseTo(180 * Math.log((supplyC - 3.4) / (supplyC - 8)), 6)
    expect(meals.plannedMinutes).toBeGreaterThan(meals.bareMinutes!)
  })

  it('under more cover than load it comes to its low mark', () => {
    const cold = { ...update, assumptions: [{ about: 'load-kw' as const, id: margin.covers[0]!.groupId, value: 50, reason: 'metered' }] }
    const found = marginOf(quarry, cold)
    const fish = holdOf(found, 'Fish service')
    expect(found.covers[0]!.held!.over).toBe(true)
    expect(fish.ends).toBe('low-mark')
    expect(fish.plannedMinutes).toBeCloseTo(150 * Math.log((0.2 - fish.supplyC!) / (-1 - fish.supplyC!)), 6)
  })

  it('not where its liquid valve is held closed', () => {
    const closed = { ...update, points: update.points.map(point => point.tag === 'LLS-A3' ? { ...point, hand: 'closed' as const } : point) }
    expect(holdOf(marginOf(quarry, closed), 'Dairy wall 4–7')).toMatchObject({ heldOn: false, ends: 'limit' })
    expect(holdOf(marginOf(quarry, closed), 'Fish service').heldOn).toBe(true)
  })
})

describe('what does not count', () => {
  it('a case whose own controller runs alone, and one that is not touched', () => {
    const margin = marginOf(mill, { ...swap, cases: swap.cases.map(item => ({ ...item, touched: item.touched && item.id !== caseOf(mill, 'Ready meals').id })) })
    expect(holdOf(margin, 'Freezer island').leftOut).toBe('its own controller keeps it going')
    expect(holdOf(margin, 'Ready meals').leftOut).toBe('not touched')
    expect(margin.shortest).toBe('Dairy wall')
  })

  it('nothing at all: no margin', () => {
    expect(marginOf(mill, { ...swap, cases: [] })).toMatchObject({ minutes: null, deadlineMinutes: null, shortestCase: null })
  })
})

describe('measures and assumptions', () => {
  const bare = uncovered(update)
  const deli = caseOf(quarry, 'Deli island 2').id

  it('a measure multiplies the hold of its cases by its factor', () => {
    const [before, after] = [marginOf(quarry, bare), marginOf(quarry, { ...bare, measures: [measure('night-covers', 1.5, deli), otherMeasure('staff told')] })]
    expect(holdOf(after, 'Deli island 2').bareMinutes).toBeCloseTo(1.5 * holdOf(before, 'Deli island 2').bareMinutes!, 6)
    expect(holdOf(after, 'Fish service').bareMinutes).toBe(holdOf(before, 'Fish service').bareMinutes)
  })

  it('frozen product too', () => {
    const freezer = caseOf(quarry, 'Freezer doors 9').id
    const [before, after] = [marginOf(quarry, bare), marginOf(quarry, { ...bare, measures: [measure('dry-ice', 2, freezer)] })]
    expect(holdOf(after, 'Freezer doors 9').bareMinutes! / holdOf(before, 'Freezer doors 9').bareMinutes!).toBeCloseTo(2, 6)
  })

  it('product that is moved out no longer counts', () => {
    expect(holdOf(marginOf(quarry, { ...bare, measures: [measure('product-moved', 1, deli)] }), 'Deli island 2').leftOut).toBe('its product is moved out before the start')
  })

  it('says what would lengthen the shortest, each with its factor', () => {
    const dairy = caseOf(quarry, 'Dairy wall 4–7').id
    const ways = lengthenings(quarry, bare, dairy)
    expect(ways.map(way => way.kind)).toEqual(['night-covers', 'earlier-defrost', 'product-moved'])
    expect(ways[0]!.minutes).toBeCloseTo(1.5 * 180 * Math.log(22.2 / 19), 6)
    expect(ways[2]!.minutes).toBeNull()
    expect(lengthenings(quarry, { ...bare, measures: [measure('night-covers', 1.5, dairy)] }, dairy).map(way => way.kind)).not.toContain('night-covers')
  })

  it('figures given with a reason are taken', () => {
    const assume = (about: Plan['assumptions'][number]['about'], id: string | null, value: number) => marginOf(quarry, { ...bare, assumptions: [{ about, id, value, reason: 'known better' }] })
    expect(holdOf(assume('air-c', null, 20), 'Dairy wall 4–7').bareMinutes).toBeCloseTo(180 * Math.log(18.2 / 15), 6)
    expect(holdOf(assume('start-c', deli, 3), 'Deli island 2')).toMatchObject({ startC: 3, startIs: 'changed' })
    expect(holdOf(assume('tau-hours', deli, 5), 'Deli island 2').bareMinutes).toBeCloseTo(300 * Math.log(23.2 / 19), 6)
    expect(assume('lead-minutes', null, 12).leadMinutes).toBe(12)
  })

  it('a temperature that was read comes before one that was assumed', () => {
    const margin = marginOf(quarry, { ...bare, assumptions: [{ about: 'start-c', id: deli, value: 3, reason: 'cool night' }] }, { read: { [deli]: 4 } })
    expect(holdOf(margin, 'Deli island 2')).toMatchObject({ startC: 4, startIs: 'read' })
    expect(marginOf(quarry, bare, { read: { [deli]: 6 } }).minutes).toBe(-update.duration.dark19in20)
  })
})

describe('the window', () => {
  it('names the defrosts inside with what to do, and five starts', () => {
    // 01:00 at Quarry Street: A1 from 00:15 to 00:45, A2 from 01:30 to 02:05.
    const { conflicts, starts } = windowOf(quarry, { ...update, startsAt: '2026-03-03T07:00:00.000Z' }, 60, Date.UTC(2026, 2, 2, 12))
    expect(conflicts).toEqual([
      { circuit: 'A1 produce', at: '2026-03-03T06:15:00.000Z', runBy: '2026-03-03T06:00:00.000Z', orStartAfter: '2026-03-03T07:15:00.000Z' },
      { circuit: 'A2 deli and fish', at: '2026-03-03T07:30:00.000Z', runBy: '2026-03-03T05:55:00.000Z', orStartAfter: '2026-03-03T08:35:00.000Z' },
    ])
    expect(starts).toHaveLength(5)
    expect(Date.parse(starts[0]!.at)).toBeGreaterThanOrEqual(Date.UTC(2026, 2, 2, 13))
  })
})

describe('notices', () => {
  it('say the duty to tell where the work comes near two hours (FDA Food Code 8-404.11)', () => {
    const margin = marginOf(quarry, update)
    expect(planNotices(quarry, margin)).toEqual([])
    expect(planNotices(quarry, { ...margin, workMinutes: 95 }).map(notice => notice.id)).toEqual(['tell'])
    expect(planNotices(quarry, { ...margin, deadlineMinutes: -12 }).map(notice => notice.id)).toEqual(['clock'])
  })
})
