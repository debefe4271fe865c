import type { MailText } from '../utils/mail/write'
import { writeLetter } from './letter'
import type { AboutOutage } from './outage'
import { FOR_ACCOUNTS, outageFacts } from './outage'
import { momentWords, spanWords } from './when'

/** A plan was sent for approval. Times in Unix ms; `begins` null: at no set time. */
export function planWaiting(about: AboutOutage, { by, begins, until, note }: { by: string, begins: number | null, until: number | null, note: string }): MailText {
  const deadline = begins === null ? 'soon' : `before ${momentWords(begins, about.zone)}`
  return writeLetter({
    subject: `${about.site}: plan waits for approval ${deadline}`,
    first: `${about.site}: the plan for “${about.work}” waits for a supervisor. Approve or return it ${deadline}.`,
    parts: [
      { facts: [...outageFacts(about), ['Planned by', by], ...begins === null ? [] : [['When', spanWords(begins, until, about.zone)] as [string, string]], ...note ? [['Note', note] as [string, string]] : []] },
      { press: 'Read the plan', url: `${about.url}/plan` },
    ],
    foot: FOR_ACCOUNTS,
  })
}

/** A plan was approved: to its author. */
export function planApproved(about: AboutOutage, { by, begins, note }: { by: string, begins: number | null, note: string }): MailText {
  const when = begins === null ? 'Begin when you are ready.' : `Begin on ${momentWords(begins, about.zone)}.`
  return writeLetter({
    subject: `${about.site}: plan approved`,
    first: `${about.site}: ${by} approved the plan for “${about.work}”. ${when}`,
    parts: [{ facts: [...outageFacts(about), ...note ? [['Note', note] as [string, string]] : []] }, { press: 'Open the outage', url: about.url }],
    foot: FOR_ACCOUNTS,
  })
}

/** A plan was returned: to its author. */
export function planReturned(about: AboutOutage, { by, begins, reason }: { by: string, begins: number | null, reason: string }): MailText {
  const until = begins === null ? '' : ` before ${momentWords(begins, about.zone)}`
  return writeLetter({
    subject: `${about.site}: plan returned`,
    first: `${about.site}: ${by} returned the plan for “${about.work}”. Change it and send it again${until}.`,
    parts: [{ facts: [...outageFacts(about), ['Reason', reason]] }, { press: 'Change the plan', url: `${about.url}/plan` }],
    foot: FOR_ACCOUNTS,
  })
}
