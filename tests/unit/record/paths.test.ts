/** The ways an outage may go: control lost early and again, unplanned, turned back, returned, corrected. No published source. */
import { describe, expect, it } from 'vitest'
import { BACK_CHECKS, BEFORE_CHECKS } from '../../../shared/record/checks'
import { isoTime } from '../../../shared/record/entry'
import { startedWarm } from '../../../shared/record/gates'
import { logRoot } from '../../../shared/record/merkle'
import { judgedReadings, pointsInHand, turnBackOrder, turningBack } from '../../../shared/record/select'
import { lastHash, RecordWriter, secondTechnician, supervisor, technician } from '../../support/record'
import { BEGAN, DAIRY, DRAWING, FISH, goOn, inHand, judged, putAllInHand, readAll, reading, returnAll, seal, signChecks, storyTo, submission, unplanned } from './store'

const QUESTIONED = { expect: 'questioned' } as const

describe('control lost early', () => {
  it('leads to dark from the phase it finds, with the breach named', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    writer.pass(5).sign(technician, 'control-lost', { lostAt: isoTime(writer.now - 120_000), words: 'the screen went out' })
    const [dark] = writer.state.darks
    expect([writer.state.phase, dark!.from, dark!.how, dark!.words]).toEqual(['dark', writer.now - 120_000, 'fact', 'the screen went out'])
    expect(dark!.breach[0]).toMatch(/^checks not signed: /)
    expect(dark!.breach.find(words => words.startsWith('still in auto'))).not.toContain('DH-1')
    expect(writer.state.points['DH-1']!.status).toBe('hand')
    putAllInHand(writer)
    goOn(writer, 'dark', 'sealed')
    expect(writer.state.phase).toBe('sealed')
  })

  it.each(['plan', 'approved'] as const)('is a fact in the phase %s too', (phase) => {
    const writer = storyTo(phase)
    writer.sign(secondTechnician, 'control-lost', { lostAt: isoTime(writer.now), words: 'gone' })
    expect(writer.state.phase).toBe('dark')
  })

  it('is not lost twice at once', () => {
    const writer = storyTo('dark')
    writer.sign(secondTechnician, 'control-lost', { lostAt: isoTime(writer.now), words: 'gone' }, QUESTIONED)
    expect(writer.state.darks).toHaveLength(1)
  })
})

describe('control lost again', () => {
  it.each([['hand-back', 'control lost again in hand back'], ['settle', 'control lost again in settle']] as const)('in %s begins a second time without control', (phase, breach) => {
    const writer = storyTo(phase)
    writer.pass(3).sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    const { state } = writer
    expect([state.phase, state.darks.length, state.darks[1]!.breach, state.backAt, state.handBackClosed]).toEqual(['dark', 2, [breach], null, null])
    expect(BACK_CHECKS.some(check => state.checks[check.id])).toBe(false)
    expect(BEFORE_CHECKS.every(check => state.checks[check.id])).toBe(true)
  })

  it('takes back what had been proven, and asks for all of it once more', () => {
    const writer = storyTo('settle')
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    expect(Object.values(writer.state.points).every(point => point.status === 'auto' && point.proof === null)).toBe(true)
    putAllInHand(writer)
    expect(pointsInHand(writer.state)).toHaveLength(6)
    writer.pass(5).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    expect(judged(writer, technician, 'point-in-auto', { tag: 'C-1', seen: 'answers' }).standing).toBe('questioned')
    goOn(writer, 'hand-back', 'sealed')
    expect([writer.state.phase, writer.state.darks.every(dark => dark.to !== null)]).toEqual(['sealed', true])
  })

  it('readings from before it do not settle it', () => {
    const writer = storyTo('settle')
    readAll(writer, 38)
    writer.pass(5)
    readAll(writer, 37)
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    writer.pass(1).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    signChecks(writer, BACK_CHECKS)
    writer.sign(technician, 'hand-back-closed', {})
    expect(judged(writer, technician, 'submitted', submission()).why).toEqual(['Dairy wall: 2 more readings since control is back', 'Fish service: 2 more readings since control is back',
      // A short hold asked for an act in the second time without control; the same readings end it.
      ...['Dairy wall', 'Fish service'].map(name => `${name}: an act is open, under 15 min of hold left: sign what is done, or read it at or under its limit`),
    ])
  })

  it('an exception from before does not excuse what was tried since', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    writer.sign(supervisor, 'left-in-exception', { points: [{ tag: 'CF-1', owner: 'x', by: isoTime(BEGAN), reason: 'x' }] })
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    expect(writer.state.points['CF-1']!.exception).not.toBeNull()
    writer.sign(technician, 'point-in-hand', inHand('CF-1', { seen: 'not-running' }))
    expect([writer.state.points['CF-1']!.exception, writer.state.points['CF-1']!.tried?.seen]).toEqual([null, 'not-running'])
  })
})

