import { clockWords } from '../charts/words'
import { handWords } from '../schemas/point-kinds'
import { pressureWords } from '../utils/pressure'
import { checkById } from './checks'
import { CAUSE_WORDS, siteClock } from './act-words'
import { alertTitle, toldWords } from './alerts'
import type { AnyEntry, Entry } from './entry'
import { correctedTime, isoTime } from './entry'
import type { EntryKind } from './kinds'
import { ALERT_WORDS } from './kinds/alerts'
import type { OpenMatter } from './kinds/hands'
import { asNewest } from './newest'
import { acceptedWords } from './margin'
import { ACT_WORDS } from './kinds/rounds'
import { VERDICT_WORDS } from './kinds/server'
import { NOTICE_WORDS, PARTY_WORDS } from './notices'
import { caseName, groupName, instrumentName, nameOf, pointName, SEEN_WORDS } from './select'
import type { OutageState } from './state'
import { spokenWords } from './voice'

/** An entry told in words: what was done, and what was seen. */
export interface Told { did: string, seen: string }

const tell = (did: string, seen = ''): Told => ({ did, seen })
const join = (...parts: (string | null | undefined | false)[]) => parts.filter(Boolean).join(' · ')
const point = (state: OutageState, tag: string) => `${tag} ${pointName(state, tag)}`.trim()
const AUTO_WORDS = { 'answers': 'seen to answer', 'not-called': 'not called for: proof due', 'no-answer': 'does not answer: proof due' }

const offeredTo = (state: OutageState, offer: string) => state.offers.find(item => item.entry === offer)?.toName ?? 'somebody'
const offeredBy = (state: OutageState, offer: string) => {
  const from = state.offers.find(item => item.entry === offer)?.from
  return from ? nameOf(state, from) : 'somebody'
}
const lookedAt = (state: OutageState, { what, about }: { what: OpenMatter, about: string }) => what === 'in-hand' || what === 'proof-due' ? about : state.cases[about] ? caseName(state, about) : 'another matter'
const voiceOf = (state: OutageState, decision: string) => {
  const voice = state.voices.find(item => item.entry === decision)
  return voice ? `: ${voice.supervisorName} ${spokenWords(state, voice.decision)}` : ''
}

const deniedBy = (state: OutageState, decision: string) => {
  const answer = state.voices.find(item => item.entry === decision)?.answer
  return answer?.what === 'denied' && `struck: denied by ${nameOf(state, answer.mark.by)}`
}

