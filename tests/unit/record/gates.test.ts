/** Each line of each gate, one at a time: what is missing is named. Rules of this project, no published source. */
import { describe, expect, it } from 'vitest'
import { openAct } from '../../../shared/record/act-course'
import { BACK_CHECKS, BEFORE_CHECKS } from '../../../shared/record/checks'
import { callOffGate, goDarkGate, handBackGate, NO_RESULTS, planGate, sealGate, settledFaults, steadyFault, submitGate } from '../../../shared/record/gates'
import { isoTime } from '../../../shared/record/entry'
import type { OutageState } from '../../../shared/record/state'
import type { RecordWriter } from '../../support/record'
import { supervisor, technician } from '../../support/record'
import { DAIRY, FISH, GROUP, inHand, planOf, pressure, putAllInHand, readAll, reading, readyForDark, returnAll, signChecks, steadySuction, storyTo } from './store'

/** A state that is ready, with one thing taken away. */
function but(writer: RecordWriter, change: (state: OutageState) => void): OutageState {
  const state = structuredClone(writer.state)
  change(state)
  return state
}

describe('asking for approval', () => {
  const writer = storyTo('plan')
  const gate = (state: OutageState, refusals: string[] = []) => planGate(state, { planRefusals: refusals, margin: null })

  it('needs nothing more of a whole plan', () => expect(gate(writer.state)).toEqual([]))
  it.each<[string, (state: OutageState) => void, string]>([
    ['a start', (state) => { state.plan.startsAt = null }, 'the start is not set'],
    ['steps', (state) => { state.plan.steps = [] }, 'the work has no steps'],
    ['something touched', (state) => { state.plan.points = []; state.plan.order = []; state.plan.cases.forEach((item) => { item.touched = false }) }, 'no point and no case is touched'],
    ['an order', (state) => { state.plan.order = state.plan.order.filter(line => line.tag !== 'EF-1') }, 'no place in the order for EF-1'],
    ['points that exist', (state) => { state.plan.points.push({ tag: 'X-9', hand: 'on', reason: '' }); state.plan.order.push({ tag: 'X-9', after: [], because: '' }) }, 'this controller has no point X-9'],
  ])('needs %s', (_name, change, words) => {
    expect(gate(but(writer, change))).toEqual([words])
  })
  it('needs the rules kept', () => expect(gate(writer.state, ['DH-1: never on (I2)'])).toEqual(['DH-1: never on (I2)']))
  it('names six and counts the rest', () => {
    const state = but(writer, (draft) => { for (let n = 0; n < 8; n++) draft.plan.points.push({ tag: `X-${n}`, hand: 'on', reason: '' }) })
    expect(gate(state)[0]).toBe('no place in the order for X-0, X-1, X-2, X-3, X-4, X-5 and 2 more')
  })
})

