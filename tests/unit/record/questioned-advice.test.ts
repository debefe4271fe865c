/** What is said of a questioned entry, and two phones on one point; rules of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { sealGate } from '../../../shared/record/gates'
import { adviceOn } from '../../../shared/record/questioned-advice'
import { pointsInHand } from '../../../shared/record/select'
import { secondTechnician, supervisor, technician } from '../../support/record'
import { DAIRY, inHand, reading, storyTo } from './store'

const QUESTIONED = { expect: 'questioned' } as const

describe('what is said of a questioned entry', () => {
  it('of a point said to be in hand: it counts until looked at', () => {
    const writer = storyTo('approved')
    const doubt = writer.sign(technician, 'point-in-hand', inHand('DH-1'), QUESTIONED)
    const advice = adviceOn(writer.state, writer.state.questioned[0]!)
    expect(advice).toMatchObject({ counts: 'DH-1 counts as in hand until somebody has looked and signed.', now: 'The record has DH-1 in auto.', to: { path: 'points/DH-1' } })
    writer.sign(technician, 'in-hand-begun', {})
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    expect(adviceOn(writer.state, writer.state.questioned[0]!)).toMatchObject({ counts: 'DH-1 was signed again since, or was in hand already: nothing more hangs on it.', now: expect.stringMatching(/^The record has DH-1 in hand, off, as Ada Quill signed in No\. \d+\.$/) })
    expect(writer.state.questioned[0]!.entry).toBe(doubt.id)
  })

  it('of a reading, a change of hands, a decision, and the rest', () => {
    const writer = storyTo('plan')
    writer.sign(technician, 'reading-taken', reading(DAIRY, 37), QUESTIONED)
    writer.sign(technician, 'hands-withdrawn', { offer: writer.id, reason: 'x' }, QUESTIONED)
    writer.sign(supervisor, 'voice-confirmed', { decision: writer.id }, QUESTIONED)
    writer.sign(technician, 'in-hand-begun', {}, QUESTIONED)
    writer.sign(technician, 'point-in-hand', inHand('X-9'), QUESTIONED)
    const told = writer.state.questioned.map(item => adviceOn(writer.state, item))
    expect(told.map(advice => advice.to?.path ?? null)).toEqual(['round', 'hands', 'voice', null, null])
    expect(told[1]!.now).toBe('Ada Quill holds the outage.')
    expect(told[4]!.counts).toBe('This outage has no such point.')
  })
})

describe('two phones on one point', () => {
  it('keeps both entries, counts the point once, and lets the record be sealed only once somebody looked', () => {
    const writer = storyTo('in-hand')
    const [first, second] = writer.state.plan.order
    writer.sign(technician, 'point-in-hand', inHand(first!.tag))
    // The second phone saw the log before that, and comes with a point whose turn it is not.
    const late = writer.state.plan.order.find(line => line.after.length > 0 && line.tag !== second!.tag && line.after.some(tag => tag !== first!.tag))!
    const doubt = writer.sign(secondTechnician, 'point-in-hand', inHand(late.tag), QUESTIONED)
    writer.sign(secondTechnician, 'point-in-hand', inHand(first!.tag))
    expect(pointsInHand(writer.state).map(point => point.tag).sort()).toEqual([first!.tag, late.tag].sort())
    expect(writer.state.points[first!.tag]!.owner).toBe(secondTechnician.id)
    expect(sealGate(writer.state, [])).toEqual(['1 questioned entry not dealt with'])
    writer.sign(technician, 'questioned-settled', { entry: doubt.id, words: 'went and looked: in auto' })
    expect(pointsInHand(writer.state).map(point => point.tag)).toEqual([first!.tag])
    expect(sealGate(writer.state, [])).toEqual([])
  })
})
