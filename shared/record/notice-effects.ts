import type { BodyOf } from './kinds'
import type { Mark, OutageState } from './state'

/** A mail to somebody without an account was handed in; one that was read before the server came to say so is completed. */
export function noticeSent(state: OutageState, { mail, party, subject, name, to, sentAt }: BodyOf<'notice-sent'>, mark: Mark): void {
  const known = state.notices.find(item => item.mail === mail)
  if (known) Object.assign(known, { subject, name, to, sentAt: Date.parse(sentAt) })
  else state.notices.push({ mail, party, subject, name, to, sentAt: Date.parse(sentAt), seq: mark.seq, acknowledged: null })
}

/** Somebody said that they have read it; the first to say so counts. */
export function noticeAcknowledged(state: OutageState, { mail, party, name }: BodyOf<'notice-acknowledged'>, mark: Mark): void {
  const known = state.notices.find(item => item.mail === mail)
  const acknowledged = { name, at: mark.at, seq: mark.seq }
  if (!known) state.notices.push({ mail, party, subject: 'control-away', name: '', to: '', sentAt: null, seq: mark.seq, acknowledged })
  else known.acknowledged ??= acknowledged
}
