/** Random entries that a record may meet, judged and applied as the server does. */
import fc from 'fast-check'
import { marginAt } from '../../../server/utils/hold/margin'
import { handBackAfter, handBackOrder, planRefusals } from '../../../server/utils/order/for-outage'
import { BACK_CHECKS, BEFORE_CHECKS, CHECK_IDS } from '../../../shared/record/checks'
import type { AnyEntry, StoredEntry } from '../../../shared/record/entry'
import { entryHash, isoTime } from '../../../shared/record/entry'
import { applyStored } from '../../../shared/record/fold'
import type { BodyInput, EntryKind } from '../../../shared/record/kinds'
import { newestVersion, schemaOf } from '../../../shared/record/kinds'
import { SEEN_IN_AUTO } from '../../../shared/record/kinds/hand'
import { ACTS } from '../../../shared/record/kinds/rounds'
import { SEAL_STATEMENT } from '../../../shared/record/kinds/review'
import { namedMinutes } from '../../../shared/record/margin'
import { otherMeasure } from '../../../shared/record/measures'
import { answerable, openItems, openOffers } from '../../../shared/record/hands'
import type { Phase } from '../../../shared/record/phases'
import type { Judgement } from '../../../shared/record/rules'
import { judge, RULES } from '../../../shared/record/rules'
import { pointsInHand, proofsDue, seenChoices } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import type { Role } from '../../../shared/schemas/people'
import type { RecordWriter } from '../../support/record'
import { secondTechnician, supervisor, technician, uuidFor } from '../../support/record'
import { BEGAN, CIRCUIT, DRAWING, INSTRUMENT, inHand, opening, PHASES_TOLD, planOf, pressure, readAll, reading, readyForDark, returnAll, signChecks, snapshot, steadySuction, storyTo, submission } from './store'

/** One thing that somebody does; `draws` choose what its body says. */
export interface Deed { kind: PersonKind, /** chooses an apt kind instead, where it is odd */ apt: number, who: number, minutes: number, late: boolean, draws: [number, number, number] }
type PersonKind = keyof typeof DRAW

const SIGNERS = [technician, secondTechnician, supervisor]
const TAGS = [...snapshot.points.map(point => point.tag), 'X-9']
const HANDS = ['on', 'off', 'open', 'closed', 'as-found', { hz: 40 }] as const

const of = <T>(list: readonly T[], draw: number): T => list[draw % list.length]!
const caseOf = (draw: number) => of(snapshot.cases, draw).id

const WHOLE = planOf()

/** A plan whose work outlasts the product, with a measure chosen that does not mend it. */
const tooLong = () => planOf({ duration: { ...WHOLE.duration, dark19in20: 70 }, measures: [otherMeasure('doors shut')] })

/** A plan of some points with or without their places in the order; most often the whole one. */
function somePlan(a: number, b: number) {
  const whole = WHOLE
  if (a % 3 === 0) return whole
  const points = whole.points.filter((_, index) => (b >> index) % 2 === 0)
  return { ...whole, points, order: a % 3 === 1 ? [] : whole.order.filter(line => points.some(point => point.tag === line.tag)) }
}

