import type { BodyOf } from './kinds'
import type { Mark, OfferState, OutageState } from './state'

/** Work is offered: nothing passes yet. */
export function offerHands(state: OutageState, body: BodyOf<'hands-offered'>, mark: Mark): void {
  state.named[body.to] = body.toName
  state.offers.push({ entry: mark.entry, from: mark.by, to: body.to, toName: body.toName, open: body.open, words: body.words, mark, end: null })
}

/** An offer that ended: until it was taken, whoever made it remained responsible. */
export function answerHands(state: OutageState, offer: string, what: NonNullable<OfferState['end']>['what'], words: string, mark: Mark): void {
  const open = state.offers.find(item => item.entry === offer)
  if (open) open.end = { what, words, mark }
}

/** Work is taken: the outage, where the leaving one held it, and each override of theirs pass to the incoming one (I6). */
export function takeHands(state: OutageState, body: BodyOf<'hands-taken'>, mark: Mark): void {
  const held = state.holder?.person === body.from
  for (const point of Object.values(state.points)) {
    if (point.owner === body.from) point.owner = mark.by
    else if (held && point.owner === null && point.questionedHand !== null) point.owner = mark.by
  }
  if (held) state.holder = { person: mark.by, mark }
  // Whatever the leaving one had offered to others is out of their hands now.
  for (const offer of state.offers) if (offer.end === null && (offer.entry === body.offer || offer.from === body.from)) offer.end = { what: 'taken', words: body.words, mark }
  state.taken.push({ from: body.from, by: mark.by, offer: body.offer, looked: body.looked, words: body.words, mark })
}