describe('an unplanned outage', () => {
  const begin = () => new RecordWriter('Mill Lane', BEGAN)
  it('begins in dark at the time that is given, and runs to its seal', () => {
    const writer = begin()
    writer.sign(technician, 'outage-opened', unplanned(BEGAN - 600_000))
    expect([writer.state.phase, writer.state.darks[0], writer.state.planned]).toMatchObject(['dark', { from: BEGAN - 600_000, how: 'fact', breach: [] }, false])
    readAll(writer, 38)
    putAllInHand(writer)
    goOn(writer, 'dark', 'sealed')
    expect(writer.state.phase).toBe('sealed')
  })
  it('begins when it is signed where nobody knows since when', () => {
    const writer = begin()
    writer.sign(technician, 'outage-opened', { ...unplanned(BEGAN), lostAt: null }, { skew: 4000 })
    expect(writer.state.darks[0]!.from).toBe(BEGAN)
  })
  it('is not called off', () => {
    const writer = begin()
    writer.sign(technician, 'outage-opened', unplanned(BEGAN))
    writer.sign(technician, 'called-off', { reason: 'no' }, QUESTIONED)
  })
})

describe('turning back', () => {
  it('is begun once in each time without control', () => {
    const writer = storyTo('dark')
    expect(turningBack(writer.state)).toBeNull()
    writer.sign(technician, 'turned-back', { reason: 'the file is bad' })
    expect(turningBack(writer.state)?.reason).toBe('the file is bad')
    writer.sign(technician, 'turned-back', { reason: 'again' }, QUESTIONED)
    writer.sign(technician, 'step-ticked', { step: 'old', state: 'begun' })
    writer.pass(5).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    expect(turningBack(writer.state)).toBeNull()
    writer.sign(technician, 'turned-back', { reason: 'once more' })
    expect(turningBack(writer.state)?.reason).toBe('once more')
  })
})

describe('an order to turn back', () => {
  it('is a supervisor\'s, stands until the way back is begun, and ends with the time without control', () => {
    const writer = storyTo('dark')
    expect(() => writer.sign(technician, 'turn-back-ordered', { reason: 'mine' })).toThrow('turn-back-ordered is refused')
    writer.sign(supervisor, 'turn-back-ordered', { reason: 'the fish comes first' })
    expect(turnBackOrder(writer.state)?.reason).toBe('the fish comes first')
    writer.sign(supervisor, 'turn-back-ordered', { reason: 'again' }, QUESTIONED)
    expect(writer.entries.at(-1)!.why).toEqual(['it is ordered already'])
    writer.sign(technician, 'turned-back', { reason: 'as ordered' })
    expect([turnBackOrder(writer.state), turningBack(writer.state)?.reason]).toEqual([null, 'as ordered'])
    writer.sign(supervisor, 'turn-back-ordered', { reason: 'now' }, QUESTIONED)
    expect(writer.entries.at(-1)!.why).toEqual(['the way back has begun already'])
    writer.pass(5).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    writer.sign(technician, 'control-lost', { lostAt: isoTime(writer.now), words: 'again' })
    expect(turnBackOrder(writer.state)).toBeNull()
  })
})

