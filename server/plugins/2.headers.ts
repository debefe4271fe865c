import { randomBytes } from 'node:crypto'
import { isShellPath } from '~~/shared/shell-routes'
import { contentPolicy, safetyHeaders, shellPolicy, withNonce } from '~~/server/utils/content-policy'
import { ownOrigin } from '~~/server/utils/origin'

/** Safety headers on every answer; on a page also its content policy, with a nonce that is new each time. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('request', (event) => {
    setResponseHeaders(event, safetyHeaders(event.path, ownOrigin('')))
  })
  nitro.hooks.hook('render:html', (html, { event }) => {
    // The development server puts scripts and styles of its own into the page.
    if (import.meta.dev) return
    // The shell is the same for everybody and is kept by phones.
    if (isShellPath(getRequestURL(event).pathname)) {
      const policy = shellPolicy([...html.head, ...html.bodyPrepend, ...html.body, ...html.bodyAppend].join('\n'))
      setResponseHeaders(event, { 'content-security-policy': policy, 'cache-control': 'no-store' })
      return
    }
    const nonce = randomBytes(16).toString('base64')
    // The body is what components rendered and holds no script; the frame around it does.
    html.head = html.head.map(part => withNonce(part, nonce))
    html.bodyPrepend = html.bodyPrepend.map(part => withNonce(part, nonce))
    html.bodyAppend = html.bodyAppend.map(part => withNonce(part, nonce))
    setResponseHeaders(event, { 'content-security-policy': contentPolicy(nonce), 'cache-control': 'no-store' })
  })
  nitro.hooks.hook('render:response', (response) => {
    delete response.headers?.['x-powered-by']
  })
})
