/** Cover of a real plan: rule I4 (common practice, no source); the load share of 60 % is our own estimate. Equipment is invented. */
import { describe, expect, it } from 'vitest'
import { workKindSchema } from '~~/shared/schemas/work'
import { handWords } from '~~/shared/schemas/point-kinds'
import { abbotGreen } from '~~/server/database/seed/abbot-green'
import { quarryStreet } from '~~/server/database/seed/quarry-street'
import { WORK_KINDS } from '~~/server/database/seed/work-kinds'
import { coverPicks, coverRefusals, groupCovers } from '~~/server/utils/cover/for-plan'
import { proposePoints } from '~~/server/utils/order/for-outage'
import { proposePlan } from '~~/server/utils/order/propose-plan'
import { snapshotOfSeed } from '../seed/snapshot'

const snapshot = snapshotOfSeed(quarryStreet)
const plan = proposePlan(snapshot, { id: null, ...workKindSchema.parse(WORK_KINDS[0]) }, null)
const NOTHING = { assumptions: [] }
const [rackA, rackB] = groupCovers(snapshot, plan.points, NOTHING)

describe('cover of a plan', () => {
  it('takes three fifths of the installed capacity for the load, and says where suction settles', () => {
    expect(rackA!.load).toEqual({ kw: 0.6 * (36 + 30 + 30 + 22), entered: false })
    expect(rackA!.machines.filter(machine => machine.on).map(machine => machine.tag)).toEqual(['C-1', 'C-2'])
    // 66 kW · (1 + 0.03·d) = 70.8 kW: 2.42 K over the target, whose dew at 44 psig of R-448A is −6.8 °C.
    expect(rackA!.held).toMatchObject({ kw: 66, over: false })
    expect(rackA!.held!.sstC! - (70.8 / 66 - 1) / 0.03).toBeCloseTo(-6.81, 1)
    expect(rackA!.held!.suctionPsig).toBeGreaterThan(44)
    expect(rackB!.best!.pick).toEqual(['C-5'])
  })

  it('proposes what the cover picks, with a driven machine by its speed, and leaves the drive of another off', () => {
    const slow = { ...snapshot, points: snapshot.points.map(point => point.tag === 'DR-1' ? { ...point, hand: { hz: 45 } } : point) }
    const hands = Object.fromEntries(proposePoints(slow).map(point => [point.tag, handWords(point.hand)]))
    // 27 + 30 kW lies further under 70.8 than 30 + 30.
    expect([hands['C-1'], hands['C-2'], hands['C-3'], hands['C-4'], hands['DR-1']]).toEqual(['off', 'on', 'on', 'off', 'off'])
  })

  it('goes by the load that was entered', () => {
    const entered = { assumptions: [{ about: 'load-kw' as const, id: rackA!.groupId, value: 40, reason: 'metered' }] }
    expect([...coverPicks(snapshot, entered).get(rackA!.groupId)!]).toEqual(['C-1'])
    expect(coverRefusals(snapshot, { ...plan, ...entered })).toEqual(['Rack A: C-1 + C-2 hold 66 kW for a load of 40: take one off, enter the load, or give a reason at one of them (I4)'])
  })

  it('lets more than the load stand where a reason is given (I4)', () => {
    const all = plan.points.map(point => point.tag === 'C-3' ? { ...point, hand: 'on' as const, reason: 'door heaters are on' } : point)
    expect(coverRefusals(snapshot, { ...plan, points: all })).toEqual([])
    expect(coverRefusals(snapshot, { ...plan, points: all.map(point => ({ ...point, reason: '' })) })[0]).toContain('Rack A: C-1 + C-2 + C-3 hold 96 kW for a load of 71, an estimate')
  })

  it('says which facts are wanted and what to enter, and then proposes the usual positions', () => {
    const bare = { ...snapshot, points: snapshot.points.map(point => point.tag === 'C-2' ? { ...point, capacityKw: null } : point), suctionGroups: snapshot.suctionGroups.map(group => ({ ...group, targetSuctionPsig: null })) }
    const [cover] = groupCovers(bare, plan.points, NOTHING)
    expect(cover).toMatchObject({ load: null, held: null, best: null, missing: ['the target suction: enter it with the suction group', 'the capacity of C-2: enter it in kW with the point'] })
    expect(proposePoints(bare).filter(point => point.hand === 'on' && point.tag.startsWith('C-')).map(point => point.tag)).toEqual(['C-1', 'C-2', 'C-5'])
  })

  it('covers both stages of a carbon dioxide rack, and says what standing still does', () => {
    const green = snapshotOfSeed(abbotGreen)
    const covers = groupCovers(green, proposePoints(green), NOTHING)
    expect(covers.map(cover => [cover.name, cover.best!.pick])).toEqual([['Rack A, Medium stage', ['MC-1']], ['Rack A, Low stage', ['LC-1']]])
    expect(covers[0]!.best!.why.join(' ')).toContain('R-744')
  })
})
