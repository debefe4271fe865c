import { closeAct, correctProof, endBySigning, openAct, openingOf, proveAct } from './act-course'
import { acknowledgeAlert, endAlert, passOnAlert, raiseAlert } from './alert-effects'
import { BACK_CHECKS } from './checks'
import type { AnyEntry, Entry, StoredEntry } from './entry'
import { correctedTime, happenedAt } from './entry'
import { goDarkGate, NO_RESULTS } from './gates'
import { answerHands, offerHands, takeHands } from './hands-effects'
import type { EntryKind } from './kinds'
import { noticeAcknowledged, noticeSent } from './notice-effects'
import type { Plan } from './plan'
import { expectedSeen } from './select'
import type { CaseState, Mark, OutageState, PointState } from './state'
import { spokenEntry } from './voice'
import { answerVoice, beforeVoice } from './voice-effects'

type Effect<K extends EntryKind> = (state: OutageState, entry: Entry<K>, mark: Mark) => void

/** What an accepted entry does to the state. Each changes the draft that the fold hands it. */
export const EFFECTS: { [K in EntryKind]: Effect<K> } = {
  'signer-named': (state, { body }) => {
    state.signers[body.device] = { person: body.person, name: body.name, role: body.role, deviceName: body.deviceName, publicKey: body.publicKey }
  },
  'outage-numbered': (state, { body }) => { state.code = body.code },
  'entry-refused': (state, { body }, mark) => {
    state.refusals.push({ device: body.device, n: body.n, id: body.id, reason: body.reason, seq: mark.seq })
    state.chain[body.device] = { n: body.n, hash: body.hash }
  },
  'verdict-changed': (state, { body }, mark) => {
    const item = state.cases[body.caseId]
    if (!item) return
    item.verdict = { verdict: body.verdict, deadline: body.deadline === null ? null : Date.parse(body.deadline), minutesAbove: body.minutesAbove, clause: body.clause, source: body.source, act: body.act, why: body.why, at: Date.parse(body.judgedAt), seq: mark.seq }
    if (body.verdict === 'act' || body.verdict === 'discard') openAct(item, body.verdict, item.verdict.deadline, mark)
    // A verdict grows milder by itself only where its rule says so, or where a reading was corrected.
    else if (body.verdict !== 'unknown' && asksByVerdict(item)) closeAct(item, 'verdict', mark)
  },
  'act-lapsed': (state, { body }, mark) => {
    const item = state.cases[body.caseId]
    if (item && openingOf(item)?.cause === 'hold-short') closeAct(item, 'hold', mark)
  },
  'act-opened': (state, { body }, mark) => {
    const item = state.cases[body.caseId]
    if (item) openAct(item, body.cause, body.deadline === null ? null : Date.parse(body.deadline), mark)
  },
  'plant-warned': (state, { body }, mark) => {
    state.plant = state.plant.filter(item => item.fault !== body.fault || item.about !== body.about)
    if (!body.over) state.plant.push({ fault: body.fault, about: body.about, words: body.words, act: body.act, at: Date.parse(body.judgedAt), seq: mark.seq })
  },
  'alert-raised': (state, { body }, mark) => raiseAlert(state, body, mark),
  'alert-passed-on': (state, { body }, mark) => passOnAlert(state, body, mark),
  'alert-acknowledged': (state, { body }) => acknowledgeAlert(state, body),
  'alert-over': (state, { body }, mark) => endAlert(state, body.key, mark),

  'notice-sent': (state, { body }, mark) => noticeSent(state, body, mark),
  'notice-acknowledged': (state, { body }, mark) => noticeAcknowledged(state, body, mark),

  'outage-opened': (state, entry, mark) => {
    const { body } = entry
    state.opened = mark
    state.holder = { person: mark.by, mark }
    state.planned = body.planned
    state.cause = body.cause
    state.snapshot = body.snapshot
    for (const point of body.snapshot.points) state.points[point.tag] = newPoint(point.tag, point.kind)
    for (const item of body.snapshot.cases) state.cases[item.id] = newCase(item.id)
    setPlan(state, body.plan, mark)
    if (!body.planned) beginDark(state, correctedTime(entry, body.lostAt ?? entry.at), 'fact', body.cause, [], mark)
  },
  'plan-changed': (state, { body }, mark) => {
    setPlan(state, body.plan, mark)
    state.planSubmitted = null
    if (state.phase === 'approved') { state.phase = 'plan'; state.approved = null }
  },
  'plan-submitted': (state, _entry, mark) => { state.planSubmitted = mark; state.planReturned = null; addOnce(state.authors, mark.by) },
  'plan-approved': (state, _entry, mark) => { state.approved = mark; state.phase = 'approved' },
  'margin-accepted': (state, { body }, mark) => { state.marginAccepted = { ...body, mark } },
  'plan-returned': (state, { body }, mark) => { state.planReturned = { reason: body.reason, mark }; state.planSubmitted = null },
  'in-hand-begun': (state, _entry, mark) => { state.inHandBegun = mark; state.holder = { person: mark.by, mark }; state.phase = 'in-hand' },
  'called-off': (state, { body }, mark) => { state.calledOff = { reason: body.reason, mark }; state.phase = 'called-off' },

  'check-signed': (state, { body }, mark) => { state.checks[body.check] = { outcome: body.outcome, words: body.words, photos: body.photos, mark } },
  'point-in-hand': (state, { body }, mark) => {
    const point = state.points[body.tag]
    if (!point) return
    point.questionedHand = null
    point.owner = mark.by
    if (point.kind === 'compressor') point.stoppedAt = body.seen === 'not-running' ? mark.at : null
    if (body.seen !== expectedSeen(point.kind, body.hand)) { Object.assign(point, { tried: { seen: body.seen, mark }, exception: null }); return }
    Object.assign(point, { status: 'hand', hand: body.hand, seen: body.seen, value: body.value, until: Date.parse(body.until), reason: body.reason, words: body.words, photos: body.photos, mark, tried: null, excuse: null, exception: null, proof: null })
  },
  'point-excused': (state, { body }, mark) => {
    const point = state.points[body.tag]
    // A try that did not come out may have left its selector in hand: it counts until it is seen back in auto.
    if (point) Object.assign(point, { status: 'excused', hand: null, excuse: { reason: body.reason, measure: body.measure }, photos: body.photos, mark })
  },
  'point-in-auto': (state, { body }, mark) => {
    const point = state.points[body.tag]
    if (!point) return
    const beforeDark = state.darks.length === 0
    const status = beforeDark ? 'auto' : body.seen === 'answers' ? 'proven' : 'returned'
    Object.assign(point, { status, hand: null, value: null, until: null, owner: null, seen: body.seen, words: body.words, photos: body.photos, mark, tried: null, questionedHand: null, proof: status === 'proven' ? mark : null })
  },
  'point-proven': (state, { body }, mark) => {
    const point = state.points[body.tag]
    if (point) Object.assign(point, { status: 'proven', seen: 'answers', words: body.words, photos: body.photos, proof: mark })
  },
  'left-in-exception': (state, entry, mark) => {
    for (const left of entry.body.points) {
      const point = state.points[left.tag]
      if (point) point.exception = { owner: left.owner, by: correctedTime(entry, left.by), reason: left.reason, mark }
    }
  },
  'hand-back-closed': (state, _entry, mark) => { state.handBackClosed = mark; state.phase = 'settle' },
  'hands-offered': (state, { body }, mark) => offerHands(state, body, mark),
  'hands-withdrawn': (state, { body }, mark) => answerHands(state, body.offer, 'withdrawn', body.reason, mark),
  'hands-refused': (state, { body }, mark) => answerHands(state, body.offer, 'refused', body.reason, mark),
  'hands-taken': (state, { body }, mark) => takeHands(state, body, mark),
  'voice-decision': (state, entry, mark) => {
    const { body } = entry
    const before = beforeVoice(state, body.decision)
    state.named[body.supervisor] = body.supervisorName
    // The decision is the supervisor's, whoever took it down.
    applyAccepted(state, spokenEntry(entry), { ...mark, by: body.supervisor })
    state.voices.push({ entry: mark.entry, supervisor: body.supervisor, supervisorName: body.supervisorName, takenBy: mark.by, givenAt: correctedTime(entry, body.givenAt), words: body.words, decision: body.decision, mark, answer: null, before })
  },
  'voice-confirmed': (state, { body }, mark) => answerVoice(state, body.decision, { what: 'confirmed', words: body.words, mark }),
  'voice-denied': (state, { body }, mark) => answerVoice(state, body.decision, { what: 'denied', words: body.reason, mark }),
  'defrost-watched': (state, { body }, mark) => { state.defrostsWatched.push({ ...body, mark }) },

  'reading-taken': (state, entry, mark) => {
    addReading(state, entry, mark, false)
    proveAct(state, entry.body.caseId, mark)
  },
  'pressure-read': (state, { body }, mark) => addPressure(state, body, mark, false),
  'act-signed': (state, entry, mark) => {
    const { caseId, coolBy, ...act } = entry.body
    const item = state.cases[caseId]
    if (!item) return
    item.acts.push({ ...act, coolBy: coolBy === null ? null : correctedTime(entry, coolBy), mark })
    if (act.act === 'accepted-warm') item.acceptedWarm = true
    else endBySigning(item, act, mark)
  },
  'decided-otherwise': (state, { body }, mark) => {
    const item = state.cases[body.caseId]
    if (!item) return
    item.decidedOtherwise = { reason: body.reason, clause: body.clause, mark }
    closeAct(item, 'decision', mark)
  },
  'instrument-checked': (state, { body }, mark) => { state.instrumentChecks.push({ ...body, at: mark.at, mark }) },

  'went-dark': (state, entry, mark) => beginDark(state, correctedTime(entry, entry.body.lostAt), 'gate', '', [], mark),
  'control-lost': (state, entry, mark) => {
    const again = state.darks.length > 0
    const breach = again ? [`control lost again in ${state.phase === 'settle' ? 'settle' : 'hand back'}`] : goDarkGate(state, mark.at, NO_RESULTS)
    beginDark(state, correctedTime(entry, entry.body.lostAt), 'fact', entry.body.words, breach, mark)
  },
  'step-ticked': (state, { body }, mark) => {
    const known = Object.hasOwn(state.steps, body.step) ? state.steps[body.step] : undefined
    state.steps[body.step] = { begun: null, done: null, ...known, [body.state]: mark }
  },
  'turn-back-ordered': (state, { body }, mark) => { state.turnBackOrdered = { reason: body.reason, mark } },
  'turned-back': (state, { body }, mark) => { state.turnedBack = { reason: body.reason, mark } },
  'control-back': (state, entry) => {
    const backAt = correctedTime(entry, entry.body.backAt)
    const open = state.darks.at(-1)
    if (open) open.to = backAt
    state.backAt = backAt
    state.phase = 'hand-back'
  },
  'silence-announced': (state, entry) => {
    const heard = state.heard[entry.device]
    if (heard) heard.until = correctedTime(entry, entry.body.until)
  },
  'note-added': (state, { body }, mark) => { state.notes.push({ ...body, mark }) },

  'correction': (state, { body }, mark) => {
    state.corrections.push({ corrects: body.corrects, reason: body.reason, mark })
    if (body.reading === null) return
    for (const item of Object.values(state.cases)) {
      const reading = item.readings.find(known => known.entry === body.corrects)
      if (!reading) continue
      reading.correctedBy = mark.entry
      reading.struck = body.reading === 'struck'
      if (body.reading !== 'struck') reading.value = body.reading.value
      correctProof(state, item, reading)
    }
  },
  'questioned-settled': (state, { body }, mark) => {
    const item = state.questioned.find(known => known.entry === body.entry)
    if (!item) return
    item.settled = { words: body.words, mark }
    for (const point of Object.values(state.points)) if (point.questionedHand === body.entry) point.questionedHand = otherClaim(state, point)
  },
  'question-asked': (state, { body }, mark) => { state.questions.push({ entry: mark.entry, ...body, mark, answer: null }) },
  'question-answered': (state, { body }, mark) => {
    const question = state.questions.find(known => known.entry === body.question)
    if (question) question.answer = { words: body.words, mark }
  },
  'submitted': (state, { body }, mark) => {
    state.submitted = { drawing: body.drawing, words: body.words, mark }
    addOnce(state.submitters, mark.by)
    state.phase = 'submitted'
  },
  'review-begun': (state, _entry, mark) => { state.reviewed = mark },
  'returned': (state, { body }, mark) => { state.returned.push({ reason: body.reason, mark }); state.phase = 'settle' },
  'sealed': (state, { body }, mark) => {
    state.sealed = { drawing: body.drawing, size: body.size, root: body.root, words: body.words, mark }
    state.phase = 'sealed'
  },
}

