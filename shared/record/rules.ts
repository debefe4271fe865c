import type { Role } from '../schemas/people'
import { BACK_CHECKS, checkById } from './checks'
import type { AnyEntry, Entry } from './entry'
import { correctedTime, happenedAt } from './entry'
import { isAccepted, marginFaults, namedMinutes, acceptanceWanted } from './margin'
import type { MarginFigure } from './margin'
import { offerUnfit, takenUnfit } from './hand-over-rules'
import { openOffers } from './hands'
import { callOffGate, goDarkGate, handBackGate, planGate, returnPointsGate, sealGate, submitGate } from './gates'
import { readsIcePoint } from './instruments'
import type { EntryKind } from './kinds'
import { asNewest } from './newest'
import { PHASE_WORDS, PHASES } from './phases'
import type { Phase } from './phases'
import { exceptionUnfit, knownPoint, pointInHandUnfit, stillHeld } from './point-rules'
import { nameOf, turnBackOrder, turningBack } from './select'
import { openVoices, spokenEntry } from './voice'
import type { OutageState } from './state'

/** Who signs. */
export interface Actor { id: string, role: Role }

/** What only the engines and the store can say; worked out by the caller when asked. */
export interface Surroundings {
  /** rules that the plan breaks, by the order engine, in words */
  planRefusals: (state: OutageState) => string[]
  /** tags that go back to auto before this one (I7, I12 and the order of page hand back) */
  handBackAfter: (state: OutageState, tag: string) => string[]
  /** whether product outlasts the work, with the start temperatures known at a moment; null: not worked out here */
  margin: (state: OutageState, at: number) => MarginFigure | null
  /** files named by the log that the store does not hold */
  filesAwaited: (state: OutageState) => string[]
  /** Merkle root of the log so far, or null where the log is not at hand (then it is not compared) */
  root: string | null
}

interface Rule<K extends EntryKind> {
  roles: readonly Role[]
  phases: readonly Phase[]
  /** a reason why this person may not sign this at all */
  forbids?: (state: OutageState, entry: Entry<K>, actor: Actor) => string | null
  /** reasons why the entry does not fit the state */
  unfit?: (state: OutageState, entry: Entry<K>, around: Surroundings) => string[]
}

const HANDS: readonly Role[] = ['technician', 'supervisor']
const SUPERVISOR: readonly Role[] = ['supervisor']
const NOBODY: readonly Role[] = []
const RUN: readonly Phase[] = ['in-hand', 'dark', 'hand-back', 'settle']
const CHANGING: readonly Phase[] = ['approved', ...RUN]
const BEFORE_SEAL = PHASES.filter(phase => phase !== 'sealed')
/** A time given as past may lie this far ahead of the entry's own, ms. */
const AHEAD_MS = 60_000

const own = (state: OutageState, actor: Actor) => state.authors.includes(actor.id)
const serverOnly = { roles: NOBODY, phases: PHASES }
const ahead = (entry: AnyEntry, time: string) => correctedTime(entry, time) > happenedAt(entry) + AHEAD_MS ? ['the time lies in the future'] : []
const knownCase = (state: OutageState, id: string) => state.cases[id] ? [] : ['there is no such case in this outage']