describe('going dark', () => {
  const ready = storyTo('in-hand')
  readyForDark(ready)
  const gate = (state: OutageState, at = ready.now) => goDarkGate(state, at, NO_RESULTS)

  it('needs nothing more when all is ready', () => expect(gate(ready.state)).toEqual([]))

  it.each(BEFORE_CHECKS.map(check => [check.id, check.ask] as const))('needs the check %s', (id, ask) => {
    expect(gate(but(ready, (state) => { Reflect.deleteProperty(state.checks, id) }))).toEqual([`checks not signed: ${ask.toLowerCase()}`])
  })

  it.each(planOf().points.map(point => point.tag))('needs %s in hand or excused', (tag) => {
    const missing = gate(but(ready, (state) => { state.points[tag]!.status = 'auto' }))
    expect(missing[0]).toBe(`still in auto, not excused: ${tag}`)
    expect(gate(but(ready, (state) => { state.points[tag]!.status = 'excused' }))).toEqual([])
  })

  it.each(planOf().points.map(point => point.tag))('needs %s even where the plan gives it no place in the order', (tag) => {
    const state = but(ready, (draft) => { draft.points[tag]!.status = 'auto'; draft.plan.order = [] })
    expect(gate(state)).toContain(`still in auto, not excused: ${tag}`)
  })

  it('needs what is seen to be what is asked', () => {
    expect(gate(but(ready, (state) => { state.points['CF-1']!.tried = { seen: 'not-running', mark: state.points['CF-1']!.mark! } }))).toEqual(['not seen as asked: CF-1'])
  })

  it('needs round 0 of each watched case by product', () => {
    expect(gate(but(ready, (state) => { state.cases[FISH]!.readings = [] }))).toEqual(['round 0 lacks Fish service'])
    expect(gate(but(ready, (state) => { state.cases[FISH]!.readings[0]!.method = 'air' }))).toEqual(['round 0 lacks Fish service'])
    expect(gate(but(ready, (state) => { state.cases[FISH]!.readings[0]!.struck = true }))).toEqual(['round 0 lacks Fish service'])
    expect(gate(but(ready, (state) => { state.cases[FISH]!.readings[0]!.questioned = true }))).toEqual(['round 0 lacks Fish service'])
  })

  it('needs no reading of a case that is empty, untouched or runs on alone', () => {
    expect(gate(but(ready, (state) => { state.cases[FISH]!.readings = []; state.cases[FISH]!.empty = true }))).toEqual([])
    expect(gate(but(ready, (state) => { state.cases[FISH]!.readings = []; state.cases[FISH]!.touched = false }))).toEqual([])
  })

  // The limit of the case is 41 °F (FDA Food Code 2022, 3-501.16(A)(2)).
  it.each([[41, false], [41.1, true]])('with a last reading of %f °F a case is warm: %s', (value, warm) => {
    const missing = gate(but(ready, (state) => { state.cases[DAIRY]!.readings[0]!.value = value }))
    expect(missing).toEqual(warm ? ['already warm, neither emptied nor accepted as started warm: Dairy wall'] : [])
  })

  it('takes a warm case that is emptied or accepted', () => {
    const warm = (change: (state: OutageState) => void) => gate(but(ready, (state) => { state.cases[DAIRY]!.readings[0]!.value = 45; change(state) }))
    expect(warm((state) => { state.cases[DAIRY]!.acceptedWarm = true })).toEqual([])
    expect(warm((state) => { state.cases[DAIRY]!.empty = true })).toEqual([])
  })

  it('is not opened by a questioned cold reading, yet is shut by a questioned warm one', () => {
    const later = (value: number, questioned: boolean) => (state: OutageState) => {
      const [first] = state.cases[DAIRY]!.readings
      state.cases[DAIRY]!.readings.push({ ...first!, at: first!.at + 1000, value, questioned })
    }
    const warm = ['already warm, neither emptied nor accepted as started warm: Dairy wall']
    expect(gate(but(ready, later(45, true)))).toEqual(warm)
    expect(gate(but(ready, (state) => { state.cases[DAIRY]!.readings[0]!.value = 45; later(37, true)(state) }))).toEqual(warm)
    expect(gate(but(ready, (state) => { state.cases[DAIRY]!.readings[0]!.value = 45; later(37, false)(state) }))).toEqual([])
  })

  it('needs questioned points looked at', () => {
    const state = but(ready, (draft) => { draft.questioned.push({ entry: 'x', seq: 1, kind: 'point-in-hand', why: [], tag: 'CF-1', settled: null }) })
    expect(gate(state)).toEqual(['questioned entries not looked at: CF-1'])
  })

  it('says what the margin says', () => {
    expect(goDarkGate(ready.state, ready.now, { planRefusals: [], margin: { minutes: -4, shortest: 'Fish service', deadlineMinutes: null, deadlineOf: '' } })).toEqual(['the margin is −4 min: Fish service does not outlast the work. A supervisor must accept it'])
  })
})

