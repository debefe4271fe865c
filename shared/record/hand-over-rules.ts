/** What the change of hands between two people must fit. */
import type { Entry } from './entry'
import { answerable, openOffers, unlooked } from './hands'
import { nameOf } from './select'
import type { OutageState } from './state'

/** An offer is made by somebody who answers for something here, to another, once at a time. */
export function offerUnfit(state: OutageState, { by, body }: Entry<'hands-offered'>): string[] {
  const missing = answerable(state).includes(by) ? [] : ['nothing here is in your hands']
  if (body.to === by) missing.push('work passes between two people')
  if (openOffers(state).some(offer => offer.from === by)) missing.push('an offer of yours is open already')
  return missing
}

/** The incoming one signs what was offered to them, having looked at each open thing. Without an offer a supervisor says why. */
export function takenUnfit(state: OutageState, { by, body }: Entry<'hands-taken'>): string[] {
  const missing = answerable(state).includes(body.from) ? [] : [`nothing here is in the hands of ${nameOf(state, body.from)}`]
  if (body.from === by) missing.push('it is in your hands already')
  if (body.offer === null) {
    if (body.words === '') missing.push('say why it is taken over without an offer')
  } else {
    const offer = openOffers(state).find(item => item.entry === body.offer)
    if (!offer) missing.push('no such offer is open')
    else if (offer.to !== by) missing.push(`it was offered to ${offer.toName}`)
    else if (offer.from !== body.from) missing.push(`it was offered by ${nameOf(state, offer.from)}`)
  }
  return [...missing, ...unlooked(state, body.from, body.looked)]
}
