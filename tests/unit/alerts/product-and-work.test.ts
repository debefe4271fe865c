/** Alerts of product, plant, work and points, on a simulated clock. Figures are this project's own promises, no published source. */
import { describe, expect, it } from 'vitest'
import { isoTime } from '../../../shared/record/entry'
import { RecordWriter, supervisor, technician } from '../../support/record'
import { BEGAN, DAIRY, FISH, goOn, inHand, pressure, reading, readAll, returnAll, signChecks, storyTo, unplanned } from '../record/store'
import { BACK_CHECKS } from '../../../shared/record/checks'
import { acknowledge, firstMinute, look, minutesOf, of, SUPERVISOR, TECHNICIAN, wait } from './clock'

const MINUTE = 60_000
const lost = () => {
  const writer = new RecordWriter('Mill Lane', BEGAN)
  writer.sign(technician, 'outage-opened', unplanned(writer.now))
  readAll(writer, 34)
  return writer
}
const wordsOf = (writer: RecordWriter, alert: string) => writer.state.alerts.findLast(item => item.alert === alert)?.words
const openOf = (writer: RecordWriter, alert: string) => writer.state.alerts.filter(item => item.alert === alert && item.over === null)

describe('a limit that comes near', () => {
  it('is alerted once the careful forecast has it within fifteen minutes, for each case', () => {
    const writer = lost()
    const near = firstMinute(writer, ({ holdMinutes }) => holdMinutes! < 15)
    const happened = wait(writer, near + 10)
    expect(minutesOf(happened, 'limit-near')[0]).toBe(near)
    expect(of(happened, 'limit-near').filter(item => item.what === 'raised')).toHaveLength(2)
    expect(openOf(writer, 'limit-near').map(item => item.about[0]).sort()).toEqual([DAIRY, FISH].sort())
    expect(wordsOf(writer, 'limit-near')).toMatch(/^Mill Lane: (Dairy wall|Fish service) is near its limit of 41\.0 °F: it is forecast to be there at \d\d:\d\d, in 1\d min by the careful estimate\. Move the product, draw night covers or lay ice, and sign it\.$/)
    expect(openOf(writer, 'limit-near')[0]!.until! - openOf(writer, 'limit-near')[0]!.mark.at).toBeLessThan(15 * MINUTE)
  })

  it('is not alerted of a case that nobody has read, nor of one that is emptied', () => {
    const unread = new RecordWriter('Mill Lane', BEGAN)
    unread.sign(technician, 'outage-opened', unplanned(unread.now))
    expect(of(wait(unread, 90), 'limit-near')).toEqual([])
    const emptied = lost()
    for (const caseId of [DAIRY, FISH]) emptied.sign(technician, 'act-signed', { caseId, act: 'emptied', quantity: null })
    expect(of(wait(emptied, 90), 'limit-near')).toEqual([])
  })

  it('is over once the case holds twenty minutes again', () => {
    const writer = lost()
    wait(writer, firstMinute(writer, ({ holdMinutes }) => holdMinutes! < 15) + 1)
    expect(openOf(writer, 'limit-near').length).toBeGreaterThan(0)
    for (const caseId of [DAIRY, FISH]) writer.sign(technician, 'act-signed', { caseId, act: 'ice', quantity: null })
    writer.pass(2)
    readAll(writer, 36)
    look(writer)
    expect(openOf(writer, 'limit-near')).toEqual([])
  })
})

