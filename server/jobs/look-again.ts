import { asc, inArray } from 'drizzle-orm'
import { outages } from '../database/schema'
import { lookAgain } from '../utils/record/follow'
import type { Job } from './job'

/** Enters what time alone has brought to outages without control and to those that settle. */
export const lookAgainJob: Job = {
  name: 'look-again',
  every: 60,
  async run(db, now) {
    const live = await db.select({ id: outages.id }).from(outages).where(inArray(outages.phase, ['dark', 'hand-back', 'settle'])).orderBy(asc(outages.id))
    const failed: unknown[] = []
    // One that cannot be looked at keeps nobody from looking at the others.
    for (const { id } of live) await lookAgain(db, id, now).catch(error => failed.push(error))
    if (failed.length > 0) throw new AggregateError(failed, `${failed.length} of ${live.length} outages could not be looked at: ${String(failed[0])}`)
  },
}
