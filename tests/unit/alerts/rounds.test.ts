/** Alerts of rounds and of silence, on a simulated clock. Times are this project's own promises, no published source. */
import { describe, expect, it } from 'vitest'
import { forecastCases } from '../../../server/utils/hold/for-outage'
import { isoTime } from '../../../shared/record/entry'
import { RecordWriter, secondTechnician, supervisor, technician } from '../../support/record'
import { DAIRY, FISH, reading, readAll, signChecks, storyTo, unplanned } from '../record/store'
import { acknowledge, ADMINISTRATOR, firstMinute, look, minutesOf, of, SUPERVISOR, TECHNICIAN, wait } from './clock'

const MINUTE = 60_000
/** Minutes until the first case is due. */
const dueIn = (writer: RecordWriter) => (Math.min(...forecastCases(writer.state, writer.now).map(item => item.dueAt)) - writer.now) / MINUTE
const onHalf = (minutes: number) => Math.ceil(minutes * 2) / 2
const wordsOf = (writer: RecordWriter, alert: string) => writer.state.alerts.findLast(item => item.alert === alert)?.words

describe('a round that is late', () => {
  it('is alerted two minutes after its time, once, for all cases together', () => {
    const writer = storyTo('dark')
    const due = dueIn(writer)
    const happened = wait(writer, due + 2.9)
    expect(of(happened, 'round-late')).toEqual([{ minute: onHalf(due + 2), what: 'raised', alert: 'round-late', to: [TECHNICIAN.name] }])
    expect(writer.state.alerts[0]!.about).toEqual([DAIRY, FISH].sort())
    expect(wordsOf(writer, 'round-late')).toBe('Mill Lane: the round is late: Dairy wall and Fish service were due from 20:20 on. Take the round now.')
  })

  it('tells the next people by half an interval, acknowledged or not', () => {
    const writer = storyTo('dark')
    const due = dueIn(writer)
    wait(writer, due + 2.5)
    acknowledge(writer, technician)
    const happened = wait(writer, 3)
    expect(of(happened, 'round-missed')).toMatchObject([{ what: 'raised', to: [TECHNICIAN.name, SUPERVISOR.name] }])
    // Half of the interval, since control was lost, that was over when it was due.
    expect(due + 2.5 + minutesOf(happened, 'round-missed')[0]!).toBeCloseTo(due * 1.5, 0)
  })

  it('is over once the round is taken, and the next late one is another', () => {
    const writer = storyTo('dark')
    wait(writer, dueIn(writer) + 2.5)
    readAll(writer, 37.5)
    expect(look(writer).over).toHaveLength(1)
    expect(writer.state.alerts[0]!.over).toBe(writer.now)
    wait(writer, dueIn(writer) + 2.5)
    const late = writer.state.alerts.filter(item => item.alert === 'round-late')
    expect(late.map(item => item.key.slice(-2))).toEqual([' 1', ' 2'])
  })

  it('is not told again of the case that is still to be read while the round goes on, and told where it stops', () => {
    const writer = storyTo('dark')
    wait(writer, dueIn(writer) + 2.5)
    const [first, second] = [DAIRY, FISH].sort() as [string, string]
    writer.sign(technician, 'reading-taken', reading(first, 37.5))
    // The second case, which the alert names as well, keeps it open.
    expect(look(writer)).toMatchObject({ over: [], raise: [] })
    writer.pass(0.5).sign(technician, 'reading-taken', reading(second, 37.5))
    expect(look(writer).over).toHaveLength(1)
  })

  it('is one at a time: of a case that grows late as well nothing more is told until somebody has seen the first', () => {
    const writer = storyTo('dark')
    const [first, second] = [DAIRY, FISH].sort() as [string, string]
    writer.pass(3).sign(technician, 'reading-taken', reading(second, 37.2))
    const happened = wait(writer, 20)
    expect(of(happened, 'round-late').filter(item => item.what === 'raised')).toHaveLength(1)
    expect(writer.state.alerts[0]!.about).toEqual([first])
    acknowledge(writer, technician, 'round-late')
    expect(look(writer).raise.map(item => [item.alert, item.about])).toEqual([['round-late', [second]]])
  })

  it('is not alerted with control', () => {
    expect(wait(storyTo('in-hand'), 60).filter(item => item.what === 'raised')).toEqual([])
    expect(of(wait(storyTo('settle'), 40), 'round-late')).toEqual([])
  })

  it('of a loss that is told later counts from when it was told', () => {
    const writer = new RecordWriter('Mill Lane', Date.UTC(2026, 2, 3, 1, 0))
    writer.sign(technician, 'outage-opened', unplanned(writer.now - 60 * MINUTE))
    const happened = wait(writer, 10)
    expect(minutesOf(happened, 'round-late')).toEqual([2])
    expect(minutesOf(happened, 'round-missed')[0]).toBeGreaterThan(2)
  })

  it('counts by the readings\' own times: a round that comes late from a phone without signal is no late round', () => {
    const writer = storyTo('dark')
    const [began, due] = [writer.now, dueIn(writer)]
    wait(writer, due + 2.5)
    expect(writer.state.alerts.map(item => item.alert)).toContain('round-late')
    const arrived = writer.now
    writer.now = began + Math.round((due - 1) * MINUTE)
    readAll(writer, 37.4)
    writer.now = arrived
    expect(look(writer)).toMatchObject({ raise: [], over: [writer.state.alerts[0]!.key] })
  })
})

