/** Ed25519 keys and signatures against RFC 8032, 7.1, tests 1 to 3, and against OpenSSL. */
import { execFileSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { privateKeyOf, publicKeyText, signBytes, verifyBytes } from '../../../server/utils/record/keys'
import { entryBytes } from '../../../shared/record/entry'
import { storyTo } from './store'

const hex = (text: string) => Buffer.from(text, 'hex')
const VECTORS = [
  {
    test: 1, seed: '9d61b19deffd5a60ba844af492ec2cc44449c5697b326919703bac031cae7f60', publicKey: 'd75a980182b10ab7d54bfed3c964073a0ee172f3daa62325af021a68f707511a', message: '',
    signature: 'e5564300c360ac729086e2cc806e828a84877f1eb8e5d974d873e065224901555fb8821590a33bacc61e39701cf9b46bd25bf5f0595bbe24655141438e7a100b',
  },
  {
    test: 2, seed: '4ccd089b28ff96da9db6c346ec114e0f5b8a319f35aba624da8cf6ed4fb8a6fb', publicKey: '3d4017c3e843895a92b70aa74d1b7ebc9c982ccf2ec4968cc0cd55f12af4660c', message: '72',
    signature: '92a009a9f0d4cab8720e820b5f642540a2b27b5416503f8fb3762223ebdb69da085ac1e43e15996e458f3613d0f11d8c387b2eaeb4302aeeb00d291612bb0c00',
  },
  {
    test: 3, seed: 'c5aa8df43f9f837bedb7442f31dcb7b166d38535076f094b85ce3a2e0b4458f7', publicKey: 'fc51cd8e6218a1a38da47ed00230f0580816ed13ba3303ac5deb911548908025', message: 'af82',
    signature: '6291d657deec24024827e69c3abe01a30ce548a284743a445e3680d7db5ac3ac18ff9b538d16f290ae67f760984dc6594a7c15e9716ed28dc027beceea1ec40a',
  },
]

let room = ''
beforeAll(() => { room = mkdtempSync(join(tmpdir(), 'holdover-keys-')) })
afterAll(() => rmSync(room, { recursive: true, force: true }))

/** What OpenSSL says of a signature. @param publicKey 32 raw bytes */
function opensslVerifies(publicKey: Buffer, message: Uint8Array, signature: Buffer): boolean {
  // RFC 8410, 4: the DER wrapping of a raw public key.
  writeFileSync(join(room, 'key.pem'), `-----BEGIN PUBLIC KEY-----\n${Buffer.concat([hex('302a300506032b6570032100'), publicKey]).toString('base64')}\n-----END PUBLIC KEY-----\n`)
  writeFileSync(join(room, 'message'), message)
  writeFileSync(join(room, 'signature'), signature)
  try {
    const said = execFileSync('openssl', ['pkeyutl', '-verify', '-rawin', '-pubin', '-inkey', 'key.pem', '-in', 'message', '-sigfile', 'signature'], { cwd: room, encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] })
    return said.includes('Signature Verified Successfully')
  } catch {
    return false
  }
}

describe.each(VECTORS)('RFC 8032, 7.1, test $test', ({ seed, publicKey, message, signature }) => {
  const key = privateKeyOf(hex(seed))
  const publicText = hex(publicKey).toString('base64url')
  const signatureText = hex(signature).toString('base64url')

  it('gives the public key and the signature', () => {
    expect(publicKeyText(key)).toBe(publicText)
    expect(signBytes(hex(message), key)).toBe(signatureText)
  })

  it('verifies, and nothing else does', () => {
    expect(verifyBytes(hex(message), signatureText, publicText)).toBe(true)
    expect(verifyBytes(Buffer.concat([hex(message), Buffer.of(0)]), signatureText, publicText)).toBe(false)
    const bent = hex(signature)
    bent[10]! ^= 1
    expect(verifyBytes(hex(message), bent.toString('base64url'), publicText)).toBe(false)
    expect(verifyBytes(hex(message), signatureText, hex(VECTORS.find(other => other.seed !== seed)!.publicKey).toString('base64url'))).toBe(false)
  })
})

describe('keys', () => {
  // OpenSSL 3.0 reads no empty message with -rawin, so test 1 is left to the check above.
  it.each(VECTORS.slice(1))('agree with OpenSSL on test $test', ({ publicKey, message, signature }) => {
    expect(opensslVerifies(hex(publicKey), hex(message), hex(signature))).toBe(true)
    const bent = hex(signature)
    bent[40]! ^= 1
    expect(opensslVerifies(hex(publicKey), hex(message), bent)).toBe(false)
  })

  it('sign entries that OpenSSL verifies', () => {
    const { entries, state } = storyTo('approved')
    const kinds = new Set<string>()
    for (const { entry, signature } of entries.filter(stored => !kinds.has(stored.entry.kind) && kinds.add(stored.entry.kind))) {
      expect(opensslVerifies(Buffer.from(state.signers[entry.device]!.publicKey, 'base64url'), entryBytes(entry), Buffer.from(signature, 'base64url')), entry.kind).toBe(true)
    }
    expect(kinds.size).toBeGreaterThan(4)
  })

  it.each([0, 31, 33])('are not made of %i bytes', (length) => {
    expect(() => privateKeyOf(new Uint8Array(length))).toThrow('32 bytes')
  })

  it.each([['a short key', 'AAAA', 'A'.repeat(86)], ['a short signature', 'A'.repeat(43), 'AAAA'], ['no key', '', ''], ['zeros', 'A'.repeat(43), 'A'.repeat(86)]])('do not verify with %s', (_name, publicKey, signature) => {
    expect(verifyBytes(Buffer.from('x'), signature, publicKey)).toBe(false)
  })
})
