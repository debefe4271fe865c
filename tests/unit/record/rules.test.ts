/** Who may sign what, in which phase, and what it must fit; rules I2, I3, I5, I9 and I10 are common practice, no source. */
import { describe, expect, it } from 'vitest'
import { BACK_CHECKS, BEFORE_CHECKS } from '../../../shared/record/checks'
import { isoTime } from '../../../shared/record/entry'
import type { BodyInput, EntryKind } from '../../../shared/record/kinds'
import { isServerKind, KINDS } from '../../../shared/record/kinds'
import type { Role } from '../../../shared/schemas/people'
import { RecordWriter, secondTechnician, supervisor, technician, testSigner } from '../../support/record'
import { BODIES } from './bodies'
import { BEGAN, DAIRY, INSTRUMENT, inHand, judged, opening, PHASES_TOLD, planOf, putAllInHand, reading, seal, signChecks, storyTo, submission, unplanned } from './store'
import type { PhaseTold } from './store'

const kinds = Object.keys(KINDS) as EntryKind[]
const HANDS: Role[] = ['technician', 'supervisor']
const BY_SUPERVISOR: EntryKind[] = ['plan-approved', 'margin-accepted', 'plan-returned', 'left-in-exception', 'decided-otherwise', 'question-asked', 'review-begun', 'returned', 'sealed', 'voice-confirmed', 'voice-denied', 'turn-back-ordered']
const stories = Object.fromEntries(PHASES_TOLD.map(phase => [phase, storyTo(phase)])) as Record<PhaseTold, RecordWriter>

/** Judges a kind without its body being typed. */
const judgeAny = (phase: PhaseTold, signer: typeof technician, kind: EntryKind) => judged(stories[phase], signer, kind, BODIES[kind] as BodyInput<typeof kind>)

describe('roles', () => {
  const stranger = (role: Role) => testSigner(`Some ${role}`, role)
  it.each(kinds.map(kind => [kind] as const))('%s is signed by those alone who may', (kind) => {
    const expected = isServerKind(kind) ? [] : BY_SUPERVISOR.includes(kind) ? ['supervisor'] : HANDS
    const may = (['technician', 'supervisor', 'auditor', 'administrator'] as const).filter(role => judgeAny('dark', stranger(role), kind).standing !== 'refused')
    expect(may).toEqual(expected)
  })

  it('the refusal says who signs it', () => {
    expect(judgeAny('plan', technician, 'plan-approved').why).toEqual(['this is signed by a supervisor, not by a technician'])
    expect(judgeAny('plan', stranger('auditor'), 'note-added').why).toEqual(['this is signed by a technician or a supervisor, not by an auditor'])
    expect(judgeAny('plan', supervisor, 'verdict-changed').why).toEqual(['only Holdover itself signs this'])
  })
})

