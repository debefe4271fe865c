import { bytesToHex } from '@noble/hashes/utils.js'

/**
 * Points of small order: under one of these as a public key a signature fits text that its owner never
 * saw (RFC 8032, 5.1.7 does not exclude them). Little-endian y, the sign bit left out.
 */
const WEAK_KEYS = new Set([
  '0000000000000000000000000000000000000000000000000000000000000000',
  '0100000000000000000000000000000000000000000000000000000000000000',
  'ecffffffffffffffffffffffffffffffffffffffffffffffffffffffffffff7f',
  'edffffffffffffffffffffffffffffffffffffffffffffffffffffffffffff7f',
  'eeffffffffffffffffffffffffffffffffffffffffffffffffffffffffffff7f',
  '26e8958fc2b227b045c3f489f2ef98f0d5dfac05d3c63339b13802886d53fc05',
  'c7176a703d4dd84fba3c0b760d10670f2a2053fa2c39ccc64ec7fd7792ac037a',
])

/** Whether an Ed25519 public key is a point of small order. @param raw 32 bytes */
export function isWeakKey(raw: Uint8Array): boolean {
  const y = Uint8Array.from(raw)
  y[31]! &= 0x7F
  return WEAK_KEYS.has(bytesToHex(y))
}
