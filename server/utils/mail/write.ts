import type { MailKind } from '../../../shared/schemas/mails'
import { uuidv7 } from '../../../shared/record/uuid'
import { mails } from '../../database/schema'
import { hasten } from '../../jobs/queue'
import type { Queries } from '../database'
import { isMailOn } from './settings'

/** Subject and body of a mail, as a template gives them. */
export interface MailText { subject: string, text: string, html: string }

/** A mail to be sent. `key` says what it tells and to whom. */
export interface NewMail extends MailText { id?: string, kind: MailKind, key: string, to: string, outageId?: string | null, personId?: string | null, notice?: typeof mails.$inferInsert.notice }

/** Name of the job that sends them. */
export const SEND_MAILS = 'send-mails'

/**
 * Writes a mail into the outbox, in the transaction of what it tells of; a job sends it once that has committed.
 * @param now Unix ms
 * @returns its id; null where mail is off, nobody is to be told, or the same was written before
 */
export async function writeMail(db: Queries, { id, to, outageId, personId, notice, ...mail }: NewMail, now: number): Promise<string | null> {
  if (!isMailOn() || !to) return null
  const at = new Date(now)
  const [row] = await db.insert(mails).values({ ...mail, id: id ?? uuidv7(now), to, outageId: outageId ?? null, personId: personId ?? null, notice: notice ?? null, createdAt: at, nextTryAt: at })
    .onConflictDoNothing({ target: mails.key }).returning({ id: mails.id })
  if (row) await hasten(db, SEND_MAILS)
  return row?.id ?? null
}
