import { and, desc, eq, isNotNull, isNull, lt } from 'drizzle-orm'
import type { MailItem, MailPage, MailState } from '../../../shared/schemas/mails'
import { mails } from '../../database/schema'
import type { Queries } from '../database'
import { conflict, notFound } from '../errors'
import { hasten } from '../../jobs/queue'
import { SEND_MAILS } from './write'

/** Mails that one page holds. */
const PAGE = 50

const STATE_IS = {
  waiting: and(isNull(mails.sentAt), isNull(mails.failedAt)),
  sent: isNotNull(mails.sentAt),
  failed: isNotNull(mails.failedAt),
} as const

/** One page of mails, the latest first; `next` is what to ask for as `before`, null at the end. Their text is not among it. */
export async function listMails(db: Queries, { state, before }: { state?: MailState, before?: string }): Promise<MailPage> {
  const rows = await db.select(listed).from(mails).where(and(state && STATE_IS[state], before ? lt(mails.id, before) : undefined)).orderBy(desc(mails.id)).limit(PAGE + 1)
  const items = rows.slice(0, PAGE).map(itemOf)
  return { items, next: rows.length > PAGE ? items.at(-1)!.id : null }
}

const listed = {
  id: mails.id, kind: mails.kind, to: mails.to, subject: mails.subject, outageId: mails.outageId,
  createdAt: mails.createdAt, sentAt: mails.sentAt, failedAt: mails.failedAt, attempts: mails.attempts, nextTryAt: mails.nextTryAt, lastError: mails.lastError,
}

function itemOf({ id, kind, to, subject, outageId, createdAt, sentAt, failedAt, attempts, nextTryAt, lastError }: Pick<typeof mails.$inferSelect, keyof typeof listed>): MailItem {
  const state = sentAt ? 'sent' : failedAt ? 'failed' : 'waiting'
  return { id, kind, to, subject, state, outageId, createdAt: createdAt.toISOString(), sentAt: sentAt?.toISOString() ?? null, attempts, nextTryAt: state === 'waiting' ? nextTryAt.toISOString() : null, lastError }
}

/** Lets a mail be tried again now that failed or waits for its next try. 404 for none; 409 where it was sent. @param now Unix ms */
export async function tryMailAgain(db: Queries, id: string, now: number): Promise<MailItem> {
  const [row] = await db.update(mails).set({ failedAt: null, attempts: 0, nextTryAt: new Date(now) }).where(and(eq(mails.id, id), isNull(mails.sentAt))).returning()
  if (!row) {
    const [sent] = await db.select({ id: mails.id }).from(mails).where(eq(mails.id, id))
    return sent ? conflict('It was sent already') : notFound('mail')
  }
  await hasten(db, SEND_MAILS)
  return itemOf(row)
}
