// HMAC-SHA256 by RFC 2104, the key by HKDF (RFC 5869); what a link promises is this project's own, no published source.
import { describe, expect, it } from 'vitest'
import { linkToken, openLink } from '../../../server/utils/mail/links'

const SECRET = 'a secret of sixteen or more letters'
const UNTIL = Date.UTC(2026, 2, 3, 8)
const token = linkToken(SECRET, 'notice', { says: ['outage', 'mail', 'shop'], until: UNTIL })

describe('a link', () => {
  it('says what it was made for, until its time and not after', () => {
    expect(openLink(SECRET, 'notice', token, UNTIL)).toEqual({ ok: true, says: ['outage', 'mail', 'shop'], until: UNTIL })
    expect(openLink(SECRET, 'notice', token, UNTIL + 1)).toEqual({ ok: false, why: 'expired' })
  })

  it('opens nothing that it was not made for', () => {
    expect(openLink(SECRET, 'password-reset', token, UNTIL)).toEqual({ ok: false, why: 'altered' })
    expect(openLink(SECRET, 'invitation', token, UNTIL)).toEqual({ ok: false, why: 'altered' })
  })

  it('is of this server alone', () => {
    expect(openLink(`${SECRET}.`, 'notice', token, UNTIL)).toEqual({ ok: false, why: 'altered' })
  })

  it('is whole or nothing: no letter of it can be another one, be missing or be added', () => {
    for (let place = 0; place < token.length; place++) {
      const other = token[place] === 'A' ? 'B' : 'A'
      for (const altered of [token.slice(0, place) + other + token.slice(place + 1), token.slice(0, place) + token.slice(place + 1), `${token.slice(0, place)}A${token.slice(place)}`]) {
        if (altered !== token) expect(openLink(SECRET, 'notice', altered, UNTIL)).toEqual({ ok: false, why: 'altered' })
      }
    }
  })

  it('that never was one is altered', () => {
    for (const words of ['', '.', 'x', 'x.y', `${token}.`, `${token}.x`, '..', `.${token}`]) expect(openLink(SECRET, 'notice', words, UNTIL)).toEqual({ ok: false, why: 'altered' })
  })

  it('cannot have its end moved', () => {
    const [body, signature] = token.split('.') as [string, string]
    const [seconds, ...says] = JSON.parse(Buffer.from(body, 'base64url').toString()) as [number, ...string[]]
    const longer = Buffer.from(JSON.stringify([seconds + 3600, ...says])).toString('base64url')
    expect(openLink(SECRET, 'notice', `${longer}.${signature}`, UNTIL)).toEqual({ ok: false, why: 'altered' })
  })
})