/** Who may sign what, in which phase, and what it must fit. */
export const RULES: { [K in EntryKind]: Rule<K> } = {
  'signer-named': serverOnly,
  'outage-numbered': serverOnly,
  'verdict-changed': serverOnly,
  'plant-warned': serverOnly,
  'act-opened': serverOnly,
  'act-lapsed': serverOnly,
  'entry-refused': serverOnly,
  'alert-raised': serverOnly,
  'alert-passed-on': serverOnly,
  'alert-acknowledged': serverOnly,
  'alert-over': serverOnly,
  'notice-sent': serverOnly,
  'notice-acknowledged': serverOnly,

  'outage-opened': { roles: HANDS, phases: ['plan'], unfit: (state, entry) => [
    ...(state.opened ? ['this outage is already open'] : []),
    ...(entry.body.lostAt === null ? [] : ahead(entry, entry.body.lostAt)),
  ] },
  'plan-changed': { roles: HANDS, phases: ['plan', 'approved', 'in-hand', 'dark'] },
  'plan-submitted': { roles: HANDS, phases: ['plan'], unfit: (state, entry, around) => planGate(state, { planRefusals: around.planRefusals(state), margin: around.margin(state, happenedAt(entry)) }) },
  'margin-accepted': { roles: SUPERVISOR, phases: ['plan', 'approved', 'in-hand'], forbids: (state, _entry, actor) => own(state, actor) ? 'nobody accepts the margin of what they planned themselves (I10)' : null, unfit: acceptanceUnfit },
  'plan-approved': { roles: SUPERVISOR, phases: ['plan'], forbids: (state, _entry, actor) => own(state, actor) ? 'nobody approves what they planned themselves (I10)' : null, unfit: (state, entry, around) => [...waitsForApproval(state), ...marginUncovered(state, happenedAt(entry), around)] },
  'plan-returned': { roles: SUPERVISOR, phases: ['plan'], unfit: waitsForApproval },
  'in-hand-begun': { roles: HANDS, phases: ['approved'] },
  'called-off': { roles: HANDS, phases: ['plan', 'approved', 'in-hand'], unfit: state => callOffGate(state) },

  'check-signed': { roles: HANDS, phases: ['approved', ...RUN], unfit: (state, { body }) => {
    const back = BACK_CHECKS.some(check => check.id === body.check)
    if (back && state.phase !== 'hand-back' && state.phase !== 'settle') return ['the controller is checked once control is back']
    if (body.outcome === 'needless' && !checkById(body.check).mayBeNeedless) return ['this check cannot be left out']
    return body.outcome === 'needless' && body.words === '' ? ['say why it is not needed'] : []
  } },
  'point-in-hand': { roles: HANDS, phases: RUN, unfit: pointInHandUnfit },
  'point-excused': { roles: HANDS, phases: ['in-hand', 'dark'], unfit: (state, { body }) => state.points[body.tag]?.status === 'hand' ? [`${body.tag} is in hand; only what cannot be put in hand is excused`] : knownPoint(state, body.tag) },
  'point-in-auto': { roles: HANDS, phases: ['in-hand', 'hand-back', 'settle'], unfit: (state, { body }, around) => {
    const point = state.points[body.tag]
    if (!point) return knownPoint(state, body.tag)
    if (point.status !== 'hand' && point.tried === null && point.questionedHand === null) return [`${body.tag} is not in hand`]
    const gate = state.darks.length > 0 ? returnPointsGate(state) : []
    const before = around.handBackAfter(state, body.tag).filter(tag => stillHeld(state, tag))
    return before.length > 0 ? [...gate, `goes back after ${before.join(', ')}`] : gate
  } },
  'point-proven': { roles: HANDS, phases: ['hand-back', 'settle'], unfit: (state, { body }) => state.points[body.tag]?.status === 'returned' ? [] : [`${body.tag} is not waiting for its proof`] },
  'left-in-exception': { roles: SUPERVISOR, phases: ['hand-back', 'settle'], unfit: (state, { body }) => body.points.flatMap(left => exceptionUnfit(state, left.tag)) },
  'hands-offered': { roles: HANDS, phases: CHANGING, unfit: offerUnfit },
  'hands-withdrawn': { roles: HANDS, phases: CHANGING, unfit: (state, { by, body }) => {
    const offer = openOffers(state).find(item => item.entry === body.offer)
    return !offer ? ['no such offer is open'] : offer.from === by ? [] : [`only ${nameOf(state, offer.from)} withdraws it`]
  } },
  'hands-refused': { roles: HANDS, phases: CHANGING, unfit: (state, { by, body }) => {
    const offer = openOffers(state).find(item => item.entry === body.offer)
    return !offer ? ['no such offer is open'] : offer.to === by ? [] : [`it was offered to ${offer.toName}`]
  } },
  'hands-taken': { roles: HANDS, phases: CHANGING, forbids: (_state, { body }, actor) => body.offer === null && actor.role !== 'supervisor' ? 'without an offer only a supervisor takes over' : null, unfit: takenUnfit },
  'voice-decision': {
    roles: HANDS,
    phases: BEFORE_SEAL,
    forbids: (_state, { body }, actor) => body.supervisor === actor.id ? 'nobody takes down their own decision: sign it itself' : null,
    unfit: spokenUnfit,
  },
  'voice-confirmed': { roles: SUPERVISOR, phases: BEFORE_SEAL, forbids: (state, { body }, actor) => notTheirs(state, body.decision, actor), unfit: (state, { body }) => voiceWaits(state, body.decision) },
  'voice-denied': { roles: SUPERVISOR, phases: BEFORE_SEAL, unfit: (state, { body }) => voiceWaits(state, body.decision) },
  'hand-back-closed': { roles: HANDS, phases: ['hand-back'], unfit: state => handBackGate(state) },
  'defrost-watched': { roles: HANDS, phases: ['hand-back', 'settle'], unfit: (state, { body }) => state.snapshot.circuits.some(circuit => circuit.id === body.circuitId) ? [] : ['there is no such circuit'] },

  'reading-taken': { roles: HANDS, phases: ['approved', ...RUN], unfit: (state, { body }) => knownCase(state, body.caseId) },
  'pressure-read': { roles: HANDS, phases: ['approved', ...RUN], unfit: (state, { body }) => state.snapshot.suctionGroups.some(group => group.id === body.suctionGroupId) ? [] : ['there is no such suction group'] },
  'act-signed': { roles: HANDS, phases: [...RUN, 'approved', 'submitted'], unfit: actUnfit },
  'decided-otherwise': { roles: SUPERVISOR, phases: [...RUN, 'submitted'], unfit: (state, { body }) => knownCase(state, body.caseId) },
  'instrument-checked': { roles: HANDS, phases: ['approved', ...RUN], unfit: (state, { body }) => {
    const instrument = state.snapshot.instruments.find(item => item.id === body.instrumentId)
    if (!instrument) return ['there is no such instrument at this site']
    return readsIcePoint(body.value, body.unit, instrument.accuracyC) === body.within ? [] : ['what is said of the ice point does not follow from the reading']
  } },

  'went-dark': { roles: HANDS, phases: ['in-hand'], unfit: (state, entry, around) => {
    const at = happenedAt(entry)
    return [...ahead(entry, entry.body.lostAt), ...goDarkGate(state, at, { planRefusals: [], margin: around.margin(state, at) })]
  } },
  'control-lost': { roles: HANDS, phases: ['plan', 'approved', 'in-hand', 'hand-back', 'settle'], unfit: (_state, entry) => ahead(entry, entry.body.lostAt) },
  'step-ticked': { roles: HANDS, phases: ['approved', ...RUN], unfit: (state, { body }) => [...state.plan.steps, ...state.plan.rollBack].some(step => step.id === body.step) ? [] : ['there is no such step'] },
  'turn-back-ordered': { roles: SUPERVISOR, phases: ['dark'], unfit: state => turningBack(state) ? ['the way back has begun already'] : turnBackOrder(state) ? ['it is ordered already'] : [] },
  'turned-back': { roles: HANDS, phases: ['dark'], unfit: state => turningBack(state) ? ['the way back has begun already'] : [] },
  'control-back': { roles: HANDS, phases: ['dark'], unfit: (state, entry) => {
    const from = state.darks.at(-1)?.from ?? 0
    return correctedTime(entry, entry.body.backAt) < from ? ['control cannot be back before it was lost'] : ahead(entry, entry.body.backAt)
  } },
  'silence-announced': { roles: HANDS, phases: BEFORE_SEAL, unfit: (_state, entry) => correctedTime(entry, entry.body.until) <= happenedAt(entry) ? ['the time lies in the past'] : [] },
  'note-added': { roles: HANDS, phases: BEFORE_SEAL },

  'correction': { roles: HANDS, phases: BEFORE_SEAL, unfit: (state, { body }) => body.reading === null || Object.values(state.cases).some(item => item.readings.some(reading => reading.entry === body.corrects)) ? [] : ['there is no such reading'] },
  'questioned-settled': { roles: HANDS, phases: BEFORE_SEAL, unfit: (state, { body }) => state.questioned.some(item => item.entry === body.entry && item.settled === null) ? [] : ['no such entry is waiting'] },
  'question-asked': { roles: SUPERVISOR, phases: [...RUN, 'submitted'] },
  'question-answered': { roles: HANDS, phases: BEFORE_SEAL, unfit: (state, { body }) => state.questions.some(question => question.entry === body.question && question.answer === null) ? [] : ['no such question is open'] },
  'submitted': { roles: HANDS, phases: ['settle'], unfit: state => submitGate(state) },
  'review-begun': { roles: SUPERVISOR, phases: ['submitted'] },
  'returned': { roles: SUPERVISOR, phases: ['submitted'] },
  'sealed': {
    roles: SUPERVISOR,
    phases: ['submitted'],
    forbids: (state, _entry, actor) => own(state, actor) || state.submitters.includes(actor.id) ? 'nobody seals what they planned or submitted themselves (I10)' : null,
    unfit: (state, { body, device }, around) => {
      const missing = sealGate(state, around.filesAwaited(state))
      if (!state.signers[device]) missing.push('the review is not begun: the countersigner is not named in the record yet')
      if (body.size !== state.size) missing.push(`the record has ${state.size} entries, the seal says ${body.size}: read it again`)
      else if (around.root !== null && body.root !== around.root) missing.push('the root of the seal is not that of the record')
      return missing
    },
  },
}