describe('a verdict', () => {
  it('that asks for an act is alerted, and once more when it asks for a discard', () => {
    const writer = lost()
    // Above its limit for longer than the rulebook allows: US Food Code 2022, 3-501.16 and 3-501.19 give four hours from control.
    for (let hour = 1; hour <= 7; hour++) { writer.pass(60); readAll(writer, 52); look(writer) }
    const told = writer.state.alerts.filter(item => item.about[0] === DAIRY && (item.alert === 'act-due' || item.alert === 'discard-due'))
    expect(told.map(item => item.alert)).toEqual([...new Set(told.map(item => item.alert))])
    expect(openOf(writer, 'discard-due').map(item => item.about[0]).sort()).toEqual([DAIRY, FISH].sort())
    expect(openOf(writer, 'discard-due')[0]!.to.slice(0, 2)).toEqual([TECHNICIAN.name, SUPERVISOR.name])
    expect(wordsOf(writer, 'discard-due')).toMatch(/^Mill Lane: product in (Dairy wall|Fish service) is to be discarded, now\. Take it out of sale, tell the shop, and sign what is discarded\.$/)
    for (const caseId of [DAIRY, FISH]) writer.sign(technician, 'act-signed', { caseId, act: 'discarded', product: 'all of it', quantity: 40, unit: 'kg', takenBy: 'Piet Harrow' })
    look(writer)
    expect(openOf(writer, 'discard-due')).toEqual([])
  })

  it('act says the deadline and what the rulebook asks for, and is over by what is signed', () => {
    const writer = lost()
    writer.serverEntry('verdict-changed', { caseId: FISH, verdict: 'act', deadline: isoTime(writer.now + 30 * MINUTE), minutesAbove: 200, clause: '', source: '', act: 'Cook it, or cool it to 41 °F.', why: [], judgedAt: isoTime(writer.now) })
    expect(look(writer).raise.map(item => item.until)).toEqual([writer.now + 30 * MINUTE])
    const [alert] = openOf(writer, 'act-due')
    expect(alert!.words).toMatch(/^Mill Lane: Fish service needs an act now, by \d\d:\d\d\. Cook it, or cool it to 41 °F\. Sign what is done\.$/)
    writer.sign(technician, 'act-signed', { caseId: alert!.about[0]!, act: 'moved', product: 'all of it', quantity: null, place: 'Abbot Green' })
    expect(look(writer).over).toContain(alert!.key)
  })
})

describe('the plant', () => {
  it('is alerted with suction or discharge out of bounds, each once, until a reading is better', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'pressure-read', { ...pressure(21), dischargePsig: 380 })
    expect(look(writer).raise.map(item => item.alert)).toEqual(['pressure', 'pressure'])
    expect(openOf(writer, 'pressure').map(item => item.words)).toEqual([
      expect.stringMatching(/^Mill Lane: Rack A: discharge 380 psig .+ Look at the condenser\.$/),
      expect.stringMatching(/^Mill Lane: Rack A: suction 21 psig is within 3 psi of the low cut-out.+off by hand\.$/),
    ])
    writer.pass(1).sign(technician, 'pressure-read', { ...pressure(21), dischargePsig: 380 })
    expect(look(writer).raise).toEqual([])
    writer.pass(1).sign(technician, 'pressure-read', { ...pressure(48), dischargePsig: 228 })
    expect(look(writer).over).toHaveLength(2)
  })

  it('is not alerted of a current, which is no pressure', () => {
    const writer = storyTo('dark')
    writer.state.snapshot.points.find(point => point.tag === 'C-1')!.ratedA = 18
    writer.sign(technician, 'point-in-hand', inHand('C-1', { value: { number: 22, unit: 'A' } }))
    expect(look(writer).raise).toEqual([])
  })
})

describe('the work', () => {
  it('is alerted once over its 19-in-20 time, and over when control is back', () => {
    const writer = storyTo('dark')
    expect(minutesOf(wait(writer, 40), 'overrun')).toEqual([26.5])
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    look(writer)
    expect(openOf(writer, 'overrun')).toEqual([])
  })

  it('counts each time without control by itself', () => {
    const writer = storyTo('dark')
    wait(writer, 30)
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    look(writer)
    writer.pass(5).sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    expect(minutesOf(wait(writer, 30), 'overrun')).toEqual([26.5])
  })

  it('is alerted past the latest turn-back, unless the way back has begun', () => {
    const story = () => {
      const writer = storyTo('in-hand')
      writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'went out by itself' })
      readAll(writer, 34)
      return writer
    }
    const writer = story()
    // The way back takes 15 minutes, 19 times in 20.
    const past = firstMinute(writer, ({ holdMinutes }) => holdMinutes! < 15)
    const happened = wait(writer, past + 5)
    expect(minutesOf(happened, 'turn-back-past')[0]).toBe(past)
    expect(wordsOf(writer, 'turn-back-past')).toMatch(/^Mill Lane: the latest time to turn back was \d\d:\d\d: .+ gets worse at \d\d:\d\d, and the way back takes 15 min\. Turn back now, or move the product\.$/)
    writer.sign(technician, 'turned-back', { reason: 'it takes too long' })
    look(writer)
    expect(openOf(writer, 'turn-back-past')).toEqual([])
    const without = story()
    without.state.plan.rollBack = []
    expect(of(wait(without, past + 5), 'turn-back-past')).toEqual([])
  })
})

