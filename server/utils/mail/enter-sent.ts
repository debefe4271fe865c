import { and, asc, eq, isNotNull, isNull, ne } from 'drizzle-orm'
import { isoTime } from '../../../shared/record/entry'
import { mails, outages } from '../../database/schema'
import type { Database } from '../database'
import { writeAsServer } from '../record/as-server'
import { addServerEntry } from '../record/draft'

/** Notices that one run enters at most. */
const PER_RUN = 200

/**
 * Enters in the record that notices were sent. A record that was handed in stays as it is until it comes back or is sealed.
 * @param now Unix ms
 */
export async function enterSentNotices(db: Database, now: number): Promise<void> {
  const waiting = await db.select({ mail: mails }).from(mails).innerJoin(outages, eq(outages.id, mails.outageId))
    .where(and(isNotNull(mails.notice), isNotNull(mails.sentAt), isNull(mails.enteredAt), ne(outages.phase, 'submitted'))).orderBy(asc(mails.id)).limit(PER_RUN)
  for (const { mail } of waiting) await enterOne(db, mail, now)
}

/** A process killed anywhere in here leaves nothing, or all: entry and mark are one transaction. */
async function enterOne(db: Database, { id, outageId, notice, to, sentAt }: typeof mails.$inferSelect, now: number): Promise<void> {
  if (!outageId || !notice || !sentAt) return
  await writeAsServer(db, outageId, now, async (draft) => {
    const { phase, notices } = draft.state
    if (phase === 'submitted') return
    if (phase !== 'sealed' && !notices.some(item => item.mail === id && item.sentAt !== null)) await addServerEntry(draft, 'notice-sent', { mail: id, ...notice, to, sentAt: isoTime(sentAt.getTime()) })
    await draft.db.update(mails).set({ enteredAt: new Date(now) }).where(eq(mails.id, id))
  })
}
