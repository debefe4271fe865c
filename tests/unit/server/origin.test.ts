// Source: OWASP Cross-Site Request Forgery Prevention cheat sheet, "verifying origin with standard headers"; RFC 6454.
import { describe, expect, it } from 'vitest'
import { isForeign, ownOrigin } from '~~/server/utils/origin'

const OWN = 'https://holdover.example'

describe('isForeign', () => {
  it.each(['POST', 'PUT', 'PATCH', 'DELETE', 'post'])('refuses another origin\'s %s', (method) => {
    for (const origin of ['https://evil.example', 'http://holdover.example', 'https://holdover.example:444', 'https://holdover.example.evil.example', 'null', '', OWN + '/']) {
      expect(isForeign(method, origin, OWN)).toBe(true)
    }
    expect(isForeign(method, OWN, OWN)).toBe(false)
  })

  it.each(['GET', 'HEAD', 'OPTIONS'])('lets %s pass, which changes nothing', (method) => {
    expect(isForeign(method, 'https://evil.example', OWN)).toBe(false)
  })

  it('lets a request without an Origin pass: no page sent it', () => {
    expect(isForeign('POST', undefined, OWN)).toBe(false)
  })

  it('takes the names of one loopback for one origin, on the same port and scheme only', () => {
    expect(isForeign('POST', 'http://localhost:3000', 'http://127.0.0.1:3000')).toBe(false)
    expect(isForeign('POST', 'http://[::1]:3000', 'http://127.0.0.1:3000')).toBe(false)
    expect(isForeign('POST', 'http://localhost:3001', 'http://127.0.0.1:3000')).toBe(true)
    expect(isForeign('POST', 'https://localhost:3000', 'http://127.0.0.1:3000')).toBe(true)
    expect(isForeign('POST', 'http://localhost:443', OWN)).toBe(true)
  })
})

describe('ownOrigin', () => {
  it('is that of AUTH_ORIGIN, without its path; else the request\'s', () => {
    expect(ownOrigin('http://10.0.0.1:3000', 'https://holdover.example/api/auth')).toBe(OWN)
    expect(ownOrigin('http://10.0.0.1:3000', undefined)).toBe('http://10.0.0.1:3000')
    expect(ownOrigin('http://10.0.0.1:3000', 'no address')).toBe('http://10.0.0.1:3000')
  })
})