describe('phases', () => {
  const RUN: PhaseTold[] = ['in-hand', 'dark', 'hand-back', 'settle']
  const BEFORE_SEAL = PHASES_TOLD.filter(phase => phase !== 'sealed')
  const BELONGS: Partial<Record<EntryKind, PhaseTold[]>> = {
    'outage-opened': ['plan'], 'plan-changed': ['plan', 'approved', 'in-hand', 'dark'], 'plan-submitted': ['plan'], 'plan-approved': ['plan'], 'margin-accepted': ['plan', 'approved', 'in-hand'], 'plan-returned': ['plan'],
    'in-hand-begun': ['approved'], 'called-off': ['plan', 'approved', 'in-hand'], 'check-signed': ['approved', ...RUN],
    'point-in-hand': RUN, 'point-excused': ['in-hand', 'dark'], 'point-in-auto': ['in-hand', 'hand-back', 'settle'], 'point-proven': ['hand-back', 'settle'],
    'left-in-exception': ['hand-back', 'settle'], 'hand-back-closed': ['hand-back'], 'defrost-watched': ['hand-back', 'settle'],
    'reading-taken': ['approved', ...RUN], 'pressure-read': ['approved', ...RUN], 'act-signed': ['approved', ...RUN, 'submitted'], 'decided-otherwise': [...RUN, 'submitted'], 'instrument-checked': ['approved', ...RUN],
    'went-dark': ['in-hand'], 'control-lost': ['plan', 'approved', 'in-hand', 'hand-back', 'settle'], 'step-ticked': ['approved', ...RUN], 'turn-back-ordered': ['dark'], 'turned-back': ['dark'], 'control-back': ['dark'],
    'silence-announced': BEFORE_SEAL, 'note-added': BEFORE_SEAL, 'correction': BEFORE_SEAL, 'questioned-settled': BEFORE_SEAL, 'question-asked': [...RUN, 'submitted'], 'question-answered': BEFORE_SEAL,
    'hands-offered': ['approved', ...RUN], 'hands-withdrawn': ['approved', ...RUN], 'hands-refused': ['approved', ...RUN], 'hands-taken': ['approved', ...RUN],
    'voice-decision': [...RUN, 'submitted'], 'voice-confirmed': BEFORE_SEAL, 'voice-denied': BEFORE_SEAL, // the decision in the body is one of those phases
    'submitted': ['settle'], 'review-begun': ['submitted'], 'returned': ['submitted'], 'sealed': ['submitted'],
  }
  it.each(kinds.filter(kind => !isServerKind(kind)).map(kind => [kind] as const))('%s belongs in its phases', (kind) => {
    const misplaced = (phase: PhaseTold) => judgeAny(phase, supervisor, kind).why.some(why => why.startsWith('does not belong in the phase'))
    expect(PHASES_TOLD.filter(phase => !misplaced(phase))).toEqual(BELONGS[kind])
  })

  it('what does not belong is questioned, in words', () => {
    expect(judged(stories.dark, technician, 'in-hand-begun', {})).toEqual({ standing: 'questioned', why: ['does not belong in the phase "dark"'] })
  })

  it('nothing is accepted once the record is sealed', () => {
    for (const kind of kinds) expect(judgeAny('sealed', supervisor, kind).standing, kind).not.toBe('accepted')
  })
})

describe('opening', () => {
  const empty = () => new RecordWriter('Mill Lane', BEGAN)
  it('is accepted once', () => {
    expect(judged(empty(), technician, 'outage-opened', opening()).standing).toBe('accepted')
    expect(judged(stories.plan, technician, 'outage-opened', opening()).why).toEqual(['this outage is already open'])
  })
  it('does not lie in the future, by more than a minute', () => {
    expect(judged(empty(), technician, 'outage-opened', unplanned(BEGAN + 60_000)).standing).toBe('accepted')
    expect(judged(empty(), technician, 'outage-opened', unplanned(BEGAN + 60_001)).why).toEqual(['the time lies in the future'])
  })
})

describe('approval (I10)', () => {
  it('waits for the plan to be sent', () => {
    expect(judged(stories.plan, supervisor, 'plan-approved', {}).why).toEqual(['the plan was not sent for approval'])
    expect(judged(stories.plan, supervisor, 'plan-returned', { reason: 'no' }).why).toEqual(['the plan was not sent for approval'])
  })
  it('is by nobody who wrote, changed or sent the plan', () => {
    const words = { standing: 'refused', why: ['nobody approves what they planned themselves (I10)'] }
    const opened = new RecordWriter('own', BEGAN)
    opened.sign(supervisor, 'outage-opened', opening())
    opened.sign(technician, 'plan-submitted', {})
    expect(judged(opened, supervisor, 'plan-approved', {})).toEqual(words)
    const changed = storyTo('plan')
    changed.sign(supervisor, 'plan-changed', { plan: planOf() })
    changed.sign(technician, 'plan-submitted', {})
    expect(judged(changed, supervisor, 'plan-approved', {})).toEqual(words)
    const sent = storyTo('plan')
    sent.sign(supervisor, 'plan-submitted', {})
    expect(judged(sent, supervisor, 'plan-approved', {})).toEqual(words)
  })
  it('a plan against the rules is not sent', () => {
    const writer = storyTo('plan')
    const points = planOf().points.map(point => point.tag === 'DH-1' ? { ...point, hand: 'on' as const } : point)
    writer.sign(technician, 'plan-changed', { plan: planOf({ points }) })
    expect(judged(writer, technician, 'plan-submitted', {})).toMatchObject({ standing: 'questioned' })
    expect(judged(writer, technician, 'plan-submitted', {}).why[0]).toMatch(/^DH-1: .*\(I2\)$/)
  })
})

