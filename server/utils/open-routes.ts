/** API routes that need no session. Every other one answers 401 without a person. */
export const OPEN_ROUTES: readonly { path: RegExp, why: string }[] = [
  { path: /^\/api\/auth\//, why: 'next-auth\'s own sign-in' },
  { path: /^\/api\/health$/, why: 'asked by the start command and by load balancers' },
  { path: /^\/api\/setup$/, why: 'makes the first administrator; closed once anybody exists' },
  { path: /^\/api\/notices\/[^/]+$/, why: 'a shop\'s contact has no account; the link is signed' },
  { path: /^\/api\/password-links(\/[^/]+\/[^/]+)?$/, why: 'whoever chooses a password cannot sign in yet; the link is signed' },
  { path: /^\/api\/server-keys$/, why: 'public keys, for whoever verifies a record without an account' },
]

export function isOpenRoute(path: string): boolean {
  return OPEN_ROUTES.some(route => route.path.test(path))
}

/** What somebody may still ask for whose password was given by an administrator. */
export function isOpenWithTemporaryPassword(path: string): boolean {
  return path === '/api/account' || path === '/api/account/password'
}
