import { ROLE_WORDS } from '../../shared/schemas/people'
import type { Role } from '../../shared/schemas/people'
import type { MailText } from '../utils/mail/write'
import { writeLetter } from './letter'
import { FOR_ACCOUNTS } from './outage'

/** Times in letters about accounts are in UTC: an account is of no one site. @param at Unix ms */
const utc = (at: number) => `${new Date(at).toISOString().slice(0, 16).replace('T', ' ')} UTC`

/** An account was made for somebody: the link lets them choose a password. */
export function invitation({ name, by, role, until, url }: { name: string, by: string, role: Role, until: number, url: string }): MailText {
  return writeLetter({
    subject: `${by} invites you to Holdover`,
    first: `${name}: ${by} made you an account in Holdover. Choose a password by ${utc(until)}.`,
    parts: [
      { facts: [['Your role', ROLE_WORDS[role]]] },
      { press: 'Choose a password', url },
      { say: 'The link is good once. If you do not know what this is about, leave it alone: without a password nobody can use the account.' },
    ],
    foot: FOR_ACCOUNTS,
  })
}

/** Somebody asked for a new password. */
export function passwordReset({ name, until, url }: { name: string, until: number, url: string }): MailText {
  return writeLetter({
    subject: 'Holdover: choose a new password',
    first: `${name}: a new password was asked for. If that was you, choose one by ${utc(until)}.`,
    parts: [
      { press: 'Choose a new password', url },
      { say: 'The link is good once. If you did not ask for it, do nothing: your password stays as it is.' },
    ],
    foot: FOR_ACCOUNTS,
  })
}

/** A new password was set: to the owner of the account, who may not have done it. */
export function passwordSet({ name, at, how }: { name: string, at: number, how: 'changed' | 'reset' | 'given' }): MailText {
  const words = { changed: 'was changed on the account page', reset: 'was set by a link in a letter to this address', given: 'was given anew by an administrator' }[how]
  return writeLetter({
    subject: 'Holdover: new password set',
    first: `${name}: your password ${words} at ${utc(at)}. If that was not you, tell an administrator at once.`,
    parts: [{ say: 'Every session of the account ended with it. What was signed before stays as it is.' }],
    foot: FOR_ACCOUNTS,
  })
}

/** A browser became a signing device: to its owner. */
export function deviceEnrolled({ name, device, at, replaced, url }: { name: string, device: string, at: number, replaced: boolean, url: string }): MailText {
  return writeLetter({
    subject: `Holdover: “${device}” signs in your name`,
    first: `${name}: the device “${device}” was enrolled at ${utc(at)} and can sign in your name. If that was not you, revoke it now.`,
    parts: [
      ...replaced ? [{ say: 'It takes the place of an earlier key on the same browser, which was revoked with it.' }] : [],
      { press: 'See your devices', url },
    ],
    foot: FOR_ACCOUNTS,
  })
}