/** A body of each kind that people sign. A missing kind is found by the test of coverage. */
const DRAW: { [K in EntryKind]?: (state: OutageState, draws: Deed['draws'], now: number) => BodyInput<K> } = {
  'outage-opened': () => opening(),
  'plan-changed': (_state, [a, b]) => ({ plan: somePlan(a, b) }),
  'plan-submitted': () => ({}),
  'plan-approved': () => ({}),
  'margin-accepted': (state, [a], now) => { const figure = marginAt(state, now); return { ...(figure ? namedMinutes(figure) : { minutes: a % 40 - 20, deadlineMinutes: null }), reason: 'it goes on' } },
  'plan-returned': () => ({ reason: 'later' }),
  'in-hand-begun': () => ({}),
  'called-off': () => ({ reason: 'rain' }),
  'check-signed': (_state, [a, b]) => ({ check: of(CHECK_IDS, a), outcome: b % 4 === 0 ? 'needless' : 'done', words: b % 8 === 0 ? '' : 'seen' }),
  'point-in-hand': (state, [a, b, c]) => {
    const tag = of(TAGS, a)
    const planned = state.plan.points.find(point => point.tag === tag)?.hand
    const hand = b % 3 === 0 ? of(HANDS, c) : planned ?? of(HANDS, c)
    const choices = seenChoices(state.points[tag]?.kind ?? 'other', hand)
    return { tag, hand, seen: c % 4 === 0 ? of(choices, b) : choices[0]!, value: null, until: isoTime(BEGAN + 36_000_000), reason: c % 2 === 0 ? 'as it must' : '' }
  },
  'point-excused': (_state, [a]) => ({ tag: of(TAGS, a), reason: 'stuck', measure: 'watched' }),
  'point-in-auto': (state, [a, b]) => ({ tag: of(a % 2 === 0 ? TAGS : [...pointsInHand(state).map(point => point.tag), 'C-1'], a >> 1), seen: of(SEEN_IN_AUTO, b) }),
  'point-proven': (state, [a]) => ({ tag: of([...proofsDue(state).map(point => point.tag), ...proofsDue(state).map(point => point.tag), 'C-1'], a) }),
  'left-in-exception': (_state, [a, b]) => ({ points: [of(TAGS, a), of(TAGS, b)].map(tag => ({ tag, owner: 'Piet Harrow', by: isoTime(BEGAN + 86_400_000), reason: 'parts' })) }),
  'hands-offered': (state, [a, b]) => { const from = answerable(state)[0]; return { to: of(SIGNERS, a).id, toName: 'Somebody', size: Math.max(1, state.size), open: from === undefined || b % 3 === 0 ? [] : openItems(state, from, []), words: '' } },
  'hands-withdrawn': (state, [a]) => ({ offer: of([...state.offers.map(item => item.entry), uuidFor('none')], a), reason: 'stays' }),
  'hands-refused': (state, [a]) => ({ offer: of([...state.offers.map(item => item.entry), uuidFor('none')], a), reason: 'no' }),
  'hands-taken': (state, [a, b]) => {
    const offer = of([...openOffers(state), null], a)
    const from = offer?.from ?? of([...answerable(state), technician.id], b)
    return { from, offer: offer?.entry ?? null, looked: b % 4 === 0 ? [] : openItems(state, from, []).map(({ what, about }) => ({ what, about })), words: 'ill' }
  },
  'voice-decision': (state, [a, b, c], now) => {
    const figure = marginAt(state, now)
    const body = { points: [{ tag: of([...proofsDue(state).map(point => point.tag), 'C-1'], b), owner: 'Piet Harrow', by: isoTime(BEGAN + 86_400_000), reason: 'parts' }] }
    const decision = of([
      { kind: 'left-in-exception' as const, body },
      { kind: 'decided-otherwise' as const, body: { caseId: caseOf(b), reason: 'sold at once', clause: '3-501.19' } },
      { kind: 'margin-accepted' as const, body: { ...figure ? namedMinutes(figure) : { minutes: -3, deadlineMinutes: null }, reason: 'it goes on' } },
    ], a)
    return { supervisor: of([supervisor, supervisor, technician], c).id, supervisorName: 'Ines Calloway', givenAt: isoTime(now), words: 'go on', decision }
  },
  'voice-confirmed': (state, [a]) => ({ decision: of([...state.voices.map(voice => voice.entry), uuidFor('none')], a) }),
  'voice-denied': (state, [a]) => ({ decision: of([...state.voices.map(voice => voice.entry), uuidFor('none')], a), reason: 'not said' }),
  'hand-back-closed': () => ({}),
  'defrost-watched': () => ({ circuitId: CIRCUIT, words: 'melted' }),
  'reading-taken': (_state, [a, b]) => reading(caseOf(a), 34 + b % 10, { round: b % 5 }),
  'pressure-read': (_state, [a]) => pressure(44 + a % 8),
  'act-signed': (_state, [a, b]) => ({ caseId: caseOf(a), act: of(ACTS, b), product: 'milk', quantity: 1, place: 'cooler' }),
  'decided-otherwise': (_state, [a]) => ({ caseId: caseOf(a), reason: 'hard cheese', clause: '3-501.19' }),
  'instrument-checked': (_state, [a]) => ({ instrumentId: INSTRUMENT, value: 31 + a % 3, unit: 'F', within: a % 3 !== 0, words: '' }),
  'went-dark': (_state, _draws, now) => ({ lostAt: isoTime(now) }),
  'control-lost': (_state, [a], now) => ({ lostAt: isoTime(now - (a % 30) * 60_000), words: 'gone' }),
  'step-ticked': (_state, [a, b]) => ({ step: of(['load', 'restart', 'old', 'dance'], a), state: of(['begun', 'done'], b) }),
  'turn-back-ordered': () => ({ reason: 'too warm' }),
  'turned-back': () => ({ reason: 'bad file' }),
  'control-back': (_state, _draws, now) => ({ backAt: isoTime(now) }),
  'silence-announced': (_state, [a], now) => ({ until: isoTime(now + (a % 90 - 10) * 60_000) }),
  'note-added': () => ({ words: 'rain' }),
  'correction': (state, [a, b]) => {
    const readings = Object.values(state.cases).flatMap(item => item.readings)
    return { corrects: readings.length > 0 ? of(readings, a).entry : uuidFor('none'), reason: 'wrong', reading: of(['struck' as const, { value: 36 + b % 6 }, null], b) }
  },
  'questioned-settled': (state, [a]) => ({ entry: of([...state.questioned.filter(item => item.settled === null).map(item => item.entry), uuidFor('none')], a), words: 'looked' }),
  'question-asked': () => ({ about: null, words: 'why?' }),
  'question-answered': (state, [a]) => ({ question: of([...state.questions.map(item => item.entry), uuidFor('none')], a), words: 'so' }),
  'submitted': () => submission(),
  'review-begun': () => ({}),
  'returned': () => ({ reason: 'more' }),
  'sealed': (state, [a]) => ({ statement: SEAL_STATEMENT, drawing: DRAWING, size: state.size + (a % 3 === 0 ? 1 : 0), root: 'e'.repeat(64) }),
}

