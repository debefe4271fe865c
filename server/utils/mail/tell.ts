import type { AnyEntry, Entry } from '../../../shared/record/entry'
import { correctedTime, happenedAt } from '../../../shared/record/entry'
import type { EntryKind } from '../../../shared/record/kinds'
import { asNewest } from '../../../shared/record/newest'
import { noticeWindow, productNotices, windowOf } from '../../../shared/record/notices'
import { nameOf, openDark } from '../../../shared/record/select'
import { planApproved, planReturned, planWaiting } from '../../emails/plans'
import { recordSealed } from '../../emails/record'
import type { Draft } from '../record/draft'
import { contactsOf, peopleBy, supervisorsOf } from './recipients'
import { isMailOn } from './settings'
import { aboutOutage, tellAway, tellBack, tellCalledOff, tellProduct } from './tell-contacts'
import { placeOf } from './places'
import { writeMail } from './write'

type Teller<K extends EntryKind> = (draft: Draft, entry: Entry<K>) => Promise<void>

/** Which entries are told by mail, and to whom. */
const TELL: { [K in EntryKind]?: Teller<K> } = {
  'plan-submitted': async ({ db, state, now }, entry) => {
    const window = windowOf(state)
    const to = (await supervisorsOf(db, state.snapshot.site.id)).filter(person => !state.authors.includes(person.id))
    const text = planWaiting(aboutOutage(state), { by: nameOf(state, entry.by), begins: window?.from ?? null, until: window?.until ?? null, note: entry.body.note })
    for (const { id, email } of to) await writeMail(db, { ...text, kind: 'plan-waiting', key: `${entry.id} ${email}`, to: email, personId: id, outageId: state.id }, now)
  },
  'plan-approved': async (draft, entry) => {
    const { db, state, now } = draft
    const begins = windowOf(state)?.from ?? null
    const text = planApproved(aboutOutage(state), { by: nameOf(state, entry.by), begins, note: entry.body.note })
    for (const { id, email } of await peopleBy(db, state.authors)) await writeMail(db, { ...text, kind: 'plan-approved', key: `${entry.id} ${email}`, to: email, personId: id, outageId: state.id }, now)
    await tellAway(draft, entry.id, noticeWindow(state.plan, begins ?? now), true)
  },
  'plan-returned': async ({ db, state, now }, entry) => {
    const text = planReturned(aboutOutage(state), { by: nameOf(state, entry.by), begins: windowOf(state)?.from ?? null, reason: entry.body.reason })
    for (const { id, email } of await peopleBy(db, state.authors)) await writeMail(db, { ...text, kind: 'plan-returned', key: `${entry.id} ${email}`, to: email, personId: id, outageId: state.id }, now)
  },
  'outage-opened': async (draft, entry) => {
    if (!entry.body.planned) await tellLost(draft, entry.id)
  },
  // Of a plan that was approved they know already; of a second loss they do not.
  'control-lost': async (draft, entry) => {
    if (draft.state.approved === null || draft.state.darks.length > 1) await tellLost(draft, entry.id)
  },
  'called-off': async (draft, entry) => {
    if (draft.state.approved) await tellCalledOff(draft, entry.id, happenedAt(entry), entry.body.reason)
  },
  'control-back': async (draft, entry) => {
    const at = correctedTime(entry, entry.body.backAt)
    const dark = draft.state.darks.find(item => item.to === at)
    if (dark) await tellBack(draft, entry.id, dark.from, at)
  },
  'sealed': async ({ db, state, now }, entry) => {
    const { contactEmail } = await contactsOf(db, state.snapshot.site.id)
    const facts = { by: nameOf(state, entry.by), at: happenedAt(entry), size: entry.body.size, root: entry.body.root, verifyUrl: placeOf('/verify') }
    const mail = { kind: 'sealed' as const, outageId: state.id }
    const about = { ...aboutOutage(state), url: placeOf(`/records/${state.id}`) }
    for (const { id, email } of await peopleBy(db, [entry.by, ...state.authors, ...state.submitters])) {
      await writeMail(db, { ...recordSealed(about, { ...facts, account: true }), ...mail, key: `${entry.id} ${email}`, to: email, personId: id }, now)
    }
    await writeMail(db, { ...recordSealed(about, { ...facts, account: false }), ...mail, key: `${entry.id} shop`, to: contactEmail }, now)
  },
}

/** A loss that nobody announced; one that is over by the time that it is known is not told as if it were now. */
async function tellLost(draft: Draft, cause: string): Promise<void> {
  const dark = openDark(draft.state)
  if (dark) await tellAway(draft, cause, noticeWindow(draft.state.plan, dark.from), false)
}

/** Writes the mails that the entries which a draft adds call for; called before they are stored, in their transaction. */
export async function tellByMail(draft: Draft): Promise<void> {
  if (!isMailOn()) return
  const added = draft.rows.filter(row => row.standing === 'accepted' && (row.kind in TELL || row.kind === 'act-signed'))
  if (added.length === 0) return
  const entries = added.map(row => asNewest(JSON.parse(row.signed) as AnyEntry))
  for (const entry of entries) await (TELL[entry.kind] as Teller<EntryKind> | undefined)?.(draft, entry)
  // What was moved and discarded together is told together.
  const products = productNotices(draft.state, new Set(entries.filter(entry => entry.kind === 'act-signed').map(entry => entry.id)))
  if (products.length > 0) await tellProduct(draft, products)
}