describe('putting a point in hand', () => {
  const writer = storyTo('in-hand')
  const done = storyTo('in-hand')
  putAllInHand(done)
  const why = (tag: string, change: Partial<BodyInput<'point-in-hand'>> = {}, of = done) => judged(of, technician, 'point-in-hand', inHand(tag, change)).why

  it('needs a point that is there', () => expect(why('X-9')).toEqual(['there is no point X-9']))
  it('needs a reason where the plan says otherwise', () => {
    expect(why('CF-1', { hand: 'off' })).toEqual(['the plan says on: give a reason'])
    expect(why('LA-1', { hand: 'as-found' })).toEqual(['the plan does not touch this point: give a reason'])
    expect(why('CF-1', { hand: 'off', reason: 'cold night' })).toEqual([])
  })
  it.each(['on', 'open', { hz: 30 }, { percent: 1 }] as const)('never holds a defrost heater at %j (I2)', (hand) => {
    expect(why('DH-1', { hand, reason: 'ice' })).toEqual(['a defrost heater or hot-gas valve is never in hand on (I2)'])
  })
  it.each(['off', 'closed', { percent: 0 }] as const)('never holds a leak alarm at %j (I3)', (hand) => {
    expect(why('LA-1', { hand, reason: 'noise' })).toEqual(['it keeps people safe and is never off (I3)'])
    expect(why('LA-1', { hand: 'on', reason: 'watched' })).toEqual([])
  })
  it('never runs a compressor without a guard that works in hand (I9)', () => {
    expect(why('C-3', { reason: 'load' })).toEqual(['no guard of this compressor works in hand (I9)'])
    expect(why('C-3', { hand: 'off', reason: 'spare' })).toEqual([])
  })
  it('comes after what the order puts before it', () => {
    const { order } = planOf()
    for (const line of order) {
      const waiting = why(line.tag, {}, writer)
      expect(waiting).toEqual(line.after.length > 0 ? [`comes after ${line.after.join(', ')}`] : [])
      expect(why(line.tag)).toEqual([])
    }
    expect(order.some(line => line.after.length > 0)).toBe(true)
  })
  it('an excused point keeps nothing back, a try does', () => {
    const some = storyTo('in-hand')
    const line = planOf().order.find(item => item.after.length === 1)!
    const [before] = line.after
    for (const { tag } of planOf().order.slice(0, planOf().order.findIndex(item => item.tag === before))) some.sign(technician, 'point-in-hand', inHand(tag))
    some.sign(technician, 'point-in-hand', inHand(before!, { seen: before === 'DH-1' ? 'on' : 'not-running' }))
    expect(why(line.tag, {}, some)).toEqual([`comes after ${before}`])
    some.sign(technician, 'point-excused', { tag: before!, reason: 'stuck', measure: 'watched' })
    expect(why(line.tag, {}, some)).toEqual([])
  })
  // I5: minimum off time of the point, 5 minutes where none is known. C-1 has 3 minutes, C-2 none.
  it.each([['C-1', 3], ['C-2', 5]])('%s is not restarted for %i minutes (I5)', (tag, minutes) => {
    const stopped = storyTo('in-hand')
    putAllInHand(stopped)
    stopped.sign(technician, 'point-in-hand', inHand(tag, { hand: 'off', reason: 'noise' }))
    const again = () => why(tag, { hand: 'on', reason: 'quiet again' }, stopped)
    stopped.pass(minutes - 0.01)
    expect(again()).toEqual([`stopped less than ${minutes} minutes ago (I5)`])
    expect(why(tag, { hand: 'off', reason: 'still' }, stopped)).toEqual([])
    stopped.pass(0.01)
    expect(again()).toEqual([])
  })
})

describe('excusing', () => {
  it('is for what cannot be put in hand, not for what is', () => {
    const writer = storyTo('in-hand')
    const excuse = { tag: 'DH-1', reason: 'x', measure: 'y' }
    expect(judged(writer, technician, 'point-excused', excuse).standing).toBe('accepted')
    writer.sign(technician, 'point-in-hand', inHand('DH-1'))
    expect(judged(writer, technician, 'point-excused', excuse).why).toEqual(['DH-1 is in hand; only what cannot be put in hand is excused'])
    expect(judged(writer, technician, 'point-excused', { ...excuse, tag: 'X-9' }).why).toEqual(['there is no point X-9'])
  })
})