export const DRAWN = Object.keys(DRAW) as PersonKind[]
/** What somebody would most likely do in each phase. */
const APT: Partial<Record<Phase, PersonKind[]>> = {
  'plan': ['plan-submitted', 'plan-approved', 'plan-approved', 'margin-accepted', 'plan-returned', 'plan-changed', 'control-lost'],
  'approved': ['hands-taken', 'hands-withdrawn', 'hands-refused', 'hands-offered', 'in-hand-begun', 'in-hand-begun', 'plan-changed', 'point-in-hand', 'control-lost', 'called-off'],
  'in-hand': ['went-dark', 'went-dark', 'went-dark', 'plan-changed', 'point-in-hand', 'point-in-hand', 'point-excused', 'point-in-auto', 'reading-taken', 'questioned-settled', 'called-off', 'control-lost'],
  'dark': ['voice-confirmed', 'voice-denied', 'voice-decision', 'hands-taken', 'control-back', 'control-back', 'turn-back-ordered', 'turned-back', 'point-in-hand', 'point-excused', 'act-signed', 'decided-otherwise'],
  'hand-back': ['hand-back-closed', 'hand-back-closed', 'left-in-exception', 'voice-decision', 'hands-offered', 'point-in-auto', 'point-in-auto', 'point-proven', 'point-proven', 'check-signed', 'control-lost'],
  'settle': ['submitted', 'submitted', 'reading-taken', 'point-in-hand', 'point-in-auto', 'point-proven', 'left-in-exception', 'questioned-settled', 'question-answered', 'control-lost'],
  'submitted': ['review-begun', 'sealed', 'sealed', 'sealed', 'returned', 'question-asked', 'question-answered', 'questioned-settled', 'point-in-hand'],
}

const deed: fc.Arbitrary<Deed> = fc.record({
  kind: fc.constantFrom(...DRAWN),
  apt: fc.nat(127),
  who: fc.nat(2),
  minutes: fc.nat(8),
  late: fc.boolean(),
  draws: fc.tuple(fc.nat(255), fc.nat(255), fc.nat(255)),
})

export interface Start { name: string, entries: StoredEntry[], state: OutageState, now: number }

function startOf(name: string, writer: RecordWriter): Start {
  return { name, entries: writer.entries, state: writer.state, now: writer.now }
}

function prepared(phase: 'plan' | 'approved' | 'in-hand' | 'dark' | 'hand-back' | 'settle' | 'submitted', prepare: (writer: RecordWriter) => unknown): RecordWriter {
  const writer = storyTo(phase)
  prepare(writer)
  return writer
}

function settle(writer: RecordWriter): void {
  readAll(writer, 39)
  writer.pass(8)
  readAll(writer, 38)
}

/** Ready for dark but for the last point of the order. */
function allButOne(writer: RecordWriter): void {
  signChecks(writer, BEFORE_CHECKS)
  for (const { tag } of writer.state.plan.order.slice(0, -1)) writer.pass(0.5).sign(technician, 'point-in-hand', inHand(tag))
  readAll(writer, 37)
  steadySuction(writer)
}

