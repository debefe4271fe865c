import type { MailSettings } from '~~/shared/schemas/mails'
import { requireRole } from '~~/server/utils/access'
import { isDemoMail, isMailOn, mailFrom } from '~~/server/utils/mail/settings'

/** How mail goes out here; for administrators. */
export default defineEventHandler((event): MailSettings => {
  requireRole(event, 'administrator')
  return { on: isMailOn(), demo: isDemoMail(), from: mailFrom() }
})
