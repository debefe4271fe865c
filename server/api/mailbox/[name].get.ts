import { z } from 'zod'
import { requireRole } from '~~/server/utils/access'
import { notFound } from '~~/server/utils/errors'
import { mailboxDirectory } from '~~/server/utils/mail/mailbox'
import { readMailbox } from '~~/server/utils/mail/read-mailbox'
import { isDemoMail } from '~~/server/utils/mail/settings'
import { readParamsAs } from '~~/server/utils/parse'

/** One message of the demo's mailbox. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  const { name } = readParamsAs(event, z.object({ name: z.string().max(60) }), 'message')
  return (isDemoMail() ? await readMailbox(mailboxDirectory(useRuntimeConfig().dataDir), name) : null) ?? notFound('message')
})
