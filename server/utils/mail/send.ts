import { and, asc, eq, isNull, lte } from 'drizzle-orm'
import nodemailer from 'nodemailer'
import type { SendMailOptions, TransportOptions } from 'nodemailer'
import { SECRET_MAIL_KINDS } from '../../../shared/schemas/mails'
import { mails } from '../../database/schema'
import type { Database, Queries } from '../database'
import { mailDomain } from './settings'
import type { SendFault } from './tries'
import { isRefusedForGood, isWayShut, MAX_TRIES, minutesUntilNextTry } from './tries'

type MailRow = typeof mails.$inferSelect
/** Hands one mail in; throws what the receiver or the way there said. */
export type HandIn = (mail: MailRow) => Promise<void>

/** Mails that one run sends at most. */
const PER_RUN = 500

/** The receiver at an address. @param from as mails name their sender */
export function receiver(url: string, from: string): { handIn: HandIn, close: () => void } {
  const transport = nodemailer.createTransport({ url, pool: true, maxConnections: 1, connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 } as TransportOptions)
  return {
    handIn: async ({ id, to, subject, text, html, createdAt }) => {
      // The same Message-ID at each try: a receiver that gets a mail twice can tell.
      await transport.sendMail({ from, to, subject, text, html, date: createdAt, messageId: `<${id}@${mailDomain(from)}>`, headers: { 'Auto-Submitted': 'auto-generated' } } as SendMailOptions)
    },
    close: () => transport.close(),
  }
}

/** Sends what is due, the longest due first. @param now Unix ms. @returns how many were sent */
export async function sendDueMails(db: Database, handIn: HandIn, now: number): Promise<number> {
  let sent = 0
  for (let tries = 0; tries < PER_RUN; tries++) {
    const outcome = await sendNext(db, handIn, now)
    if (outcome === 'sent') sent++
    if (outcome === 'none' || outcome === 'shut') break
  }
  return sent
}

/**
 * Sends one mail while its row is locked, so that no other process takes it. One that ends between handing in and
 * marking leaves the row as it was: the mail is handed in again, under the same Message-ID.
 */
async function sendNext(db: Database, handIn: HandIn, now: number): Promise<'sent' | 'failed' | 'shut' | 'none'> {
  return db.transaction(async (tx) => {
    const [mail] = await tx.select().from(mails).where(and(isNull(mails.sentAt), isNull(mails.failedAt), lte(mails.nextTryAt, new Date(now))))
      .orderBy(asc(mails.nextTryAt), asc(mails.id)).limit(1).for('update', { skipLocked: true })
    if (!mail) return 'none'
    try {
      await handIn(mail)
    } catch (error) {
      const fault = error as SendFault
      await markFailed(tx, mail, fault, now)
      return isWayShut(fault) ? 'shut' : 'failed'
    }
    const emptied = SECRET_MAIL_KINDS.includes(mail.kind) ? { text: '', html: '' } : {}
    await tx.update(mails).set({ sentAt: new Date(now), attempts: mail.attempts + 1, lastError: null, ...emptied }).where(eq(mails.id, mail.id))
    return 'sent'
  })
}

async function markFailed(tx: Queries, mail: MailRow, fault: SendFault, now: number): Promise<void> {
  const attempts = mail.attempts + 1
  const over = attempts >= MAX_TRIES || isRefusedForGood(fault)
  await tx.update(mails).set({
    attempts, lastError: fault.message.slice(0, 500), failedAt: over ? new Date(now) : null,
    nextTryAt: new Date(now + minutesUntilNextTry(attempts) * 60_000),
  }).where(eq(mails.id, mail.id))
}
