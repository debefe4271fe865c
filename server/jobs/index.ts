import type { AnyJob } from './job'
import { lookAgainJob } from './look-again'
import { sendMailsJob } from './send-mails'

/** Every job there is. */
export const JOBS: readonly AnyJob[] = [
  lookAgainJob,
  sendMailsJob,
]
