import { enterSentNotices } from '../utils/mail/enter-sent'
import { receiver, sendDueMails } from '../utils/mail/send'
import { mailFrom, smtpUrl } from '../utils/mail/settings'
import { SEND_MAILS } from '../utils/mail/write'
import type { Job } from './job'

/** Sends mails: at once when one was written, and again those that failed. Then the records learn what was sent. */
export const sendMailsJob: Job = {
  name: SEND_MAILS,
  every: 10,
  // Each mail is locked by its row.
  together: true,
  async run(db, now) {
    const url = smtpUrl()
    if (!url) return
    const { handIn, close } = receiver(url, mailFrom())
    try {
      await sendDueMails(db, handIn, now)
    } finally {
      close()
    }
    await enterSentNotices(db, now)
  },
}
