import { and, eq, isNull, lt, or } from 'drizzle-orm'
import type { Entry } from '../../../shared/record/entry'
import { happenedAt } from '../../../shared/record/entry'
import { localTime } from '../../../shared/utils/zoned-time'
import { instruments } from '../../database/schema'
import type { Draft } from './draft'

/** A check in ice that an instrument passed is its last check in the equipment too, unless a later one stands there. */
export async function renewCheck({ db, state }: Draft, entry: Entry<'instrument-checked'>): Promise<void> {
  if (!entry.body.within) return
  const { id, timeZone } = state.snapshot.site
  const lastCheckOn = localTime(happenedAt(entry), timeZone).slice(0, 10)
  await db.update(instruments).set({ lastCheckOn }).where(and(
    eq(instruments.id, entry.body.instrumentId), eq(instruments.siteId, id),
    or(isNull(instruments.lastCheckOn), lt(instruments.lastCheckOn, lastCheckOn)),
  ))
}
