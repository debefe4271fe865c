import type { MailText } from '../utils/mail/write'
import { writeLetter } from './letter'
import type { AboutOutage } from './outage'
import { FOR_ACCOUNTS, outageFacts } from './outage'

/**
 * One or more alerts of an outage that came within a minute.
 * @param lines each says site, what, until when and what to do
 */
export function alertLetter(about: AboutOutage, lines: readonly string[]): MailText {
  const [first = '', ...others] = lines
  return writeLetter({
    subject: first,
    first,
    parts: [
      { head: 'At the same time', list: others },
      { facts: outageFacts(about) },
      { press: 'See it, and say that you have', url: about.url },
    ],
    foot: FOR_ACCOUNTS,
  })
}
