/**
 * The content security policy of a page.
 * @param nonce of this answer's own scripts and styles, base64
 */
export function contentPolicy(nonce: string): string {
  return [
    'default-src \'self\'',
    `script-src 'self' 'nonce-${nonce}'`,
    `style-src 'self' 'nonce-${nonce}'`,
    // Vue and its route announcer render style attributes on the server; they can run nothing.
    'style-src-attr \'unsafe-inline\'',
    'img-src \'self\' data: blob:',
    'font-src \'self\'',
    'connect-src \'self\'',
    'worker-src \'self\'',
    'manifest-src \'self\'',
    'object-src \'none\'',
    'base-uri \'none\'',
    'form-action \'self\'',
    'frame-ancestors \'none\'',
  ].join('; ')
}

/** Gives the nonce to each script and style element of a piece of a page's frame. */
export function withNonce(html: string, nonce: string): string {
  return html.replace(/<(script|style)(?=[\s>])/g, `<$1 nonce="${nonce}"`)
}

const YEAR = 365 * 24 * 60 * 60

/**
 * Headers of every answer.
 * @param path of the request
 * @param origin Holdover's own
 */
export function safetyHeaders(path: string, origin: string): Record<string, string> {
  return {
    'x-content-type-options': 'nosniff',
    'x-frame-options': 'DENY',
    'referrer-policy': 'same-origin',
    'permissions-policy': 'camera=(self), geolocation=(), microphone=(), payment=(), usb=()',
    'cross-origin-opener-policy': 'same-origin',
    'cross-origin-resource-policy': 'same-origin',
    ...(origin.startsWith('https://') ? { 'strict-transport-security': `max-age=${YEAR}` } : {}),
    ...(path.startsWith('/api/') ? { 'cache-control': 'no-store', 'content-security-policy': 'frame-ancestors \'none\'' } : {}),
  }
}