/** What an accepted entry does, whatever its kind. */
export function applyAccepted(state: OutageState, entry: AnyEntry, mark: Mark): void {
  const effect = EFFECTS[entry.kind] as Effect<EntryKind>
  effect(state, entry, mark)
}

/**
 * What a questioned entry still does: a point that it says is in hand counts as in hand, a
 * temperature or pressure that it carries is kept and judged. It moves no phase and lowers no count.
 */
export function applyQuestioned(state: OutageState, stored: StoredEntry, mark: Mark): void {
  const entry: AnyEntry = stored.entry
  const tag = 'tag' in entry.body && typeof entry.body.tag === 'string' ? entry.body.tag : null
  state.questioned.push({ entry: entry.id, seq: stored.seq, kind: entry.kind, why: stored.why, tag, settled: null })
  if (entry.kind === 'point-in-hand') {
    const point = state.points[entry.body.tag]
    if (point && point.status !== 'hand') point.questionedHand = entry.id
  }
  if (entry.kind === 'reading-taken') addReading(state, entry, mark, true)
  if (entry.kind === 'pressure-read') addPressure(state, entry.body, mark, true)
}

/** Another questioned entry, not dealt with, that says the point is in hand and that nobody has looked at since. */
function otherClaim(state: OutageState, point: PointState): string | null {
  const seen = Math.max(point.mark?.seq ?? 0, point.tried?.mark.seq ?? 0)
  return state.questioned.find(item => item.kind === 'point-in-hand' && item.tag === point.tag && item.settled === null && item.seq > seen)?.entry ?? null
}

