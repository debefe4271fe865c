// Source: Content Security Policy Level 3 (W3C), nonces; OWASP HTTP Headers cheat sheet.
import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { contentPolicy, safetyHeaders, shellPolicy, withNonce } from '~~/server/utils/content-policy'

describe('contentPolicy', () => {
  it('lets no inline script run without the nonce, and no eval', () => {
    const script = contentPolicy('abc').split('; ').find(part => part.startsWith('script-src '))
    expect(script).toBe('script-src \'self\' \'nonce-abc\'')
  })

  it('allows nothing off the machine', () => {
    expect(contentPolicy('abc')).not.toMatch(/https?:|\*/)
  })
})

describe('shellPolicy', () => {
  it('names inline scripts and styles by their SHA-256, and no data', () => {
    const hash = (text: string) => `'sha256-${createHash('sha256').update(text).digest('base64')}'`
    const html = '<head><script type="module" src="/a.js"></script><style>a{}</style></head><script>b()\n</script><script type="application/json">[1]</script>'
    const parts = shellPolicy(html).split('; ')
    expect(parts).toContain(`script-src 'self' ${hash('b()\n')}`)
    expect(parts).toContain(`style-src 'self' ${hash('a{}')}`)
  })
})

describe('withNonce', () => {
  it('marks every script and style element and nothing else', () => {
    expect(withNonce('<script type="module" src="/a.js"></script><style>a{}</style><link rel="stylesheet"><scripture><script>1</script>', 'n'))
      .toBe('<script nonce="n" type="module" src="/a.js"></script><style nonce="n">a{}</style><link rel="stylesheet"><scripture><script nonce="n">1</script>')
  })
})

describe('safetyHeaders', () => {
  it('keeps API answers out of every cache', () => {
    expect(safetyHeaders('/api/outages', 'http://127.0.0.1:3000')['cache-control']).toBe('no-store')
    expect(safetyHeaders('/_nuxt/entry.js', 'http://127.0.0.1:3000')['cache-control']).toBeUndefined()
  })

  it('asks for HTTPS only where it is served so', () => {
    expect(safetyHeaders('/', 'https://holdover.example')['strict-transport-security']).toMatch(/^max-age=\d{8}/)
    expect(safetyHeaders('/', 'http://127.0.0.1:3000')['strict-transport-security']).toBeUndefined()
  })

  it('allows the camera to Holdover alone', () => {
    expect(safetyHeaders('/', '')['permissions-policy']).toContain('camera=(self)')
  })
})
