import { isWeakKey } from '../weak-keys'

/** Whether a signature (64 bytes, base64url) over bytes fits a public key (32 bytes, base64url). */
export type CheckSignature = (publicKey: string, signature: string, bytes: Uint8Array) => boolean | Promise<boolean>

/** This program cannot check Ed25519 signatures where it runs. */
export class CannotVerify extends Error {
  constructor() { super('This browser cannot check Ed25519 signatures. Chromium 137, Firefox 129, Safari 17 or later can, on HTTPS or on this machine itself.') }
}

/** Bytes of a base64url text; null where it is none. */
export function bytesOf(text: string): Uint8Array<ArrayBuffer> | null {
  try {
    return Uint8Array.from(atob(text.replaceAll('-', '+').replaceAll('_', '/')), char => char.charCodeAt(0))
  } catch {
    return null
  }
}

/**
 * Checks by WebCrypto (Ed25519, RFC 8032); each key is read once.
 * @throws CannotVerify where the browser has no Ed25519
 */
export async function webSignatures(): Promise<CheckSignature> {
  const subtle = globalThis.crypto?.subtle
  if (!subtle) throw new CannotVerify()
  await subtle.generateKey('Ed25519', false, ['sign', 'verify']).catch(() => { throw new CannotVerify() })
  const keys = new Map<string, Promise<CryptoKey | null>>()
  const keyOf = (text: string) => {
    const raw = bytesOf(text)
    return raw?.length === 32 && !isWeakKey(raw) ? subtle.importKey('raw', raw, 'Ed25519', false, ['verify']).catch(() => null) : Promise.resolve(null)
  }
  return async (publicKey, signature, bytes) => {
    if (!keys.has(publicKey)) keys.set(publicKey, keyOf(publicKey))
    const key = await keys.get(publicKey)!
    const mark = bytesOf(signature)
    return key !== null && mark?.length === 64 && await subtle.verify('Ed25519', key, mark, bytes as BufferSource)
  }
}