describe('steady suction', () => {
  const begin = () => { const writer = storyTo('in-hand'); putAllInHand(writer); return writer }
  const read = (writer: RecordWriter, ...steps: [number, number][]) => {
    for (const [minutes, value] of steps) writer.pass(minutes).sign(technician, 'pressure-read', pressure(value))
    return steadyFault(writer.state, GROUP, writer.now)
  }

  // ±3 psi for ten minutes, between cut-out + 3 and target + 10: common practice, no source. Here cut-out 20, target 48.
  it.each<[string, [number, number][], string | null]>([
    ['ten minutes within ±3 psi', [[0, 45], [10, 48]], null],
    ['a minute short', [[0, 47], [9, 47]], 'suction steady for 9 of 10 minutes'],
    ['a jump of more than 3 psi', [[0, 44.9], [5, 48], [5, 48]], 'suction steady for 5 of 10 minutes'],
    ['never read', [], 'suction not read since its compressors were put in hand'],
    ['just over the cut-out and 3', [[0, 23], [10, 23]], null],
    ['within 3 of the cut-out', [[0, 22.9], [10, 22.9]], 'suction 22.9 psig is within 3 psi of the low cut-out'],
    ['at target and 10', [[0, 58], [10, 58]], null],
    ['over target and 10', [[0, 58.1], [10, 58.1]], 'suction 58.1 psig is more than 10 psi above its target'],
  ])('%s', (_name, steps, words) => {
    const fault = read(begin(), ...steps)
    expect(fault).toBe(words === null ? null : `Rack A: ${words}`)
  })

  it('is stale after a quarter of an hour', () => {
    const writer = begin()
    read(writer, [0, 47], [10, 47])
    expect(steadyFault(writer.state, GROUP, writer.now + 15 * 60_000)).toBeNull()
    expect(steadyFault(writer.state, GROUP, writer.now + 15 * 60_000 + 1)).toBe('Rack A: suction last read more than 15 minutes ago')
  })

  it('begins anew when a compressor is put in hand, and rests on no questioned reading', () => {
    const writer = begin()
    read(writer, [0, 47], [10, 47])
    const again = but(writer, (state) => { state.points['C-1']!.mark!.at = writer.now + 1 })
    expect(steadyFault(again, GROUP, writer.now + 2)).toContain('not read since')
    const questioned = but(writer, (state) => { state.pressures.forEach((item) => { item.questioned = true }) })
    expect(steadyFault(questioned, GROUP, writer.now)).toContain('not read since')
  })

  it('is asked of groups with a compressor held on only', () => {
    const writer = storyTo('in-hand')
    signChecks(writer, BEFORE_CHECKS)
    putAllInHand(writer)
    readAll(writer, 37)
    expect(goDarkGate(writer.state, writer.now, NO_RESULTS)).toEqual(['Rack A: suction not read since its compressors were put in hand'])
    expect(goDarkGate(but(writer, (state) => { state.points['C-1']!.hand = 'off' }), writer.now, NO_RESULTS)).toEqual([])
    steadySuction(writer)
    expect(goDarkGate(writer.state, writer.now, NO_RESULTS)).toEqual([])
  })
})

describe('closing hand back (I8)', () => {
  const ready = storyTo('hand-back')
  signChecks(ready, BACK_CHECKS)
  returnAll(ready)
  const mark = ready.state.points['C-1']!.mark!
  const exception = { owner: 'x', by: 1, reason: 'x', mark }

  it('needs nothing more when all is proven', () => expect(handBackGate(ready.state)).toEqual([]))
  it.each(BACK_CHECKS.map(check => [check.id, check.ask] as const))('needs the check %s', (id, ask) => {
    expect(handBackGate(but(ready, (state) => { Reflect.deleteProperty(state.checks, id) }))).toEqual([`the controller is checked first; not signed: ${ask.toLowerCase()}`])
  })
  it.each<[string, Partial<OutageState['points'][string]>, string]>([
    ['a point in hand', { status: 'hand', hand: 'on' }, 'still in hand: C-1'],
    ['a try', { tried: { seen: 'not-running', mark } }, 'still in hand: C-1'],
    ['a proof due', { status: 'returned' }, 'not yet proven: C-1'],
  ])('is kept open by %s, unless an exception names it', (_name, change, words) => {
    expect(handBackGate(but(ready, (state) => { Object.assign(state.points['C-1']!, change) }))).toEqual([words])
    expect(handBackGate(but(ready, (state) => { Object.assign(state.points['C-1']!, change, { exception }) }))).toEqual([])
  })
  it('is kept open by a questioned claim, whatever an exception says', () => {
    expect(handBackGate(but(ready, (state) => { Object.assign(state.points['C-1']!, { questionedHand: 'x', exception }) }))).toEqual(['still in hand: C-1'])
  })
})