function addReading(state: OutageState, entry: Entry<'reading-taken'>, mark: Mark, questioned: boolean): void {
  const { caseId, round, value, unit, method, instrumentId, words } = entry.body
  state.cases[caseId]?.readings.push({ entry: entry.id, seq: mark.seq, round, at: happenedAt(entry), value, unit, method, instrumentId, by: entry.by, questioned, correctedBy: null, struck: false, words })
}

function addPressure(state: OutageState, body: Entry<'pressure-read'>['body'], mark: Mark, questioned: boolean): void {
  const { round, suctionGroupId, suctionPsig, dischargePsig } = body
  state.pressures.push({ round, at: mark.at, suctionGroupId, suctionPsig, dischargePsig, by: mark.by, seq: mark.seq, questioned })
}

function setPlan(state: OutageState, plan: Plan, mark: Mark): void {
  state.plan = plan
  addOnce(state.authors, mark.by)
  for (const item of plan.cases) {
    const known = state.cases[item.id]
    if (known) known.touched = item.touched
  }
}

/** Control is gone: what the controller had proven holds no more, and its checks must be signed afresh. */
function beginDark(state: OutageState, from: number, how: 'gate' | 'fact', words: string, breach: string[], mark: Mark): void {
  state.darks.push({ from, to: null, how, words, breach, mark })
  state.phase = 'dark'
  state.backAt = null
  state.handBackClosed = null
  for (const check of BACK_CHECKS) Reflect.deleteProperty(state.checks, check.id)
  for (const point of Object.values(state.points)) if (point.status === 'returned' || point.status === 'proven') { point.status = 'auto'; point.proof = null }
}

/** The open act is one that the verdict itself asked for. */
function asksByVerdict(item: CaseState): boolean {
  const cause = openingOf(item)?.cause
  return cause === 'act' || cause === 'discard'
}

function addOnce(list: string[], value: string): void {
  if (!list.includes(value)) list.push(value)
}

function newPoint(tag: string, kind: PointState['kind']): PointState {
  return { tag, kind, status: 'auto', hand: null, seen: null, value: null, until: null, owner: null, reason: '', words: '', photos: [], mark: null, tried: null, stoppedAt: null, questionedHand: null, excuse: null, exception: null, proof: null }
}

function newCase(id: string): CaseState {
  return { id, touched: false, readings: [], verdict: null, openAct: null, openings: [], acts: [], decidedOtherwise: null, acceptedWarm: false, empty: false }
}