/** A decision by voice fits where the supervisor's own entry would have: the same phases, the same rules. */
function spokenUnfit(state: OutageState, entry: Entry<'voice-decision'>, around: Surroundings): string[] {
  const { supervisor, supervisorName, givenAt } = entry.body
  const spoken = spokenEntry(entry)
  const rule = RULES[spoken.kind] as Rule<EntryKind>
  const known = Object.values(state.signers).find(signer => signer.person === supervisor)
  const missing = known && known.role !== 'supervisor' ? [`${supervisorName} is not a supervisor`] : []
  const forbidden = rule.forbids?.(state, spoken, { id: supervisor, role: 'supervisor' })
  if (forbidden) missing.push(forbidden)
  if (!rule.phases.includes(state.phase)) missing.push(`does not belong in the phase "${PHASE_WORDS[state.phase].toLowerCase()}"`)
  return [...missing, ...ahead(entry, givenAt), ...rule.unfit?.(state, spoken, around) ?? []]
}

/** Whoever was named decides whether the words were theirs. */
function notTheirs(state: OutageState, decision: string, actor: Actor): string | null {
  const voice = state.voices.find(item => item.entry === decision)
  return voice && voice.supervisor !== actor.id ? `this decision was given by ${voice.supervisorName}, who signs it` : null
}

