import { countWords, listWords } from '../charts/words'
import { handWords } from '../schemas/point-kinds'
import type { OpenMatter } from './kinds/hands'
import { LIVE_PHASES } from './phases'
import { caseName, nameOf, pointName, pointsInHand, proofsDue } from './select'
import type { OfferState, OutageState, PointState } from './state'

/** Somebody leaves with the work not taken over: after so long it is pointed out, ms. Common practice, no source. */
export const UNTAKEN_MS = 10 * 60_000

/** Something that is open; `about` is a tag, a case's id or an entry's id, by what it is. */
export interface OpenItem { what: OpenMatter, about: string, words: string }

/** A case that is due by the forecast, which only the engines know. Unix ms. */
export interface LateCase { caseId: string, dueAt: number }

/** Who answers for an outage: its holder first, then everybody who has a point of it in hand. Person ids. */
export function answerable(state: OutageState): string[] {
  const owners = pointsInHand(state).map(point => point.owner).filter((owner): owner is string => owner !== null)
  return [...new Set([...state.holder ? [state.holder.person] : [], ...owners.sort()])]
}

/** Offers that nobody has taken, refused or withdrawn, while there is something to take. */
export function openOffers(state: OutageState): OfferState[] {
  return changesHands(state) ? state.offers.filter(offer => offer.end === null) : []
}

/** Whether an outage is in a phase in which it changes hands by two signatures. */
export function changesHands(state: OutageState): boolean {
  return state.phase === 'approved' || LIVE_PHASES.includes(state.phase)
}

/** Points in hand that a person answers for: the holder for those without an owner too. */
function pointsOf(state: OutageState, person: string): PointState[] {
  const holds = state.holder?.person === person
  return pointsInHand(state).filter(point => point.owner === person || (holds && point.owner === null))
}

/**
 * What is open for somebody who leaves: their points in hand; for the holder also all else of the outage.
 * @param late cases that are overdue by the forecast, worked out by the caller
 */
export function openItems(state: OutageState, person: string, late: readonly LateCase[]): OpenItem[] {
  const points = pointsOf(state, person).map(point => ({ what: 'in-hand' as const, about: point.tag, words: heldWords(state, point) }))
  if (state.holder?.person !== person) return points
  return [
    ...points,
    ...proofsDue(state).map(point => ({ what: 'proof-due' as const, about: point.tag, words: `${named(state, point.tag)}, back in auto, proof due` })),
    ...Object.values(state.cases).filter(item => item.openAct !== null).map(item => ({ what: 'act' as const, about: item.id, words: `${caseName(state, item.id)}, an act is to be signed` })),
    ...late.map(item => ({ what: 'late-reading' as const, about: item.caseId, words: `${caseName(state, item.caseId)}, reading overdue` })),
    ...state.questions.filter(question => question.answer === null).map(question => ({ what: 'question' as const, about: question.entry, words: `Question to answer: ${question.words}`.slice(0, 400) })),
    ...state.questioned.filter(item => item.settled === null).map(item => ({ what: 'questioned' as const, about: item.entry, words: `No. ${item.seq} is questioned: ${item.why.join('; ')}`.slice(0, 400) })),
    ...state.voices.filter(voice => voice.answer === null).map(voice => ({ what: 'voice' as const, about: voice.entry, words: `Decision by voice of ${voice.supervisorName}, not signed yet` })),
  ]
}

function named(state: OutageState, tag: string): string {
  return `${tag} ${pointName(state, tag)}`.trim().slice(0, 300)
}

function heldWords(state: OutageState, point: PointState): string {
  if (point.status === 'hand' && point.hand !== null) return `${named(state, point.tag)}, ${handWords(point.hand)} by hand`
  return point.questionedHand === null ? `${named(state, point.tag)}, tried and not seen as asked` : `${named(state, point.tag)}, in hand by a questioned entry`
}

/** Things open for the leaving one that the incoming one has not looked at. A late reading is no fact of the log, so its tick is not asked. */
export function unlooked(state: OutageState, from: string, looked: readonly { what: OpenMatter, about: string }[]): string[] {
  const seen = new Set(looked.map(item => `${item.what} ${item.about}`))
  const left = openItems(state, from, []).filter(item => !seen.has(`${item.what} ${item.about}`))
  const points = left.filter(item => item.what === 'in-hand' || item.what === 'proof-due').map(item => item.about)
  const others = left.length - points.length
  return [
    ...points.length > 0 ? [`not looked at: ${listWords(points.slice(0, 8))}${points.length > 8 ? ` and ${points.length - 8} more` : ''}`] : [],
    ...others > 0 ? [`${countWords(others, 'other open matter')} not looked at`] : [],
  ]
}

/** Every offer and taking over, in lines of words for whoever reviews the record. */
export function handsLines(state: OutageState): { seq: number, words: string }[] {
  const offers = state.offers.map((offer) => {
    const from = nameOf(state, offer.from)
    const end = offer.end === null ? 'never taken' : `${offer.end.what}${offer.end.what !== 'taken' && offer.end.words !== '' ? `: ${offer.end.words}` : ''}`
    return { seq: offer.mark.seq, words: `${from} offered ${countWords(offer.open.length, 'open matter')} to ${offer.toName}; ${end}` }
  })
  const taken = state.taken.map(item => ({ seq: item.mark.seq, words: `${nameOf(state, item.by)} took over from ${nameOf(state, item.from)}, ${countWords(item.looked.length, 'matter')} looked at${item.offer === null ? `, without an offer: ${item.words}` : ''}` }))
  return [...offers, ...taken].sort((a, b) => a.seq - b.seq)
}

/**
 * Offers that stand open too long while product or points depend on somebody, in words; in dark at once.
 * @param now Unix ms
 */
export function untakenWords(state: OutageState, now: number): string[] {
  return openOffers(state)
    .filter(offer => state.phase === 'dark' || (pointsInHand(state).length > 0 && now - offer.mark.at >= UNTAKEN_MS))
    .map(offer => `${nameOf(state, offer.from)} is leaving and nothing is taken: ${offer.toName} has not signed. ${nameOf(state, offer.from)} remains responsible`)
}
