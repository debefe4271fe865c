import { randomUUID } from 'node:crypto'
import PgBoss from 'pg-boss'
import type { Database, Queries } from '../utils/database'
import type { AnyJob } from './job'
import { recurs } from './job'
import { numbered } from './numbered'

/** Room of the queue in the database, beside ours. */
const SCHEMA = 'jobs'
/** Seconds between two looks for work. */
const POLL_SECONDS = 1
const TAKES_SECONDS = 300
const RETRIES = 5

let boss: PgBoss | null = null
let timers: NodeJS.Timeout[] = []

/** Whether this process does jobs; others may, while it only asks for them. */
export function doesJobs(): boolean {
  return process.env.HOLDOVER_JOBS !== '0'
}

/** Makes the queues, before anything is asked of them. @param url postgres://… */
export async function openQueue(url: string, jobs: readonly AnyJob[]): Promise<void> {
  const made = new PgBoss({
    connectionString: url, schema: SCHEMA, application_name: 'holdover jobs', max: 3,
    supervise: doesJobs(), schedule: doesJobs(), maintenanceIntervalSeconds: 60,
    archiveCompletedAfterSeconds: 3600, deleteAfterDays: 2,
  })
  // Without a listener an error, such as a database that is away for a while, would end the process.
  made.on('error', complain)
  await made.start()
  boss = made
  for (const job of jobs) await makeQueue(made, job)
}

async function makeQueue(made: PgBoss, job: AnyJob): Promise<void> {
  const options = {
    name: job.name,
    // Of a job that recurs one run waits at most, however long nobody was there to do it.
    policy: recurs(job) ? 'short' as const : 'standard' as const,
    retryLimit: job.retries ?? (recurs(job) ? 0 : RETRIES), retryDelay: 5, retryBackoff: true,
    expireInSeconds: job.takes ?? TAKES_SECONDS,
  }
  await made.createQueue(job.name, { ...options })
  await made.updateQueue(job.name, { ...options })
}

/** Begins to do what is asked for and what the clock says. */
export async function startWorkers(db: Database, jobs: readonly AnyJob[]): Promise<void> {
  const running = boss
  if (!running || !doesJobs()) return
  for (const job of jobs) {
    // Runs by the clock that have gathered are all answered by one.
    await running.work<object>(job.name, { pollingIntervalSeconds: POLL_SECONDS, batchSize: recurs(job) ? 100 : 1 }, async ([asked]) => {
      if (asked) await runJob(db, job, asked.data ?? {})
    })
    if (job.cron) await running.schedule(job.name, job.cron)
    if (job.every) await repeat(running, job.name, job.every)
  }
}

/** Asks for a run now, and in each stretch of time; the first process to ask in a stretch is heard. */
async function repeat(running: PgBoss, name: string, seconds: number): Promise<void> {
  await running.send(name, {}, { singletonKey: randomUUID() })
  timers.push(setInterval(() => running.send(name, {}, { singletonKey: name, singletonSeconds: seconds }).catch(complain), seconds * 1000))
}

async function runJob(db: Database, job: AnyJob, data: object): Promise<void> {
  const work = () => job.run(db, Date.now(), data as never)
  try {
    await (job.together ?? !recurs(job) ? work() : alone(db, job.name, work))
  } catch (error) {
    console.error(`The job ${job.name} failed:`, error)
    throw error
  }
}

/** Does it unless another process is at it; its lock goes with its connection, so a killed process holds nobody up. */
async function alone(db: Database, name: string, work: () => Promise<void>): Promise<void> {
  const connection = await db.$client.reserve()
  try {
    const [row] = await connection`select pg_try_advisory_lock(hashtext(${`job ${name}`})) as locked`
    if (!row?.locked) return
    try {
      await work()
    } finally {
      await connection`select pg_advisory_unlock(hashtext(${`job ${name}`}))`
    }
  } finally {
    connection.release()
  }
}

/**
 * Asks for a run of a job. Within a transaction it is asked for when that commits, and not at all when it does not.
 * @param key of runs by the clock that were asked for under one key, one waits at most; else each is done
 * @returns id of the run; null where one waits already
 */
export async function enqueue(db: Queries, name: string, data: object, key?: string): Promise<string | null> {
  if (!boss) throw new Error('The queue of jobs is not open')
  return boss.send(name, data, { ...(key ? { singletonKey: key } : {}), db: { executeSql: async (text, values) => ({ rows: [...await db.execute(numbered(text, values))] }) } })
}

/** Asks for a run of a job that would come by itself later; where there is no queue, as in a script, it does come later. */
export async function hasten(db: Queries, name: string, data: object = {}): Promise<void> {
  // Under a key of its own: two transactions that ask for the same would wait for each other.
  if (boss) await enqueue(db, name, data, randomUUID())
}

/** Waits a second for runs that are on; what is not over by then is tried again by whoever comes. */
export async function closeQueue(): Promise<void> {
  for (const timer of timers) clearInterval(timer)
  timers = []
  const running = boss
  boss = null
  await running?.stop({ graceful: true, timeout: 1000 }).catch(complain)
}

function complain(error: Error): void {
  console.error('Jobs:', error.message)
}