/** Every phase as it was just reached, and others part-way; those more often whose next gate much can shut, or should. */
export const STARTS: Start[] = [
  ...PHASES_TOLD.map(phase => startOf(phase, storyTo(phase))),
  ...[1, 2, 3, 4].map(() => startOf('ready for dark', prepared('in-hand', readyForDark))),
  ...[1, 2].map(() => startOf('a margin below nothing', prepared('plan', writer => writer.sign(technician, 'plan-changed', { plan: tooLong() })))),
  startOf('checks signed', prepared('in-hand', writer => signChecks(writer, BEFORE_CHECKS))),
  startOf('controller checked', prepared('hand-back', writer => signChecks(writer, BACK_CHECKS))),
  startOf('all returned', prepared('hand-back', (writer) => { signChecks(writer, BACK_CHECKS); returnAll(writer) })),
  startOf('proof due', prepared('hand-back', (writer) => { signChecks(writer, BACK_CHECKS); writer.sign(technician, 'point-in-auto', { tag: handBackOrder(writer.state)[0]!.tag, seen: 'not-called' }) })),
  ...[1, 2, 3].map(() => startOf('all but one in hand', prepared('in-hand', allButOne))),
  ...[1, 2].map(() => startOf('sent', prepared('plan', writer => writer.sign(technician, 'plan-submitted', {})))),
  ...[1, 2].map(() => startOf('two claims', prepared('approved', writer => SIGNERS.slice(0, 2).forEach(signer => writer.pass(1).sign(signer, 'point-in-hand', inHand('DH-1'), { expect: 'questioned' }))))),
  ...[1, 2].map(() => startOf('in hand again', prepared('settle', (writer) => { settle(writer); writer.sign(technician, 'point-in-hand', inHand('EF-1')) }))),
  ...[1, 2].map(() => startOf('under review', prepared('submitted', writer => writer.sign(supervisor, 'review-begun', {})))),
  startOf('asked', prepared('settle', writer => writer.sign(supervisor, 'question-asked', { about: null, words: 'why?' }))),
  startOf('settled', prepared('settle', settle)),
  ...[1, 2, 3].map(() => startOf('offered', prepared('approved', writer => writer.sign(technician, 'hands-offered', { to: secondTechnician.id, toName: secondTechnician.name, size: 1, open: [] })))),
  ...[1, 2].map(() => startOf('decided by voice', prepared('dark', writer => writer.sign(technician, 'voice-decision', { supervisor: supervisor.id, supervisorName: supervisor.name, givenAt: isoTime(writer.now), words: 'go on', decision: { kind: 'decided-otherwise', body: { caseId: caseOf(0), reason: 'sold at once', clause: '3-501.19' } } })))),
]

export const walks = fc.record({ start: fc.nat(STARTS.length - 1), deeds: fc.array(deed, { minLength: 1, maxLength: 24 }) })
export type Walk = typeof walks extends fc.Arbitrary<infer T> ? T : never

/** An opening is large, and parsing it over and over takes most of a run's time. */
let parsedOpening: unknown
function bodyOf(kind: PersonKind, drawn: unknown): unknown {
  if (kind !== 'outage-opened') return schemaOf(kind, newestVersion(kind))!.parse(drawn)
  return parsedOpening ??= schemaOf(kind, newestVersion(kind))!.parse(drawn)
}

/** What a check compares with, taken before a deed. */
export interface Before { phase: Phase, inHand: number, unready: string[], authors: string[], submitters: string[], openActs: (number | null)[] }

function taken(state: OutageState): Before {
  return {
    phase: state.phase,
    inHand: pointsInHand(state).length,
    unready: state.plan.points.map(point => point.tag).filter(tag => !['hand', 'excused'].includes(state.points[tag]!.status)),
    authors: [...state.authors],
    submitters: [...state.submitters],
    openActs: Object.values(state.cases).map(item => item.openAct),
  }
}

/** What was judged and, unless refused, applied. */
export interface Happening { entry: AnyEntry, before: Before, after: OutageState, judgement: Judgement }

/**
 * Goes through a walk. `look` sees every deed with the state before and after it.
 * @returns the whole log and the state that applying it one by one has come to
 */
export function go({ start, deeds }: Walk, look: (happening: Happening) => void): { entries: StoredEntry[], state: OutageState } {
  const { entries: told, state: begun, now: then } = STARTS[start]!
  const entries = [...told]
  const state = structuredClone(begun)
  let now = then
  for (const [index, { kind: any, apt, who, minutes, late, draws }] of deeds.entries()) {
    now += minutes * 60_000
    const kind = apt % 2 === 1 ? of(APT[state.phase] ?? [any], apt >> 1) : any
    const signer = RULES[kind].roles.length === 1 && apt % 2 === 1 ? supervisor : SIGNERS[who]!
    const chain = state.chain[signer.device]
    const draw = DRAW[kind] as (state: OutageState, draws: Deed['draws'], now: number) => unknown
    const entry = {
      v: newestVersion(kind), id: uuidFor(`walk ${index}`, now), outage: state.id, kind, body: bodyOf(kind, draw(state, draws, now)), at: isoTime(now - (late ? 180_000 : 0)), skew: 0,
      by: signer.id, device: signer.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null,
    } as AnyEntry
    const judgement = judge(state, entry, { id: signer.id, role: signer.role as Role }, { planRefusals, handBackAfter, margin: marginAt, filesAwaited: () => [], root: null })
    const before = taken(state)
    if (judgement.standing !== 'refused') {
      const stored: StoredEntry = { entry, signature: entryHash(entry), seq: entries.length + 1, receivedAt: isoTime(now), standing: judgement.standing, why: judgement.why }
      entries.push(stored)
      applyStored(state, stored)
    }
    look({ entry, before, after: state, judgement })
  }
  return { entries, state }
}
