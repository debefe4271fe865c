import { requireRole } from '~~/server/utils/access'
import { notFound } from '~~/server/utils/errors'
import { mailboxDirectory } from '~~/server/utils/mail/mailbox'
import { listMailbox } from '~~/server/utils/mail/read-mailbox'
import { isDemoMail } from '~~/server/utils/mail/settings'

/** What the demo's mailbox received, the latest first; for administrators, and only there. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return isDemoMail() ? { items: await listMailbox(mailboxDirectory(useRuntimeConfig().dataDir)) } : notFound('mailbox')
})