describe('submitting', () => {
  const ready = storyTo('settle')
  readAll(ready, 40)
  ready.pass(8)
  readAll(ready, 39)

  it('needs nothing more when all has settled', () => expect(submitGate(ready.state)).toEqual([]))
  it.each<[string, (state: OutageState) => void, string]>([
    ['hand back closed', (state) => { state.handBackClosed = null }, 'hand back is not closed'],
    ['acts ended', (state) => { openAct(state.cases[DAIRY]!, 'discard', null, state.opened!) }, 'Dairy wall: an act is open, it must be discarded: sign what is discarded'],
    ['questions answered', (state) => { state.questions.push({ entry: 'x', about: null, words: '?', mark: state.opened!, answer: null }) }, '1 question to answer'],
    ['nothing in hand', (state) => { state.points['C-1']!.status = 'hand' }, 'still in hand: C-1'],
    ['defrosts watched', (state) => { state.plan.watchDefrosts = true }, 'one defrost to be watched of each kind: electric'],
  ])('needs %s', (_name, change, words) => {
    expect(submitGate(but(ready, change))).toEqual([words])
  })
  it('is content with a defrost of the kind', () => {
    const state = but(ready, (draft) => { draft.plan.watchDefrosts = true; draft.defrostsWatched = [{ circuitId: draft.snapshot.circuits[0]!.id, words: 'x', mark: draft.opened! }] })
    expect(submitGate(state)).toEqual([])
  })

  const settled = (values: number[], change: (state: OutageState) => void = () => {}) => {
    const writer = storyTo('settle')
    readAll(writer, 38)
    writer.pass(1)
    readAll(writer, 38)
    return settledFaults(but(writer, (state) => {
      state.cases[FISH]!.readings = values.map((value, index) => ({ ...state.cases[FISH]!.readings.at(-1)!, value, at: writer.now + index * 1000, seq: 900 + index }))
      change(state)
    }))
  }

  it.each<[string, number[], string[]]>([
    ['no reading', [], ['Fish service: 2 more readings since control is back']],
    ['one reading', [38], ['Fish service: 1 more reading since control is back']],
    ['two that fall', [39, 38], []],
    ['two alike', [38, 38], []],
    ['a rise of a last digit', [38, 38.1], []],
    ['a rise', [38, 38.3], ['Fish service: still rising']],
    ['at the limit', [42, 41], []],
    ['over the limit', [42, 41.1], ['Fish service: 41.1 °F is over its limit']],
  ])('with %s', (_name, values, faults) => {
    expect(settled(values)).toEqual(faults)
  })

  it('asks nothing of an empty case, and rests on no questioned reading', () => {
    expect(settled([], (state) => { state.cases[FISH]!.empty = true })).toEqual([])
    expect(settled([39, 38], (state) => { state.cases[FISH]!.readings[1]!.questioned = true })).toEqual(['Fish service: 1 more reading since control is back'])
    expect(settled([39, 38, 50], (state) => { state.cases[FISH]!.readings[2]!.questioned = true })).toEqual(['Fish service: 50 °F is over its limit'])
  })
})

describe('the seal and calling off', () => {
  it('the seal waits for questioned entries, questions and files', () => {
    const { state } = storyTo('submitted')
    expect(sealGate(state, [])).toEqual([])
    expect(sealGate(state, ['a'])).toEqual(['1 photo or drawing awaited'])
    const more = structuredClone(state)
    more.questioned = ['a', 'b'].map(entry => ({ entry, seq: 1, kind: 'note-added', why: [], tag: null, settled: null }))
    more.questions = [{ entry: 'x', about: null, words: '?', mark: state.opened!, answer: null }]
    expect(sealGate(more, ['a', 'b'])).toEqual(['2 questioned entries not dealt with', '1 question without an answer', '2 photos or drawings awaited'])
  })

  it('calling off waits until every point is back in auto', () => {
    const writer = storyTo('in-hand')
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    writer.sign(technician, 'called-off', { reason: 'rain' }, { expect: 'questioned' })
    expect([callOffGate(writer.state), writer.state.phase]).toEqual([['still in hand: DH-1'], 'in-hand'])
    writer.sign(technician, 'point-in-auto', { tag: 'DH-1', seen: 'answers' })
    writer.sign(supervisor, 'called-off', { reason: 'rain' })
    expect([writer.state.phase, writer.state.calledOff?.reason]).toEqual(['called-off', 'rain'])
    writer.sign(technician, 'went-dark', { lostAt: isoTime(writer.now) }, { expect: 'questioned' })
    writer.sign(technician, 'reading-taken', reading(DAIRY, 38), { expect: 'questioned' })
    expect(writer.state.phase).toBe('called-off')
  })
})
