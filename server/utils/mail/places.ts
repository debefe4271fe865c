import { ownOrigin } from '../origin'
import type { LinkData, LinkPurpose } from './links'
import { linkToken } from './links'

/** Where Holdover is reached, for links in mail. */
function address(): string {
  return ownOrigin('http://127.0.0.1:3000')
}

/** An address of Holdover's. @param path begins with / */
export function placeOf(path: string): string {
  return `${address()}${path}`
}

/** The secret that sessions and links are signed with. */
export function linkSecret(): string {
  const secret = process.env.NUXT_AUTH_SECRET
  if (!secret) throw new Error('NUXT_AUTH_SECRET is not set')
  return secret
}

/** The pages that open links. */
const PAGES: Record<LinkPurpose, string> = { 'notice': '/notice', 'invitation': '/welcome', 'password-reset': '/new-password' }

/** A link that opens without an account. */
export function linkTo(purpose: LinkPurpose, data: LinkData): string {
  return placeOf(`${PAGES[purpose]}/${linkToken(linkSecret(), purpose, data)}`)
}
