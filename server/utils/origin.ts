/** Methods that change nothing. */
const SAFE = new Set(['GET', 'HEAD', 'OPTIONS'])
const LOOPBACK = new Set(['127.0.0.1', 'localhost', '[::1]'])

/**
 * Whether a request that changes something comes from a page of somebody else's.
 * A request without an Origin is not a page's, and the browser's cookies don't go with it.
 * @param origin the request's Origin header
 * @param own scheme, host and port of Holdover, as https://holdover.example
 */
export function isForeign(method: string, origin: string | undefined, own: string): boolean {
  if (SAFE.has(method.toUpperCase()) || origin === undefined) return false
  return origin !== own && !isSameLoopback(origin, own)
}

/** One machine under two of its own names: http://localhost:3000 is http://127.0.0.1:3000. */
function isSameLoopback(origin: string, own: string): boolean {
  if (!URL.canParse(origin) || !URL.canParse(own)) return false
  const [one, other] = [new URL(origin), new URL(own)]
  return LOOPBACK.has(one.hostname) && LOOPBACK.has(other.hostname) && one.protocol === other.protocol && one.port === other.port
}

/** Holdover's own origin, as the start command gives it in AUTH_ORIGIN; the request's where it does not. */
export function ownOrigin(requested: string, configured = process.env.AUTH_ORIGIN): string {
  return configured && URL.canParse(configured) ? new URL(configured).origin : requested
}
