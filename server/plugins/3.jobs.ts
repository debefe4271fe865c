import { JOBS } from '~~/server/jobs'
import { doesJobs, startWorkers } from '~~/server/jobs/queue'
import { useDatabase } from '~~/server/utils/database'
import { mailboxDirectory, openMailbox } from '~~/server/utils/mail/mailbox'
import { isDemoMail, setDemoPort } from '~~/server/utils/mail/settings'
import { untilReady } from '~~/server/utils/ready'

/** Begins with the jobs once the database is migrated and seeded; the demo's mail has somewhere to go by then. */
export default defineNitroPlugin((nitro) => {
  if (import.meta.prerender) return
  async function begin(): Promise<void> {
    await untilReady()
    if (doesJobs() && isDemoMail()) {
      const { port, close } = await openMailbox(mailboxDirectory(useRuntimeConfig().dataDir))
      setDemoPort(port)
      nitro.hooks.hook('close', close)
    }
    await startWorkers(useDatabase(), JOBS)
  }
  begin().catch(error => console.error('Jobs do not run:', error))
})
