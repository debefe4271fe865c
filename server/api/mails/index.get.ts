import { mailListSchema } from '~~/shared/schemas/mails'
import { requireRole } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { listMails } from '~~/server/utils/mail/list'
import { readQueryAs } from '~~/server/utils/parse'

/** Mails that were written, the latest first, a page at a time, with what became of them; for administrators. */
export default defineEventHandler(async (event) => {
  requireRole(event, 'administrator')
  return listMails(useDatabase(), readQueryAs(event, mailListSchema))
})
