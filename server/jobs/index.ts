import { alertNowJob, alertsJob } from './alerts'
import type { AnyJob } from './job'
import { sendMailsJob } from './send-mails'

/** Every job there is. */
export const JOBS: readonly AnyJob[] = [
  alertNowJob,
  alertsJob,
  sendMailsJob,
]