describe('overrides', () => {
  it('past their time are alerted, those that end close together as one, a later one by itself', () => {
    const writer = storyTo('dark')
    const off = (minutes: number) => ({ until: isoTime(writer.now + minutes * MINUTE) })
    for (const [tag, minutes] of [['CF-1', 10], ['EF-1', 14], ['LLS-1', 40]] as const) writer.sign(technician, 'point-in-hand', inHand(tag, off(minutes)))
    const happened = wait(writer, 45)
    expect(minutesOf(happened, 'override-past')).toEqual([10.5, 40.5])
    const [first, second] = openOf(writer, 'override-past')
    expect(first!.about).toEqual(['CF-1', 'EF-1'])
    expect(first!.words).toMatch(/^Mill Lane: CF-1 \(Ada Quill\) and EF-1 \(Ada Quill\) were to be off by hand at \d\d:\d\d and are still in hand\. Put them back in auto, or sign a new time\.$/)
    expect(second!.about).toEqual(['LLS-1'])
    // A new time that is signed ends it.
    writer.sign(technician, 'point-in-hand', inHand('LLS-1', off(60)))
    expect(look(writer).over).toContain(second!.key)
  })

  it('that hand back leaves are alerted as it closes, with owner and time', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    returnAll(writer)
    writer.state.points['CF-1']!.status = 'hand'
    writer.state.points['CF-1']!.hand = 'on'
    writer.sign(supervisor, 'left-in-exception', { points: [{ tag: 'CF-1', owner: 'Piet Harrow', by: isoTime(BEGAN + 40 * 3_600_000), reason: 'its contactor sticks' }] })
    expect(look(writer).raise).toEqual([])
    writer.sign(technician, 'hand-back-closed', {})
    expect(look(writer).raise.map(item => [item.alert, item.about])).toEqual([['left-in-hand', ['CF-1']]])
    expect(wordsOf(writer, 'left-in-hand')).toBe('Mill Lane: left in hand at hand back: CF-1 (Piet Harrow), by exception until Wed 11:00. The controller does not have it: put it back in auto.')
  })
})

describe('quiet', () => {
  it('before points go in hand, and after the seal', () => {
    expect(wait(storyTo('approved'), 30)).toEqual([])
    const writer = storyTo('dark')
    wait(writer, 30)
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    look(writer)
    goOn(writer, 'hand-back', 'sealed')
    const size = writer.entries.length
    expect(wait(writer, 120)).toEqual([])
    expect(writer.entries).toHaveLength(size)
  })

  it('of a run that goes as planned: nothing is alerted', () => {
    const writer = storyTo('dark')
    expect(wait(writer, 7)).toEqual([])
    readAll(writer, 37.2)
    expect(wait(writer, 4)).toEqual([])
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    expect(look(writer)).toEqual({ raise: [], passOn: [], over: [] })
    goOn(writer, 'hand-back', 'submitted')
    expect(look(writer)).toEqual({ raise: [], passOn: [], over: [] })
    expect(writer.state.alerts).toEqual([])
  })

  it('once called off', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'called-off', { reason: 'the file is the wrong one' })
    acknowledge(writer, technician)
    expect(wait(writer, 60)).toEqual([])
  })

  it('of a reading that is questioned: it is judged, and ends no alert of a round by itself', () => {
    const writer = storyTo('plan')
    writer.sign(technician, 'reading-taken', reading(DAIRY, 60), { expect: 'questioned' })
    expect(wait(writer, 10)).toEqual([])
  })
})
