import { createHash } from 'node:crypto'

/**
 * The content security policy of a page that is made anew each time.
 * @param nonce of this answer's own scripts and styles, base64
 */
export function contentPolicy(nonce: string): string {
  return policyOf([`'nonce-${nonce}'`], [`'nonce-${nonce}'`])
}

/**
 * The content security policy of a page that a phone keeps: its inline scripts and styles are named by
 * their hashes, since a nonce that is kept is none.
 * @param html the whole page
 */
export function shellPolicy(html: string): string {
  return policyOf(inlineHashes(html, 'script'), inlineHashes(html, 'style'))
}

/** Hashes of the inline elements of a page as a policy names them; data that is no script needs none. */
function inlineHashes(html: string, element: 'script' | 'style'): string[] {
  const found = [...html.matchAll(new RegExp(`<${element}\\b([^>]*)>([\\s\\S]*?)</${element}>`, 'g'))]
  const inline = found.filter(([, attributes]) => !/\ssrc=|type="application\/json"/.test(attributes!))
  return [...new Set(inline.map(([, , text]) => `'sha256-${createHash('sha256').update(text!).digest('base64')}'`))]
}

function policyOf(scripts: string[], styles: string[]): string {
  return [
    'default-src \'self\'',
    ['script-src \'self\'', ...scripts].join(' '),
    ['style-src \'self\'', ...styles].join(' '),
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