describe('a phone that is not heard from', () => {
  it('is alerted after two intervals, and over once it is heard', () => {
    const writer = storyTo('dark')
    const happened = wait(writer, 21)
    expect(of(happened, 'unheard')).toEqual([{ minute: 20, what: 'raised', alert: 'unheard', to: [TECHNICIAN.name, SUPERVISOR.name] }])
    expect(wordsOf(writer, 'unheard')).toBe('Mill Lane: the phone of Ada Quill is not heard from: last heard 20:14, 20 min ago. Call them.')
    writer.sign(technician, 'note-added', { words: 'back in the machine room' })
    expect(look(writer).over).toContain(writer.state.alerts.find(item => item.alert === 'unheard')!.key)
  })

  it('is left alone while its silence is announced, and so are its rounds, then all of it is alerted', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'silence-announced', { until: isoTime(writer.now + 40 * MINUTE) })
    const happened = wait(writer, 45)
    for (const alert of ['unheard', 'round-late', 'round-missed', 'worker-silent'] as const) expect(minutesOf(happened, alert)).toEqual([40])
    expect(wordsOf(writer, 'unheard')).toContain('no signal was announced until 20:54')
    // The time of the work is no matter of being heard.
    expect(minutesOf(happened, 'overrun')).toEqual([26.5])
  })

  it('is alerted before that time where a hold ends first', () => {
    const writer = new RecordWriter('Mill Lane', Date.UTC(2026, 2, 3, 1, 0))
    writer.sign(technician, 'outage-opened', unplanned(writer.now))
    readAll(writer, 34)
    writer.sign(technician, 'silence-announced', { until: isoTime(writer.now + 600 * MINUTE) })
    const end = firstMinute(writer, ({ holdMinutes }) => Math.round(holdMinutes! * MINUTE) <= 0)
    const happened = wait(writer, end + 2)
    expect(end).toBeGreaterThan(20)
    expect(minutesOf(happened, 'unheard')[0]).toBe(end)
    // The limit itself is alerted as ever.
    expect(minutesOf(happened, 'limit-near')[0]!).toBeLessThan(end)
  })

  it('is not asked of a supervisor\'s desk, nor of whoever was gone before points went in hand', () => {
    const writer = storyTo('dark')
    writer.sign(supervisor, 'note-added', { words: 'I watch' })
    expect(of(wait(writer, 60), 'unheard')).toHaveLength(2) // raised, passed on
  })

  it('is silent with control', () => {
    expect(of(wait(storyTo('hand-back'), 60), 'unheard')).toEqual([])
  })
})

describe('a lone worker', () => {
  it('is alerted past a missed round, and the alert says whom to call as signed before', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'check-signed', { check: 'second-contact', outcome: 'done', words: 'Piet Harrow, 555 0127' })
    signChecks(writer, [])
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'went out by itself' })
    readAll(writer, 37)
    wait(writer, 20)
    expect(wordsOf(writer, 'worker-silent')).toMatch(/^Mill Lane: Ada Quill works alone and is silent past a missed round: last heard \d\d:\d\d, \d+ min ago\. Call, as signed before: Piet Harrow, 555 0127\.$/)
  })

  it('where nobody was named: the shop', () => {
    const writer = storyTo('dark')
    Object.assign(writer.state.snapshot.site, { contactName: 'Piet Harrow', contactPhone: '555 0127' })
    wait(writer, 20)
    expect(wordsOf(writer, 'worker-silent')).toContain('Nobody was named to be called: call the shop, Piet Harrow, 555 0127.')
  })

  it('is none where two work', () => {
    const writer = storyTo('dark')
    writer.sign(secondTechnician, 'note-added', { words: 'on the roof' })
    expect(of(wait(writer, 60), 'worker-silent')).toEqual([])
  })
})

describe('passing on', () => {
  it('goes up level by level until somebody acknowledges', () => {
    const writer = storyTo('dark')
    const happened = of(wait(writer, 60), 'overrun')
    expect(happened).toEqual([
      { minute: 26.5, what: 'raised', alert: 'overrun', to: [TECHNICIAN.name] },
      { minute: 31.5, what: 'passed on', alert: 'overrun', to: [SUPERVISOR.name] },
      { minute: 41.5, what: 'passed on', alert: 'overrun', to: [ADMINISTRATOR.name] },
    ])
  })

  it('stops at an acknowledgement', () => {
    const writer = storyTo('dark')
    wait(writer, 28)
    acknowledge(writer, technician, 'overrun')
    expect(of(wait(writer, 60), 'overrun')).toEqual([])
  })

  it('skips a level without anybody, and does not tell the same person twice', () => {
    const writer = storyTo('dark')
    const settings = { levels: [[TECHNICIAN], [], [TECHNICIAN, ADMINISTRATOR]], passOnAfter: [5, 10] }
    expect(of(wait(writer, 60, settings), 'overrun')).toMatchObject([{ to: [TECHNICIAN.name] }, { minute: 31.5, what: 'passed on', to: [ADMINISTRATOR.name] }])
  })

  it('begins where there is somebody; where there is nobody, the alert still stands on the screen', () => {
    const first = storyTo('dark')
    expect(of(wait(first, 27, { levels: [[], [SUPERVISOR], []], passOnAfter: [5, 10] }), 'overrun')).toMatchObject([{ to: [SUPERVISOR.name] }])
    expect(first.state.alerts.find(item => item.alert === 'overrun')!.level).toBe(2)
    const second = storyTo('dark')
    expect(of(wait(second, 60, { levels: [[], [], []], passOnAfter: [5, 10] }), 'overrun')).toMatchObject([{ what: 'raised', to: [] }])
  })
})
