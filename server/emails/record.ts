import { countWords } from '../../shared/charts/words'
import type { MailText } from '../utils/mail/write'
import { writeLetter } from './letter'
import type { AboutOutage } from './outage'
import { FOR_ACCOUNTS, forContacts, outageFacts } from './outage'
import { momentWords } from './when'

/**
 * The record was countersigned: whoever keeps this letter can show later that the record is the one that was sealed.
 * @param verifyUrl page that checks a record without an account
 * @param account whether it goes to somebody with an account
 */
export function recordSealed(about: AboutOutage, { by, at, size, root, verifyUrl, account }: { by: string, at: number, size: number, root: string, verifyUrl: string, account: boolean }): MailText {
  return writeLetter({
    subject: `${about.site}: record ${about.code ?? ''} sealed`,
    first: `${about.site}: ${by} sealed the record ${about.code ?? ''} on ${momentWords(at, about.zone)}. Keep this letter: its root shows that nothing was changed since.`,
    parts: [
      { facts: [...outageFacts(about), ['Entries before the seal', countWords(size, 'entry', 'entries')], ['Root', root]] },
      { say: 'To check a copy of the record, open the page below with the file and give the root above.' },
      ...account ? [{ press: 'Open the record', url: about.url }] : [],
      { press: 'Verify a record', url: verifyUrl },
    ],
    foot: account ? FOR_ACCOUNTS : forContacts(about.site),
  })
}
