import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, concatBytes } from '@noble/hashes/utils.js'
import { canonicalBytes } from './canonical'

const LEAF = Uint8Array.of(0)
const NODE = Uint8Array.of(1)

/** Hash of a leaf: SHA-256(0x00 ‖ data) (RFC 9162, 2.1.1). */
export function leafHash(data: Uint8Array): Uint8Array {
  return sha256(concatBytes(LEAF, data))
}

/** Hash of an inner node: SHA-256(0x01 ‖ left ‖ right); each half must be exactly 32 bytes. */
export function nodeHash(left: Uint8Array, right: Uint8Array): Uint8Array {
  if (left.length !== 32 || right.length !== 32) throw new RangeError('A hash is exactly 32 bytes')
  return sha256(concatBytes(NODE, left, right))
}

/** Merkle tree root of leaf hashes, split at the largest power of two below n (RFC 9162, 2.1.1). */
export function rootOf(leaves: readonly Uint8Array[]): Uint8Array {
  if (leaves.length === 0) return sha256(new Uint8Array())
  if (leaves.length === 1) return leaves[0]!
  let split = 1
  while (split * 2 < leaves.length) split *= 2
  return nodeHash(rootOf(leaves.slice(0, split)), rootOf(leaves.slice(split)))
}

/** Root of a log as 64 hexadecimal digits; each stored entry is one leaf in its canonical bytes. */
export function logRoot(stored: readonly unknown[]): string {
  return bytesToHex(rootOf(stored.map(entry => leafHash(canonicalBytes(entry)))))
}
