import { measureWords } from '../../../shared/record/measures'
import type { NoticeParty, NoticeSubject } from '../../../shared/record/kinds/server'
import type { ProductNotice } from '../../../shared/record/notices'
import { awayCases } from '../../../shared/record/notices'
import { nameOf } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import { uuidv7 } from '../../../shared/record/uuid'
import type { MailKind } from '../../../shared/schemas/mails'
import type { Window } from '../../emails/notices'
import { calledOff, controlBack, noticeToMonitoring, noticeToShop, productNotice } from '../../emails/notices'
import type { AboutOutage } from '../../emails/outage'
import type { Draft } from '../record/draft'
import { linkTo, placeOf } from './places'
import { contactsOf } from './recipients'
import type { MailText } from './write'
import { writeMail } from './write'

const HOUR = 3_600_000
/** A notice can be acknowledged until so long after the work is over, and after a loss that nobody planned for so long in all. */
const AFTER_HOURS = 24
const UNPLANNED_HOURS = 72

/** What every letter says of an outage. */
export function aboutOutage(state: OutageState): AboutOutage {
  const { site, controller } = state.snapshot
  return { site: site.name, controller: controller.name, code: state.code, work: state.plan.workKind.name, planned: state.planned, zone: site.timeZone, url: placeOf(`/outages/${state.id}`) }
}

interface Contact { party: NoticeParty, name: string, to: string }

/** Whom to tell without an account; parties without an address are left out. */
async function contacts({ db, state }: Draft): Promise<Contact[]> {
  const { contactName, contactEmail, monitoringEmail } = await contactsOf(db, state.snapshot.site.id)
  const all: Contact[] = [{ party: 'shop', name: contactName, to: contactEmail }, { party: 'monitoring', name: '', to: monitoringEmail }]
  return all.filter(contact => contact.to !== '')
}

async function writeNotice({ db, state, now }: Draft, kind: MailKind, cause: string, { party, name, to }: Contact, subject: NoticeSubject, text: MailText, id = uuidv7(now)): Promise<void> {
  await writeMail(db, { ...text, id, kind, key: `${cause} ${subject} ${party}`, to, outageId: state.id, notice: { party, subject, name } }, now)
}

/**
 * Tells shop and monitoring centre that control is, or will be, away, each with a link to say that it was read.
 * @param cause id of the entry that it comes from
 */
export async function tellAway(draft: Draft, cause: string, window: Window, planned: boolean): Promise<void> {
  const { state, now } = draft
  const about = { ...aboutOutage(state), planned }
  const by = nameOf(state, state.holder?.person ?? state.opened?.by ?? '')
  const until = planned ? (window.until ?? window.from + UNPLANNED_HOURS * HOUR) + AFTER_HOURS * HOUR : window.from + UNPLANNED_HOURS * HOUR
  for (const contact of await contacts(draft)) {
    const id = uuidv7(now)
    const link = linkTo('notice', { says: [state.id, id, contact.party], until })
    const text = contact.party === 'shop'
      ? noticeToShop(about, { window, cases: awayCases(state), measures: state.plan.measures.map(item => measureWords(item, state.snapshot.cases)), by, cause: state.cause, link })
      : noticeToMonitoring(about, { window, by, link })
    await writeNotice(draft, contact.party === 'shop' ? 'notice-shop' : 'notice-monitoring', cause, contact, 'control-away', text, id)
  }
}

/** What was announced does not happen. @param at Unix ms */
export async function tellCalledOff(draft: Draft, cause: string, at: number, reason: string): Promise<void> {
  const text = calledOff(aboutOutage(draft.state), { at, reason })
  for (const contact of await contacts(draft)) await writeNotice(draft, 'called-off', cause, contact, 'called-off', text)
}

/** Control is back. @param from when it was lost, Unix ms. @param at when it came back, Unix ms */
export async function tellBack(draft: Draft, cause: string, from: number, at: number): Promise<void> {
  for (const contact of await contacts(draft)) {
    await writeNotice(draft, 'control-back', cause, contact, 'control-back', controlBack(aboutOutage(draft.state), { party: contact.party, from, at }))
  }
}

/** The shop is told what product was moved, and what is to be discarded. */
export async function tellProduct(draft: Draft, items: readonly ProductNotice[]): Promise<void> {
  const shop = (await contacts(draft)).find(contact => contact.party === 'shop')
  if (shop) await writeNotice(draft, 'discard', items[0]!.entry, shop, 'product', productNotice(aboutOutage(draft.state), { items }))
}
