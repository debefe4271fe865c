// What the log has of notices, and the window that people are told; common practice, no source.
import { describe, expect, it } from 'vitest'
import { isoTime } from '../../../shared/record/entry'
import { awayNotices, noticeLine, noticeWindow, productNotices, windowOf } from '../../../shared/record/notices'
import { told } from '../../../shared/record/words'
import { technician, uuidFor } from '../../support/record'
import { BEGAN, DAIRY, storyTo } from './store'

const MAIL = uuidFor('a mail')
const minute = 60_000

describe('the window that people are told', () => {
  it('ends at the mean of all steps, lengthened by what the time without control may take, in whole five minutes', () => {
    const plan = (totalMean: number, darkMean: number, dark19in20: number) => ({ duration: { totalMean, darkMean, dark19in20, rollBack19in20: 0 } })
    expect(noticeWindow(plan(50, 20, 34), BEGAN)).toEqual({ from: BEGAN, until: BEGAN + 65 * minute })
    expect(noticeWindow(plan(50.1, 20, 20), BEGAN)).toEqual({ from: BEGAN, until: BEGAN + 55 * minute })
    expect(noticeWindow(plan(0, 0, 0), BEGAN)).toEqual({ from: BEGAN, until: null })
  })

  it('begins as planned, whatever the clock says when control is taken away', () => {
    const { state } = storyTo('dark')
    expect(windowOf(state)?.from).toBe(Date.parse(state.plan.startsAt!))
  })
})

describe('a notice in the log', () => {
  it('is sent, then read; the first reader counts', () => {
    const writer = storyTo('approved')
    writer.serverEntry('notice-sent', { mail: MAIL, party: 'shop', subject: 'control-away', name: 'Maud Finch', to: 'maud@quillfeather.example', sentAt: isoTime(writer.now) })
    expect(noticeLine(writer.state, awayNotices(writer.state, 'shop')[0]!)).toMatch(/^Written to Maud Finch at \d\d:\d\d, not yet acknowledged$/)
    expect(awayNotices(writer.state, 'monitoring')).toEqual([])
    writer.pass(5)
    writer.serverEntry('notice-acknowledged', { mail: MAIL, party: 'shop', name: 'Piers Hallam' })
    writer.pass(5)
    writer.serverEntry('notice-acknowledged', { mail: MAIL, party: 'shop', name: 'Somebody else' })
    const [notice] = awayNotices(writer.state, 'shop')
    expect(notice!.acknowledged).toMatchObject({ name: 'Piers Hallam', at: writer.now - 5 * minute })
    expect(noticeLine(writer.state, notice!)).toMatch(/^Written to Maud Finch at \d\d:\d\d, read by Piers Hallam at \d\d:\d\d$/)
  })

  it('that is read before the log learns that it was sent is one notice all the same', () => {
    const writer = storyTo('approved')
    writer.serverEntry('notice-acknowledged', { mail: MAIL, party: 'monitoring', name: 'Desk 4' })
    expect(noticeLine(writer.state, awayNotices(writer.state, 'monitoring')[0]!)).toMatch(/^Read by Desk 4 at \d\d:\d\d$/)
    writer.serverEntry('notice-sent', { mail: MAIL, party: 'monitoring', subject: 'control-away', name: '', to: 'monitoring@quillfeather.example', sentAt: isoTime(writer.now) })
    expect(awayNotices(writer.state, 'monitoring')).toHaveLength(1)
    expect(noticeLine(writer.state, awayNotices(writer.state, 'monitoring')[0]!)).toMatch(/^Written to monitoring@quillfeather\.example at \d\d:\d\d, read by Desk 4 at \d\d:\d\d$/)
  })

  it('is told in words', () => {
    const writer = storyTo('approved')
    writer.serverEntry('notice-sent', { mail: MAIL, party: 'shop', subject: 'control-away', name: 'Maud Finch', to: 'maud@quillfeather.example', sentAt: isoTime(writer.now) })
    writer.serverEntry('notice-acknowledged', { mail: MAIL, party: 'shop', name: 'Maud Finch' })
    expect(writer.entries.slice(-2).map(stored => told(writer.state, stored.entry))).toEqual([
      { did: 'Shop written to: control is away', seen: 'Maud Finch · maud@quillfeather.example' },
      { did: 'Shop has read the notice', seen: 'Maud Finch' },
    ])
  })
})

describe('product that the shop is told of', () => {
  it('is what was moved and what was discarded, in the order of the log, and nothing else', () => {
    const writer = storyTo('dark')
    const act = { caseId: DAIRY, product: 'milk', quantity: 40, unit: 'l', coolBy: null, takenBy: 'Maud Finch', left: false, words: '', photos: [] }
    const moved = writer.sign(technician, 'act-signed', { ...act, act: 'moved', place: 'walk-in 2', left: true })
    writer.sign(technician, 'act-signed', { ...act, act: 'night-covers', place: '', left: true })
    const gone = writer.sign(technician, 'act-signed', { ...act, act: 'discarded', place: 'bin 4' })
    expect(productNotices(writer.state).map(({ what, entry, product, quantity, unit, place }) => ({ what, entry, product, quantity, unit, place }))).toEqual([
      { what: 'moved', entry: moved.id, product: 'milk', quantity: 40, unit: 'l', place: 'walk-in 2' },
      { what: 'discarded', entry: gone.id, product: 'milk', quantity: 40, unit: 'l', place: 'bin 4' },
    ])
    expect(productNotices(writer.state, new Set([gone.id])).map(item => item.entry)).toEqual([gone.id])
  })
})
