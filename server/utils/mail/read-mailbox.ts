import PostalMime from 'postal-mime'
import type { MailboxItem, MailboxMessage } from '../../../shared/schemas/mails'
import { mailboxMessage, mailboxNames } from './mailbox'

/** Messages that the list shows at most. */
const LISTED = 200

/** The newest messages. @param directory as `mailboxDirectory` gives it */
export async function listMailbox(directory: string): Promise<MailboxItem[]> {
  const names = (await mailboxNames(directory)).slice(0, LISTED)
  const read = await Promise.all(names.map(name => readMailbox(directory, name)))
  return read.filter(item => item !== null).map(({ name, at, to, from, subject }) => ({ name, at, to, from, subject })).sort((a, b) => b.at.localeCompare(a.at) || b.name.localeCompare(a.name))
}

/** One message, read; null: there is none of that name. */
export async function readMailbox(directory: string, name: string): Promise<MailboxMessage | null> {
  const bytes = await mailboxMessage(directory, name)
  if (!bytes) return null
  const { date, to, from, subject, text, html } = await PostalMime.parse(bytes)
  const at = date ? new Date(date) : null
  return {
    name,
    at: at && !Number.isNaN(at.getTime()) ? at.toISOString() : new Date(Number(name.slice(0, 13))).toISOString(),
    to: to?.map(item => item.address ?? item.name).join(', ') ?? '',
    from: from?.address ?? '',
    subject: subject ?? '',
    text: text ?? '',
    html: html ?? '',
  }
}
