/** Changing hands: rules of this project (I6 and two signatures), no published source. */
import { describe, expect, it } from 'vitest'
import { isoTime } from '../../../shared/record/entry'
import { answerable, openItems, openOffers, unlooked, UNTAKEN_MS, untakenWords } from '../../../shared/record/hands'
import type { RecordWriter } from '../../support/record'
import { secondTechnician, supervisor, technician, testSigner, uuidFor } from '../../support/record'
import { BEGAN, DAIRY, inHand, judged, putAllInHand, reading, signChecks, storyTo } from './store'
import { BACK_CHECKS } from '../../../shared/record/checks'

const offerTo = (writer: RecordWriter, to = secondTechnician, from = technician) => writer.sign(from, 'hands-offered', { to: to.id, toName: to.name, size: writer.entries.length, open: openItems(writer.state, from.id, []), words: 'end of shift' })
const looked = (writer: RecordWriter, from = technician) => openItems(writer.state, from.id, []).map(({ what, about }) => ({ what, about }))
const take = (writer: RecordWriter, offer: string) => ({ from: technician.id, offer, looked: looked(writer) })
const owners = (writer: RecordWriter) => [...new Set(Object.values(writer.state.points).map(point => point.owner).filter(Boolean))]

function inHandStory(): RecordWriter {
  const writer = storyTo('in-hand')
  putAllInHand(writer)
  return writer
}

describe('who answers for an outage', () => {
  it('is whoever opened it, then whoever began to put points in hand', () => {
    expect(storyTo('plan').state.holder?.person).toBe(technician.id)
    const writer = storyTo('approved')
    writer.sign(secondTechnician, 'in-hand-begun', {})
    expect(writer.state.holder?.person).toBe(secondTechnician.id)
  })

  it('is, for an override, whoever placed it, and nobody once it is back in auto', () => {
    const writer = storyTo('in-hand')
    const [first] = writer.state.plan.order
    writer.sign(secondTechnician, 'point-in-hand', inHand(first!.tag))
    expect(writer.state.points[first!.tag]!.owner).toBe(secondTechnician.id)
    expect(answerable(writer.state)).toEqual([technician.id, secondTechnician.id])
    writer.sign(technician, 'point-in-auto', { tag: first!.tag, seen: 'answers' })
    expect(answerable(writer.state)).toEqual([technician.id])
  })
})

describe('an offer', () => {
  it('lists what is open: points, proofs, acts, late readings, questions, questioned entries', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    writer.sign(technician, 'point-in-auto', { tag: 'C-1', seen: 'not-called' })
    writer.sign(supervisor, 'question-asked', { about: null, words: 'which switch?' })
    const doubt = writer.sign(technician, 'plan-submitted', {}, { expect: 'questioned' })
    writer.state.cases[DAIRY]!.openAct = 7
    const items = openItems(writer.state, technician.id, [{ caseId: DAIRY, dueAt: writer.now - 60_000 }])
    expect(items.filter(item => item.what === 'in-hand').map(item => item.about)).toEqual(['C-2', 'CF-1', 'DH-1', 'EF-1', 'LLS-1'])
    expect(items.find(item => item.about === 'LLS-1')!.words).toBe('LLS-1 liquid-line-valve LLS-1, held open by hand')
    expect([...new Set(items.filter(item => item.what !== 'in-hand').map(item => item.what))]).toEqual(['proof-due', 'act', 'late-reading', 'question', 'questioned'])
    expect(items.at(-1)!.about).toBe(doubt.id)
  })

  it('leaves everything with the leaving one until it is taken', () => {
    const writer = inHandStory()
    offerTo(writer)
    expect(writer.state.holder?.person).toBe(technician.id)
    expect(owners(writer)).toEqual([technician.id])
    expect(openOffers(writer.state)).toHaveLength(1)
  })

  it('is made by somebody who has something here, to another, once at a time', () => {
    const writer = inHandStory()
    const offer = (to: { id: string, name: string }) => ({ to: to.id, toName: to.name, size: 3, open: [] })
    expect(judged(writer, secondTechnician, 'hands-offered', offer(technician)).why).toEqual(['nothing here is in your hands'])
    expect(judged(writer, technician, 'hands-offered', offer(technician)).why).toEqual(['work passes between two people'])
    offerTo(writer)
    expect(judged(writer, technician, 'hands-offered', offer(secondTechnician)).why).toEqual(['an offer of yours is open already'])
    expect(judged(storyTo('plan'), technician, 'hands-offered', offer(secondTechnician)).standing).toBe('questioned')
  })

  it('may be withdrawn by whoever made it and refused by whoever was asked; then it is not taken', () => {
    const writer = inHandStory()
    const offer = offerTo(writer).id
    expect(judged(writer, secondTechnician, 'hands-withdrawn', { offer, reason: 'x' }).why).toEqual(['only Ada Quill withdraws it'])
    expect(judged(writer, technician, 'hands-refused', { offer, reason: 'x' }).why).toEqual(['it was offered to Bram Oster'])
    writer.sign(secondTechnician, 'hands-refused', { offer, reason: 'not qualified for this panel' })
    expect(writer.state.offers[0]!.end).toMatchObject({ what: 'refused', words: 'not qualified for this panel' })
    expect(judged(writer, secondTechnician, 'hands-taken', take(writer, offer)).why).toEqual(['no such offer is open'])
    const second = offerTo(writer).id
    writer.sign(technician, 'hands-withdrawn', { offer: second, reason: 'stays' })
    expect(openOffers(writer.state)).toEqual([])
    expect(writer.state.holder?.person).toBe(technician.id)
  })

  it('is pointed out in dark at once, elsewhere after ten minutes with points in hand', () => {
    const writer = inHandStory()
    offerTo(writer)
    expect(untakenWords(writer.state, writer.now + UNTAKEN_MS - 1)).toEqual([])
    expect(untakenWords(writer.state, writer.now + UNTAKEN_MS)).toEqual(['Ada Quill is leaving and nothing is taken: Bram Oster has not signed. Ada Quill remains responsible'])
    const dark = storyTo('dark')
    offerTo(dark)
    expect(untakenWords(dark.state, dark.now)).toHaveLength(1)
    dark.sign(secondTechnician, 'hands-taken', take(dark, dark.state.offers[0]!.entry))
    expect(untakenWords(dark.state, dark.now)).toEqual([])
  })
})

