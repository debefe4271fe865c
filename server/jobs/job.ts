import type { Database } from '../utils/database'

/** Work that is done outside of requests: at times, or when `enqueue` asks for it. Any process may do it. */
export interface Job<Data extends object = object> {
  name: string
  /** seconds between two runs, over all processes together */
  every?: number
  /** five fields, in UTC; instead of `every` */
  cron?: string
  /** seconds after which a run counts as lost, and is tried again if it was asked for; default 300 */
  takes?: number
  /** how often a run that failed is tried again, at growing distances; default 0 where it recurs anyhow, else 5 */
  retries?: number
  /** several runs at once, in this process and in others, are harmless; default false for what recurs, true for what is asked for */
  together?: boolean
  /** What it does. @param now Unix ms. @param data what `enqueue` was given; {} for a run by the clock */
  run(db: Database, now: number, data: Data): Promise<void>
}

/** A job whose data only it knows, in a list with others. */
export type AnyJob = Omit<Job, 'run'> & { run(db: Database, now: number, data: never): Promise<void> }

/** Whether a job runs by the clock. */
export function recurs(job: AnyJob): boolean {
  return job.every !== undefined || job.cron !== undefined
}