describe('checks', () => {
  it('of the controller wait until control is back', () => {
    for (const { id } of BACK_CHECKS) {
      expect(judged(stories.dark, technician, 'check-signed', { check: id, outcome: 'done' }).why).toEqual(['the controller is checked once control is back'])
      expect(judged(stories['hand-back'], technician, 'check-signed', { check: id, outcome: 'done' }).why).toEqual([])
    }
  })
  it('are left out only where they may be, with a word why', () => {
    for (const { id, mayBeNeedless } of BEFORE_CHECKS) {
      expect(judged(stories['in-hand'], technician, 'check-signed', { check: id, outcome: 'needless', words: 'no update' }).why).toEqual(mayBeNeedless ? [] : ['this check cannot be left out'])
    }
    expect(judged(stories['in-hand'], technician, 'check-signed', { check: 'update-file', outcome: 'needless' }).why).toEqual(['say why it is not needed'])
  })
})

describe('hand back', () => {
  const checked = storyTo('hand-back')
  signChecks(checked, BACK_CHECKS)
  const back = (tag: string, of = checked) => judged(of, technician, 'point-in-auto', { tag, seen: 'answers' }).why

  it('begins with the controller checked', () => {
    expect(back('C-1', stories['hand-back'])[0]).toMatch(/^the controller is checked first; not signed: /)
    expect(back('C-1')).toEqual([])
  })
  it('goes in the safe order (I7)', () => {
    expect(back('LLS-1')).toEqual(['goes back after C-1, C-2'])
    expect(back('X-9')).toEqual(['there is no point X-9'])
    expect(back('LA-1')).toEqual(['LA-1 is not in hand'])
  })
  it('proves what waits for its proof', () => {
    expect(judged(checked, technician, 'point-proven', { tag: 'C-1' }).why).toEqual(['C-1 is not waiting for its proof'])
  })
  it('leaves by exception only what is in hand or unproven (I8)', () => {
    const except = (tag: string, of: RecordWriter) => judged(of, supervisor, 'left-in-exception', { points: [{ tag, owner: 'x', by: isoTime(BEGAN), reason: 'x' }] }).why
    expect([except('C-1', checked), except('LA-1', checked), except('X-9', checked)]).toEqual([[], ['LA-1 is neither in hand nor waiting for its proof'], ['there is no point X-9']])
    expect(except('C-1', stories.settle)).toEqual(['C-1 is neither in hand nor waiting for its proof'])
  })
  it('closes when nothing is left, or what is left is named', () => {
    const writer = storyTo('hand-back')
    signChecks(writer, BACK_CHECKS)
    expect(judged(writer, technician, 'hand-back-closed', {}).why[0]).toMatch(/^still in hand: /)
    const left = Object.values(writer.state.points).filter(point => point.status === 'hand').map(point => ({ tag: point.tag, owner: 'Piet Harrow', by: isoTime(BEGAN), reason: 'parts' }))
    writer.sign(supervisor, 'left-in-exception', { points: left })
    expect(judged(writer, technician, 'hand-back-closed', {}).standing).toBe('accepted')
  })
})

