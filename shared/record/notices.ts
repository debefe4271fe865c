/** Notices to people without an account: when control is away, in whose words, and what is known of their reading. */
import { siteClock } from './act-words'
import type { NoticeParty, NoticeSubject } from './kinds/server'
import type { Plan } from './plan'
import { caseName, nameOf, openDark } from './select'
import type { ActState, NoticeState, OutageState } from './state'

const MINUTE = 60_000
/** An end that is told to people is a whole five minutes. */
const STEP_MINUTES = 5

export const PARTY_WORDS: Record<NoticeParty, string> = { shop: 'Shop', monitoring: 'Monitoring centre' }
export const NOTICE_WORDS: Record<NoticeSubject, string> = {
  'control-away': 'control is away',
  'called-off': 'called off',
  'control-back': 'control is back',
  'product': 'product moved or discarded',
}

/** What the staff of a shop must do while control is away. Page words of the trade; common practice, no source. */
export const STAFF_MUST: readonly string[] = [
  'Keep the doors of cases and cold rooms shut.',
  'Draw the night covers and leave them down.',
  'Do not restock until Holdover writes that control is back.',
]

/**
 * When an outage begins and by when it is over, as its shop and its monitoring centre are told.
 * The end is the mean of all steps, lengthened by what the time without control may take 19 times in 20, in whole
 * five minutes. Common practice, no source.
 * @param begins Unix ms; for a planned outage when points begin to go in hand, else when control was lost
 * @returns Unix ms; `until` null where no step was planned
 */
export function noticeWindow({ duration }: Pick<Plan, 'duration'>, begins: number): { from: number, until: number | null } {
  const minutes = duration.totalMean + Math.max(0, duration.dark19in20 - duration.darkMean)
  return { from: begins, until: minutes > 0 ? begins + Math.ceil(minutes / STEP_MINUTES) * STEP_MINUTES * MINUTE : null }
}

/** The window of an outage as it stands: from the loss of control that is open, else as planned; null while no time is set. */
export function windowOf(state: OutageState): { from: number, until: number | null } | null {
  const dark = openDark(state)
  if (dark && !state.approved) return noticeWindow(state.plan, dark.from)
  return state.plan.startsAt === null ? (dark ? noticeWindow(state.plan, dark.from) : null) : noticeWindow(state.plan, Date.parse(state.plan.startsAt))
}

/** Names of the cases that lose their refrigeration, in the order of the equipment. */
export function awayCases(state: OutageState): string[] {
  return state.snapshot.cases.filter(item => state.cases[item.id]?.touched && !item.runsAlone).map(item => item.name)
}

/** Product that was moved or discarded: what the shop's contact is told. */
export interface ProductNotice { what: 'moved' | 'discarded', entry: string, name: string, product: string, quantity: number | null, unit: string, place: string, takenBy: string, at: number, by: string }

/** Every signed move and discard of an outage, in the order of the log. @param entries ids, to choose some of them */
export function productNotices(state: OutageState, entries: ReadonlySet<string> | null = null): ProductNotice[] {
  const isTold = (act: ActState) => (act.act === 'moved' || act.act === 'discarded') && (entries === null || entries.has(act.mark.entry))
  return Object.values(state.cases)
    .flatMap(item => item.acts.filter(isTold).map(act => ({ item, act })))
    .sort((a, b) => a.act.mark.seq - b.act.mark.seq)
    .map(({ item, act: { act, product, quantity, unit, place, takenBy, mark } }) => ({
      what: act as 'moved' | 'discarded', entry: mark.entry, name: caseName(state, item.id), product, quantity, unit, place, takenBy, at: mark.at, by: nameOf(state, mark.by),
    }))
}

/** Notices to one party that control is away, the latest last. */
export function awayNotices(state: OutageState, party: NoticeParty): NoticeState[] {
  return state.notices.filter(item => item.party === party && item.subject === 'control-away')
}

/** "Written to Maud Finch at 01:10, read by Maud Finch at 01:15", for the check beside it; times at the site. */
export function noticeLine(state: OutageState, { name, to, sentAt, acknowledged }: NoticeState): string {
  const written = sentAt === null ? '' : `Written to ${name || to} at ${siteClock(state, sentAt)}`
  const read = acknowledged ? `read by ${acknowledged.name} at ${siteClock(state, acknowledged.at)}` : sentAt === null ? '' : 'not yet acknowledged'
  const line = [written, read].filter(Boolean).join(', ')
  return line.charAt(0).toUpperCase() + line.slice(1)
}
