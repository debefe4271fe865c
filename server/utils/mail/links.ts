import { createHmac, hkdfSync, timingSafeEqual } from 'node:crypto'

/** What a link is for; one made for one thing opens no other. */
export const LINK_PURPOSES = ['notice', 'invitation', 'password-reset'] as const
export type LinkPurpose = (typeof LINK_PURPOSES)[number]

/** What a link says: up to three short texts, and until when it is good (Unix ms). */
export interface LinkData { says: string[], until: number }

/** What a link turns out to be. */
export type OpenedLink = { ok: true, says: string[], until: number } | { ok: false, why: 'altered' | 'expired' }

/** The key of links, derived from the secret of sessions, so that no session's key signs anything else (HKDF, RFC 5869). */
function keyOf(secret: string): Buffer {
  return Buffer.from(hkdfSync('sha256', secret, '', 'holdover links', 32))
}

function signatureOf(secret: string, purpose: LinkPurpose, body: string): Buffer {
  return createHmac('sha256', keyOf(secret)).update(`${purpose}.${body}`).digest()
}

/**
 * The token of a link: what it says, readable by anyone, and an HMAC-SHA256 (RFC 2104) over purpose and content.
 * @param secret NUXT_AUTH_SECRET
 */
export function linkToken(secret: string, purpose: LinkPurpose, { says, until }: LinkData): string {
  const body = Buffer.from(JSON.stringify([Math.ceil(until / 1000), ...says])).toString('base64url')
  return `${body}.${signatureOf(secret, purpose, body).toString('base64url')}`
}

/**
 * What a token says, if it was made here for this purpose and is still good. An altered one is not looked into.
 * @param now Unix ms
 */
export function openLink(secret: string, purpose: LinkPurpose, token: string, now: number): OpenedLink {
  const [body = '', signature = '', ...more] = token.split('.')
  const expected = signatureOf(secret, purpose, body)
  const given = Buffer.from(signature, 'base64url')
  // Base64url has several spellings of the same bytes: only the one that was written counts.
  const same = given.length === expected.length && timingSafeEqual(given, expected) && signature === expected.toString('base64url')
  if (!same || more.length > 0) return { ok: false, why: 'altered' }
  const [seconds, ...says] = JSON.parse(Buffer.from(body, 'base64url').toString('utf8')) as [number, ...string[]]
  const until = seconds * 1000
  return now > until ? { ok: false, why: 'expired' } : { ok: true, says, until }
}
