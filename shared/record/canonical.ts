import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js'
import canonicalize from 'canonicalize'

/**
 * The canonical text of a JSON value (RFC 8785).
 * @throws when the value holds something JSON cannot say (a lone surrogate, NaN, an undefined at the top)
 */
export function canonicalText(value: unknown): string {
  const text = canonicalize(value)
  if (text === undefined) throw new TypeError('This value has no JSON form')
  return text
}

/** The same as UTF-8 bytes: what is signed and hashed. */
export function canonicalBytes(value: unknown): Uint8Array {
  return utf8ToBytes(canonicalText(value))
}

/** SHA-256 of bytes or of a text's UTF-8 bytes, as 64 lower-case hexadecimal digits (FIPS 180-4). */
export function sha256Hex(data: Uint8Array | string): string {
  return bytesToHex(sha256(typeof data === 'string' ? utf8ToBytes(data) : data))
}
