import { createPrivateKey, createPublicKey, sign, verify } from 'node:crypto'
import type { KeyObject } from 'node:crypto'
import { isWeakKey } from '../../../shared/record/weak-keys'

// RFC 8410: the DER wrappings of a raw Ed25519 seed and public key.
const PRIVATE_PREFIX = Buffer.from('302e020100300506032b657004220420', 'hex')
const PUBLIC_PREFIX = Buffer.from('302a300506032b6570032100', 'hex')

/** A private key from its 32-byte seed (RFC 8032). */
export function privateKeyOf(seed: Uint8Array): KeyObject {
  if (seed.length !== 32) throw new RangeError('An Ed25519 seed is 32 bytes')
  return createPrivateKey({ key: Buffer.concat([PRIVATE_PREFIX, seed]), format: 'der', type: 'pkcs8' })
}

/** The raw public half, 32 bytes in base64url. */
export function publicKeyText(key: KeyObject): string {
  return createPublicKey(key).export({ format: 'der', type: 'spki' }).subarray(PUBLIC_PREFIX.length).toString('base64url')
}

/** Signs bytes; 64 bytes in base64url. */
export function signBytes(bytes: Uint8Array, key: KeyObject): string {
  return sign(null, bytes, key).toString('base64url')
}

/**
 * A check of signatures by one key; for many entries of one signer the key is read once.
 * @param publicKey 32 bytes in base64url; nothing fits a malformed or weak one
 */
export function verifierOf(publicKey: string): (bytes: Uint8Array, signature: string) => boolean {
  const raw = Buffer.from(publicKey, 'base64url')
  let key: KeyObject | null = null
  try {
    key = raw.length === 32 && !isWeakKey(raw) ? createPublicKey({ key: Buffer.concat([PUBLIC_PREFIX, raw]), format: 'der', type: 'spki' }) : null
  } catch {
    key = null
  }
  return (bytes, signature) => {
    const mark = Buffer.from(signature, 'base64url')
    if (!key || mark.length !== 64) return false
    try {
      return verify(null, bytes, key, mark)
    } catch {
      return false
    }
  }
}

/** How many keys are kept read: reading one takes as long as checking a signature. */
const KEYS_KEPT = 1000
const verifiers = new Map<string, ReturnType<typeof verifierOf>>()

/** Whether a signature over bytes is good; false for a malformed or weak key and a malformed signature too. */
export function verifyBytes(bytes: Uint8Array, signature: string, publicKey: string): boolean {
  const verifier = verifiers.get(publicKey) ?? verifierOf(publicKey)
  // The one used last goes to the end, so that the first is the one that can go.
  verifiers.delete(publicKey)
  verifiers.set(publicKey, verifier)
  if (verifiers.size > KEYS_KEPT) verifiers.delete(verifiers.keys().next().value!)
  return verifier(bytes, signature)
}