/** Every kind in words: one way to say a thing on screens, in the PDF and in the CSV. */
const TOLD: { [K in EntryKind]: (state: OutageState, entry: Entry<K>) => Told } = {
  'signer-named': (_state, { body }) => tell(`Signer named: ${body.name}, ${body.role}`, `key on ${body.deviceName}`),
  'outage-numbered': (_state, { body }) => tell(`Numbered ${body.code}`),
  'verdict-changed': (state, { body }) => tell(`${caseName(state, body.caseId)} is ${VERDICT_WORDS[body.verdict]}`, join(body.clause, body.minutesAbove > 0 && `${Math.round(body.minutesAbove)} min above`)),
  'plant-warned': (_state, { body }) => tell(body.over ? 'Plant warning is over' : 'Plant warning', join(body.words, body.act)),
  'notice-sent': (_state, { body }) => tell(`${PARTY_WORDS[body.party]} written to: ${NOTICE_WORDS[body.subject]}`, join(body.name, body.to)),
  'notice-acknowledged': (_state, { body }) => tell(`${PARTY_WORDS[body.party]} has read the notice`, body.name),
  'entry-refused': (_state, { body }) => tell('An entry was refused', body.reason),
  'alert-raised': (_state, { body }) => tell(`Alert: ${ALERT_WORDS[body.alert].toLowerCase()}`, join(body.words, toldWords(body.to))),
  'alert-passed-on': (state, { body }) => tell(`Alert passed on: ${alertTitle(state, body.key)}`, join('not acknowledged', toldWords(body.to))),
  'alert-acknowledged': (state, { body }) => tell(`Alert acknowledged: ${alertTitle(state, body.key)}`, `by ${body.name}`),
  'alert-over': (state, { body }) => tell(`Alert is over: ${alertTitle(state, body.key)}`),
  'outage-opened': (_state, { body }) => tell(body.planned ? `Outage opened: ${body.plan.workKind.name}` : 'Unplanned outage opened', join(body.cause, `${body.snapshot.points.length} points, ${body.snapshot.cases.length} cases`)),
  'plan-changed': (_state, { body }) => tell('Plan changed', join(body.note, `${body.plan.points.length} points`)),
  'plan-submitted': (_state, { body }) => tell('Plan sent for approval', body.note),
  'plan-approved': (_state, { body }) => tell('Plan approved', body.note),
  'margin-accepted': (_state, { body }) => tell(`Accepted: ${acceptedWords(body)}`, body.reason),
  'plan-returned': (_state, { body }) => tell('Plan returned', body.reason),
  'in-hand-begun': () => tell('Putting points in hand begun'),
  'called-off': (_state, { body }) => tell('Called off', body.reason),
  'check-signed': (_state, { body }) => tell(checkById(body.check).ask, join(body.outcome === 'needless' && 'not needed', body.words)),
  'point-in-hand': (state, { body }) => tell(`${point(state, body.tag)}, put ${handWords(body.hand)} by hand`, join(SEEN_WORDS[body.seen].toLowerCase(), body.value && `${body.value.number} ${body.value.unit}`, body.reason, body.words)),
  'point-excused': (state, { body }) => tell(`${point(state, body.tag)}, excused`, join(body.reason, body.measure)),
  'point-in-auto': (state, { body }) => tell(`${point(state, body.tag)}, back in auto`, join(AUTO_WORDS[body.seen], body.words)),
  'point-proven': (state, { body }) => tell(`${point(state, body.tag)}, proven`, body.words),
  'left-in-exception': (_state, { body }) => tell(`Left by exception: ${body.points.map(left => left.tag).join(', ')}`, body.points.map(left => `${left.owner}: ${left.reason}`).join('; ')),
  'hands-offered': (_state, { body }) => tell(`Work offered to ${body.toName}`, join(body.open.length === 0 ? 'nothing open' : `${body.open.length} open: ${body.open.map(item => item.words).join('; ')}`, body.words)),
  'hands-withdrawn': (state, { body }) => tell(`Offer to ${offeredTo(state, body.offer)} withdrawn`, body.reason),
  'hands-refused': (state, { body }) => tell(`Offer of ${offeredBy(state, body.offer)} refused`, body.reason),
  'hands-taken': (state, { body }) => tell(`Work taken over from ${nameOf(state, body.from)}${body.offer === null ? ', without an offer' : ''}`, join(`${body.looked.length} looked at`, ...body.looked.filter(item => item.found !== '').map(item => `${lookedAt(state, item)}: ${item.found}`), body.words)),
  'voice-decision': (state, { id, body }) => tell(`By voice: ${body.supervisorName} ${spokenWords(state, body.decision)}`, join(`given ${body.givenAt.slice(0, 16).replace('T', ' ')} UTC`, `“${body.words}”`, deniedBy(state, id))),
  'voice-confirmed': (state, { body }) => tell(`Decision by voice signed${voiceOf(state, body.decision)}`, body.words),
  'voice-denied': (state, { body }) => tell(`Decision by voice denied${voiceOf(state, body.decision)}`, body.reason),
  'hand-back-closed': (_state, { body }) => tell('Hand back closed', body.words),
  'defrost-watched': (state, { body }) => tell(`Defrost watched: ${state.snapshot.circuits.find(circuit => circuit.id === body.circuitId)?.name ?? ''}`, body.words),
  'reading-taken': (state, { body }) => tell(`${caseName(state, body.caseId)}, round ${body.round}`, join(`${body.value.toFixed(1)} °${body.unit}`, body.method !== 'product' && body.method, body.words)),
  'pressure-read': (state, { body }) => tell(`${groupName(state, body.suctionGroupId)}, round ${body.round}`, join(`suction ${pressureWords(body.suctionPsig, state.snapshot.site.pressureUnit)}`, body.dischargePsig !== null && `discharge ${pressureWords(body.dischargePsig, state.snapshot.site.pressureUnit)}`, body.words)),
  'act-opened': (state, { body }) => tell(`${caseName(state, body.caseId)}: an act is needed`, CAUSE_WORDS[body.cause]),
  'act-lapsed': (state, { body }) => tell(`${caseName(state, body.caseId)}: no act is needed any more`, body.holdMinutes === null ? 'it stays within its limit' : `holds ${Math.floor(body.holdMinutes)} min`),
  'act-signed': (state, entry) => {
    const { caseId, act, product, quantity, unit, place, coolBy, takenBy, left, words } = entry.body
    const did = coolBy === null ? ACT_WORDS[act].toLowerCase() : `to be cooled by ${siteClock(state, correctedTime(entry, coolBy))}`
    return tell(`${caseName(state, caseId)}: ${did}`, join(product, quantity !== null && `${quantity} ${unit}`.trim(), place, takenBy && `taken by ${takenBy}`, left && 'product is left in the case', words))
  },
  'decided-otherwise': (state, { body }) => tell(`${caseName(state, body.caseId)}: decided otherwise`, join(body.clause, body.reason)),
  'instrument-checked': (state, { body }) => tell(`${instrumentName(state, body.instrumentId)} checked in ice and water`, join(`${body.value.toFixed(1)} °${body.unit}`, body.within ? 'reads the ice point' : 'out of tolerance', body.words)),
  'went-dark': () => tell('Control taken away'),
  'control-lost': (_state, { body }) => tell('Control lost', body.words),
  'step-ticked': (state, { body }) => tell(`${[...state.plan.steps, ...state.plan.rollBack].find(step => step.id === body.step)?.name ?? body.step}: ${body.state}`, body.words),
  'turn-back-ordered': (_state, { body }) => tell('Turn back ordered', body.reason),
  'turned-back': (_state, { body }) => tell('Turned back', body.reason),
  'control-back': (_state, { body }) => tell('Control is back', body.words),
  'silence-announced': (state, entry) => tell(`No signal until ${clockWords(isoTime(correctedTime(entry, entry.body.until)), state.snapshot.site.timeZone)}`, entry.body.words),
  'note-added': (_state, { body }) => tell('Note', body.words),
  'correction': (_state, { body }) => tell('Correction', join(body.reading === 'struck' ? 'struck' : body.reading && `now ${body.reading.value.toFixed(1)}`, body.reason)),
  'questioned-settled': (_state, { body }) => tell('Questioned entry dealt with', body.words),
  'question-asked': (_state, { body }) => tell('Question', body.words),
  'question-answered': (_state, { body }) => tell('Answer', body.words),
  'submitted': (_state, { body }) => tell('Record submitted', body.words),
  'review-begun': () => tell('Review begun'),
  'returned': (_state, { body }) => tell('Record returned', body.reason),
  'sealed': (_state, { body }) => tell('Record countersigned and sealed', join(`${body.size} entries`, body.words)),
}

/** @param state the folded outage, for names of points, cases and steps */
export function told(state: OutageState, entry: AnyEntry): Told {
  const teller = TOLD[entry.kind] as (state: OutageState, entry: Entry<EntryKind>) => Told
  return teller(state, asNewest(entry))
}