describe('readings and acts', () => {
  it('name a case, group, circuit, step and reading that are there', () => {
    const ghost = technician.id
    expect(judged(stories.dark, technician, 'reading-taken', reading(ghost, 38)).why).toEqual(['there is no such case in this outage'])
    expect(judged(stories.dark, technician, 'pressure-read', { round: 0, suctionGroupId: ghost, suctionPsig: 1, dischargePsig: null }).why).toEqual(['there is no such suction group'])
    expect(judged(stories.dark, technician, 'step-ticked', { step: 'dance', state: 'done' }).why).toEqual(['there is no such step'])
    expect(judged(stories.settle, technician, 'defrost-watched', { circuitId: ghost, words: 'x' }).why).toEqual(['there is no such circuit'])
    expect(judged(stories.dark, technician, 'correction', { corrects: ghost, reason: 'x', reading: 'struck' }).why).toEqual(['there is no such reading'])
    expect(judged(stories.dark, technician, 'question-answered', { question: ghost, words: 'x' }).why).toEqual(['no such question is open'])
    expect(judged(stories.dark, technician, 'questioned-settled', { entry: ghost, words: 'x' }).why).toEqual(['no such entry is waiting'])
  })
  it('say what is discarded and where product went', () => {
    const act = { caseId: DAIRY, product: '', quantity: null, place: '' }
    expect(judged(stories.dark, technician, 'act-signed', { ...act, act: 'discarded' }).why).toEqual(['name the product and the quantity that is discarded', 'say who took what is discarded'])
    expect(judged(stories.dark, technician, 'act-signed', { ...act, act: 'moved' }).why).toEqual(['say where the product was moved to'])
    expect(judged(stories.dark, technician, 'act-signed', { ...act, act: 'ice' }).why).toEqual([])
    expect(judged(stories.dark, technician, 'act-signed', { ...act, act: 'cool-by' }).why).toEqual(['say by when it is to be cooled'])
    expect(judged(stories.dark, technician, 'act-signed', { ...act, act: 'cool-by', coolBy: isoTime(stories.dark.now) }).why).toEqual(['the time by which it is to be cooled is past already'])
    expect(judged(stories.dark, technician, 'act-signed', { ...act, act: 'cool-by', coolBy: isoTime(stories.dark.now + 1) }).why).toEqual([])
  })
  it('say of an instrument what its reading shows', () => {
    // T-1 is good to half a kelvin, which is 0.9 °F.
    const check = { instrumentId: INSTRUMENT, unit: 'F' as const }
    expect(judged(stories.dark, technician, 'instrument-checked', { ...check, value: 32.9, within: true }).why).toEqual([])
    expect(judged(stories.dark, technician, 'instrument-checked', { ...check, value: 33, within: false }).why).toEqual([])
    expect(judged(stories.dark, technician, 'instrument-checked', { ...check, value: 33, within: true }).why).toEqual(['what is said of the ice point does not follow from the reading'])
    expect(judged(stories.dark, technician, 'instrument-checked', { ...check, instrumentId: DAIRY, value: 32, within: true }).why).toEqual(['there is no such instrument at this site'])
  })
})

describe('times given as past', () => {
  it('control is not back before it was lost, nor in the future', () => {
    const { state, now } = stories.dark
    const back = (ms: number) => judged(stories.dark, technician, 'control-back', { backAt: isoTime(ms) }).why
    expect(back(state.darks[0]!.from - 1)).toEqual(['control cannot be back before it was lost'])
    expect([back(state.darks[0]!.from), back(now + 60_000), back(now + 60_001)]).toEqual([[], [], ['the time lies in the future']])
  })
})

describe('the seal (I10)', () => {
  const writer = storyTo('submitted')
  it('fits the record as it stands', () => {
    expect(judged(writer, supervisor, 'sealed', seal(writer), { root: seal(writer).root }).standing).toBe('accepted')
    const { size, root } = seal(writer)
    expect(judged(writer, supervisor, 'sealed', { ...seal(writer), size: size - 1 }).why).toEqual([`the record has ${size} entries, the seal says ${size - 1}: read it again`])
    expect(judged(writer, supervisor, 'sealed', { ...seal(writer), root: 'a'.repeat(64) }, { root }).why).toEqual(['the root of the seal is not that of the record'])
    expect(judged(writer, supervisor, 'sealed', seal(writer), { filesAwaited: state => state.files }).why).toEqual(['1 photo or drawing awaited'])
  })
  it('is set by nobody who planned or submitted', () => {
    const own = storyTo('settle')
    for (const _ of [1, 2]) { own.pass(1).sign(technician, 'reading-taken', reading(DAIRY, 38)); own.sign(secondTechnician, 'reading-taken', reading(Object.keys(own.state.cases)[1]!, 38)) }
    own.sign(supervisor, 'submitted', submission())
    expect(judged(own, supervisor, 'sealed', seal(own))).toEqual({ standing: 'refused', why: ['nobody seals what they planned or submitted themselves (I10)'] })
    const planned = storyTo('in-hand')
    planned.sign(supervisor, 'plan-changed', { plan: planOf() })
    planned.state.phase = 'submitted'
    expect(judged(planned, supervisor, 'sealed', seal(planned)).standing).toBe('refused')
  })
})
