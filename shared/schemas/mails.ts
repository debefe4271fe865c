import { z } from 'zod'

/** What a mail is about. */
export const MAIL_KINDS = [
  'plan-waiting', 'plan-approved', 'plan-returned', 'notice-shop', 'notice-monitoring', 'alert', 'called-off', 'control-back',
  'discard', 'sealed', 'invitation', 'password-reset', 'password-set', 'device-enrolled',
] as const
export type MailKind = (typeof MAIL_KINDS)[number]

/** Kinds as people read them. */
export const MAIL_KIND_WORDS: Record<MailKind, string> = {
  'plan-waiting': 'Plan waiting',
  'plan-approved': 'Plan approved',
  'plan-returned': 'Plan returned',
  'notice-shop': 'Notice to the shop',
  'notice-monitoring': 'Notice to the monitoring centre',
  'alert': 'Alert',
  'called-off': 'Called off',
  'control-back': 'Control is back',
  'discard': 'Product moved or to be discarded',
  'sealed': 'Record sealed',
  'invitation': 'Invitation',
  'password-reset': 'Password reset',
  'password-set': 'New password set',
  'device-enrolled': 'Device enrolled',
}

/** Kinds whose text opens an account: it is taken out of the database once it is sent. */
export const SECRET_MAIL_KINDS: readonly MailKind[] = ['invitation', 'password-reset']

export const MAIL_STATES = ['waiting', 'sent', 'failed'] as const
export type MailState = (typeof MAIL_STATES)[number]

/** A mail as an administrator's list shows it; times in ISO 8601 UTC. */
export const mailItemSchema = z.object({
  id: z.string().uuid(),
  kind: z.enum(MAIL_KINDS),
  to: z.string(),
  subject: z.string(),
  state: z.enum(MAIL_STATES),
  outageId: z.string().uuid().nullable(),
  createdAt: z.string(),
  sentAt: z.string().nullable(),
  attempts: z.number().int(),
  nextTryAt: z.string().nullable(),
  lastError: z.string().nullable(),
})
export type MailItem = z.infer<typeof mailItemSchema>

export interface MailPage { items: MailItem[], next: string | null }
/** How mail goes out: whether at all, from whom, and whether into the demo's own mailbox. */
export interface MailSettings { on: boolean, demo: boolean, from: string }
export const mailListSchema = z.object({ state: z.enum(MAIL_STATES).optional(), before: z.string().uuid().optional() })

/** A message of the demo's mailbox; times in ISO 8601 UTC. */
export interface MailboxItem { name: string, at: string, to: string, from: string, subject: string }
export interface MailboxMessage extends MailboxItem { text: string, html: string }