describe('returned and submitted again', () => {
  it('answers are new entries, and the seal covers them', () => {
    const writer = storyTo('submitted')
    const asked = writer.sign(supervisor, 'question-asked', { about: null, words: 'Who told the store?' })
    writer.sign(supervisor, 'sealed', seal(writer), QUESTIONED)
    expect(writer.entries.at(-1)!.why).toEqual(['1 question without an answer'])
    writer.sign(supervisor, 'returned', { reason: 'one answer is missing' })
    expect([writer.state.phase, writer.state.returned[0]!.reason]).toEqual(['settle', 'one answer is missing'])
    writer.sign(technician, 'submitted', submission(), QUESTIONED)
    writer.sign(technician, 'question-answered', { question: asked.id, words: 'I did, by telephone' })
    writer.sign(secondTechnician, 'submitted', submission())
    expect(writer.state.submitters).toEqual([technician.id, secondTechnician.id])
    for (const item of writer.state.questioned) writer.sign(supervisor, 'questioned-settled', { entry: item.entry, words: 'too early' })
    writer.sign(supervisor, 'sealed', seal(writer))
    expect(writer.state.sealed!.root).toBe(logRoot(writer.entries.slice(0, -1)))
  })
})

describe('corrections', () => {
  it('give a reading its right value, or strike it, and the last one holds', () => {
    const writer = storyTo('in-hand')
    const wrong = writer.sign(technician, 'reading-taken', reading(DAIRY, 73))
    const read = () => writer.state.cases[DAIRY]!.readings[0]!
    expect(startedWarm(writer.state, DAIRY)).toBe(true)
    const correction = writer.sign(secondTechnician, 'correction', { corrects: wrong.id, reason: 'digits turned', reading: { value: 37 } })
    expect([read().value, read().correctedBy, read().struck, startedWarm(writer.state, DAIRY)]).toEqual([37, correction.id, false, false])
    writer.sign(technician, 'correction', { corrects: wrong.id, reason: 'other case', reading: 'struck' })
    expect([read().struck, judgedReadings(writer.state.cases[DAIRY]!)]).toEqual([true, []])
    writer.sign(technician, 'correction', { corrects: wrong.id, reason: 'this case after all', reading: { value: 37.5 } })
    expect([read().struck, read().value]).toEqual([false, 37.5])
    expect(writer.state.corrections.map(item => item.reason)).toEqual(['digits turned', 'other case', 'this case after all'])
  })

  it('of other entries change nothing but the list', () => {
    const writer = storyTo('in-hand')
    const note = writer.sign(technician, 'note-added', { words: 'Rain' })
    const before = structuredClone(writer.state)
    writer.sign(technician, 'correction', { corrects: note.id, reason: 'Snow', reading: null })
    expect(writer.state.corrections).toHaveLength(1)
    expect([writer.state.notes, writer.state.cases]).toEqual([before.notes, before.cases])
  })
})

describe('a case that started warm', () => {
  it('goes dark once it is accepted or emptied', () => {
    const writer = storyTo('in-hand')
    signChecks(writer, BEFORE_CHECKS)
    writer.sign(technician, 'reading-taken', reading(FISH, 45))
    const words = () => judged(writer, technician, 'went-dark', { lostAt: isoTime(writer.now) }).why.find(why => why.startsWith('already warm'))
    expect(words()).toContain('Fish service')
    writer.sign(technician, 'act-signed', { caseId: FISH, act: 'emptied', product: '', quantity: null, place: '' })
    expect(words()).toBeUndefined()
  })
})

describe('a whole record', () => {
  const { entries, state, files } = storyTo('sealed')
  it('has seq and each device\'s n without gaps, each naming the hash of the one before', () => {
    expect(entries.map(stored => stored.seq)).toEqual(entries.map((_, index) => index + 1))
    for (const device of Object.keys(state.signers)) {
      const own = entries.filter(stored => stored.entry.device === device)
      expect(own.map(stored => stored.entry.n)).toEqual(own.map((_, index) => index + 1))
      own.forEach((stored, index) => expect(stored.entry.prev).toBe(lastHash(own.slice(0, index), device)))
    }
  })
  it('is sealed over all before the seal', () => {
    expect([state.sealed!.size, state.sealed!.root]).toEqual([entries.length - 1, logRoot(entries.slice(0, -1))])
    expect(files.has(DRAWING)).toBe(true)
  })
  it('takes nothing more but what is kept as questioned', () => {
    const writer = storyTo('sealed')
    const before = structuredClone(writer.state)
    writer.sign(technician, 'note-added', { words: 'late' }, QUESTIONED)
    writer.sign(technician, 'reading-taken', reading(DAIRY, 50), QUESTIONED)
    expect([writer.state.phase, writer.state.sealed, writer.state.notes]).toEqual(['sealed', before.sealed, before.notes])
    returnAll(writer)
    expect(writer.entries.length).toBe(entries.length + 2)
  })
})