function voiceWaits(state: OutageState, decision: string): string[] {
  return openVoices(state).some(voice => voice.entry === decision) ? [] : ['no such decision waits for a signature']
}

/** Numbers below nothing that no acceptance covers. */
function marginUncovered(state: OutageState, at: number, around: Surroundings): string[] {
  const figure = around.margin(state, at)
  return figure ? acceptanceWanted(state, figure) : []
}

/** An acceptance names the numbers as they stand: another one would have been read by nobody. */
function acceptanceUnfit(state: OutageState, entry: Entry<'margin-accepted'>, around: Surroundings): string[] {
  const figure = around.margin(state, happenedAt(entry))
  if (!figure) return []
  if (marginFaults(figure).length === 0) return ['the margin is not negative: there is nothing to accept']
  if (isAccepted(state, figure)) return ['it is accepted already']
  const { minutes, deadlineMinutes } = namedMinutes(figure)
  const near = (named: number | null, now: number | null) => named === now || (named !== null && now !== null && Math.abs(named - now) <= 1)
  const missing = near(entry.body.minutes, minutes) && near(entry.body.deadlineMinutes, deadlineMinutes) ? [] : ['the numbers are others by now: read them again']
  return state.plan.measures.length > 0 ? missing : [...missing, 'choose measures first: what remains after them is accepted']
}

/** What an act must say; a promise lies ahead of the moment at which it is made. */
function actUnfit(state: OutageState, entry: Entry<'act-signed'>): string[] {
  const { act, caseId, product, quantity, place, coolBy, takenBy } = entry.body
  const missing = knownCase(state, caseId)
  if (act === 'discarded' && (product === '' || quantity === null)) missing.push('name the product and the quantity that is discarded')
  if (act === 'discarded' && takenBy === '') missing.push('say who took what is discarded')
  if (act === 'moved' && place === '') missing.push('say where the product was moved to')
  if (act === 'cool-by' && coolBy === null) missing.push('say by when it is to be cooled')
  if (act === 'cool-by' && coolBy !== null && correctedTime(entry, coolBy) <= happenedAt(entry)) missing.push('the time by which it is to be cooled is past already')
  return missing
}

function waitsForApproval(state: OutageState): string[] {
  return state.planSubmitted ? [] : ['the plan was not sent for approval']
}

export type Judgement
  = | { standing: 'accepted' | 'questioned', why: string[] }
    | { standing: 'refused', why: string[] }

/**
 * Whether a validly signed entry of a known kind may be stored, and how it stands.
 * Refused: this person may never sign it. Questioned: it is kept, but does not fit.
 */
export function judge(state: OutageState, signed: AnyEntry, actor: Actor, around: Surroundings): Judgement {
  const entry = asNewest(signed)
  const rule = RULES[entry.kind] as Rule<EntryKind>
  if (!rule.roles.includes(actor.role)) return { standing: 'refused', why: [rule.roles.length === 0 ? 'only Holdover itself signs this' : `this is signed by a ${rule.roles.join(' or a ')}, not by ${actor.role === 'auditor' || actor.role === 'administrator' ? 'an' : 'a'} ${actor.role}`] }
  const forbidden = rule.forbids?.(state, entry, actor)
  if (forbidden) return { standing: 'refused', why: [forbidden] }
  if (!rule.phases.includes(state.phase)) return { standing: 'questioned', why: [`does not belong in the phase "${PHASE_WORDS[state.phase].toLowerCase()}"`] }
  const why = rule.unfit?.(state, entry, around) ?? []
  return { standing: why.length === 0 ? 'accepted' : 'questioned', why }
}
