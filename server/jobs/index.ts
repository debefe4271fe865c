import { alertNowJob, alertsJob } from './alerts'
import type { AnyJob } from './job'
import { expireExportsJob, makeExportsJob } from './make-exports'
import { makeFactsJob } from './make-facts'
import { removeFilesJob } from './remove-files'
import { sendMailsJob } from './send-mails'

/** Every job there is. */
export const JOBS: readonly AnyJob[] = [
  alertNowJob,
  alertsJob,
  expireExportsJob,
  makeExportsJob,
  makeFactsJob,
  removeFilesJob,
  sendMailsJob,
]
