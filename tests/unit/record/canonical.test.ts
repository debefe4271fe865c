/** Canonical JSON against RFC 8785, section 3.2.2 and 3.2.3; hashes against FIPS 180-4. */
import { describe, expect, it } from 'vitest'
import { canonicalBytes, canonicalText, sha256Hex } from '../../../shared/record/canonical'

describe('canonical JSON', () => {
  // RFC 8785, 3.2.2: the sample object and its canonical form.
  it('writes the sample of RFC 8785', () => {
    const sample = JSON.parse(String.raw`{"numbers":[333333333.33333329,1E30,4.50,2e-3,1e-27],"string":"\u20ac$\u000F\nA'B\"\\\\\"/","literals":[null,true,false]}`)
    expect(canonicalText(sample)).toBe(String.raw`{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\u000f\nA'B\"\\\\\"/"}`)
  })

  // RFC 8785, 3.2.3: names sort by their UTF-16 code units.
  it('sorts the names of RFC 8785, 3.2.3', () => {
    const names = { '\u20ac': 'Euro Sign', '\r': 'Carriage Return', '\ufb33': 'Hebrew Letter Dalet With Dagesh', '1': 'One', '\ud83d\ude00': 'Emoji: Grinning Face', '\u0080': 'Control', '\u00f6': 'Latin Small Letter O With Diaeresis' }
    expect(Object.values(JSON.parse(canonicalText(names)))).toEqual(['One', 'Carriage Return', 'Control', 'Latin Small Letter O With Diaeresis', 'Euro Sign', 'Emoji: Grinning Face', 'Hebrew Letter Dalet With Dagesh'].sort((a, b) => a === 'One' ? -1 : b === 'One' ? 1 : 0))
    expect(canonicalText(names)).toMatch(/^\{"\\r":.*"1":.*"\u0080":.*"ö":.*"€":.*"\ud83d\ude00":.*"\ufb33":/u)
  })

  // RFC 8785, appendix B: a few of its numbers by their IEEE 754 bits.
  it.each([
    ['0000000000000000', '0'], ['8000000000000000', '0'], ['0000000000000001', '5e-324'], ['7fefffffffffffff', '1.7976931348623157e+308'],
    ['4340000000000000', '9007199254740992'], ['44b52d02c7e14af5', '9.999999999999997e+22'], ['44b52d02c7e14af6', '1e+23'], ['3eb0c6f7a0b5ed8d', '0.000001'],
    ['41b3de4355555557', '333333333.33333343'], ['becbf647612f3696', '-0.0000033333333333333333'],
  ])('writes the number with the bits %s as %s', (bits, text) => {
    expect(canonicalText(Buffer.from(bits, 'hex').readDoubleBE())).toBe(text)
  })

  it('is the same for another order of names, at every depth', () => {
    expect(canonicalText({ b: { d: 1, c: [2, { f: 3, e: 4 }] }, a: 0 })).toBe(canonicalText({ a: 0, b: { c: [2, { e: 4, f: 3 }], d: 1 } }))
  })

  // RFC 8785, 3.2.2.2 and 3.2.2.3 demand an error for each of these.
  it.each([
    ['a lone high surrogate', { words: 'x\ud800' }],
    ['a lone low surrogate', { words: '\udc00x' }],
    ['NaN', { value: Number.NaN }],
    ['infinity', { value: Number.POSITIVE_INFINITY }],
    ['undefined at the top', undefined],
    ['a function at the top', () => 1],
  ])('throws on %s', (_name, value) => {
    expect(() => canonicalText(value)).toThrow()
  })

  it('gives the UTF-8 bytes of its text', () => {
    expect(Buffer.from(canonicalBytes({ a: '€' })).toString('hex')).toBe(Buffer.from('{"a":"€"}', 'utf8').toString('hex'))
  })

  // FIPS 180-4 example (CSRC, SHA-256 of "abc") and the empty text.
  it.each([['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'], ['', 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855']])('hashes "%s"', (text, hash) => {
    expect(sha256Hex(text)).toBe(hash)
  })
})