describe('taking over', () => {
  it('passes the outage and each override, and names what was looked at', () => {
    const writer = inHandStory()
    const offer = offerTo(writer).id
    writer.sign(secondTechnician, 'hands-taken', take(writer, offer))
    expect(writer.state.holder?.person).toBe(secondTechnician.id)
    expect(owners(writer)).toEqual([secondTechnician.id])
    expect(writer.state.offers[0]!.end?.what).toBe('taken')
    expect(writer.state.taken[0]).toMatchObject({ from: technician.id, by: secondTechnician.id, offer })
    expect(writer.state.taken[0]!.looked).toHaveLength(6)
  })

  it('asks for a look at each open thing, those that came after the offer too', () => {
    const writer = storyTo('in-hand')
    const [first, second] = writer.state.plan.order
    writer.sign(technician, 'point-in-hand', inHand(first!.tag))
    const offer = offerTo(writer).id
    const ticks = looked(writer)
    writer.sign(technician, 'point-in-hand', inHand(second!.tag))
    const body = { from: technician.id, offer, looked: ticks }
    expect(judged(writer, secondTechnician, 'hands-taken', body)).toEqual({ standing: 'questioned', why: [`not looked at: ${second!.tag}`] })
    expect(unlooked(writer.state, technician.id, [])).toEqual([`not looked at: ${[first!.tag, second!.tag].sort().join(' and ')}`])
    writer.sign(secondTechnician, 'hands-taken', body, { expect: 'questioned' })
    expect(writer.state.holder?.person).toBe(technician.id)
    expect(owners(writer)).toEqual([technician.id])
  })

  it('is done by whoever was asked', () => {
    const writer = inHandStory()
    const offer = offerTo(writer).id
    const third = testSigner('Cato Lindqvist', 'technician')
    expect(judged(writer, third, 'hands-taken', take(writer, offer)).why).toEqual(['it was offered to Bram Oster'])
    expect(judged(writer, technician, 'hands-taken', take(writer, offer)).why).toEqual(['it is in your hands already', 'it was offered to Bram Oster'])
    expect(judged(writer, secondTechnician, 'hands-taken', { ...take(writer, offer), from: third.id }).why[0]).toContain('nothing here is in the hands of')
  })

  it('is done without an offer by a supervisor alone, with the reason', () => {
    const writer = inHandStory()
    const body = { from: technician.id, offer: null, looked: looked(writer) }
    expect(judged(writer, secondTechnician, 'hands-taken', { ...body, words: 'ill' }).standing).toBe('refused')
    expect(judged(writer, supervisor, 'hands-taken', body).why).toEqual(['say why it is taken over without an offer'])
    const offer = offerTo(writer).id
    writer.sign(supervisor, 'hands-taken', { ...body, words: 'Ada was called away' })
    expect(owners(writer)).toEqual([supervisor.id])
    expect(judged(writer, secondTechnician, 'hands-taken', take(writer, offer)).standing).toBe('questioned')
  })

  it('of one who only has points here passes those and not the outage', () => {
    const writer = storyTo('in-hand')
    const [first, second] = writer.state.plan.order
    writer.sign(technician, 'point-in-hand', inHand(first!.tag))
    writer.sign(secondTechnician, 'point-in-hand', inHand(second!.tag))
    const offer = offerTo(writer, technician, secondTechnician).id
    writer.sign(technician, 'hands-taken', { from: secondTechnician.id, offer, looked: [{ what: 'in-hand', about: second!.tag }] })
    expect(owners(writer)).toEqual([technician.id])
    expect(writer.state.holder?.person).toBe(technician.id)
  })

  it('does not ask for the ticks of late readings, which no log holds', () => {
    const writer = storyTo('dark')
    writer.pass(90)
    writer.sign(technician, 'reading-taken', reading(DAIRY, 38))
    const offer = writer.sign(technician, 'hands-offered', { to: secondTechnician.id, toName: secondTechnician.name, size: 1, open: openItems(writer.state, technician.id, [{ caseId: DAIRY, dueAt: BEGAN }]) }).id
    writer.sign(secondTechnician, 'hands-taken', { from: technician.id, offer, looked: looked(writer) })
    expect(isoTime(writer.state.holder!.mark.at)).toBe(isoTime(writer.now))
  })

  it('keeps an unknown offer out', () => {
    const writer = inHandStory()
    expect(judged(writer, secondTechnician, 'hands-taken', take(writer, uuidFor('none'))).why).toEqual(['no such offer is open'])
  })
})
