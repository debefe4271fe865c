import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, concatBytes, hexToBytes } from '@noble/hashes/utils.js'
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

/** Hash of a stored entry as a leaf: over its canonical bytes, with all that the server added. */
export function storedLeaf(stored: unknown): Uint8Array {
  return leafHash(canonicalBytes(stored))
}

/** Root of a log as 64 hexadecimal digits; each stored entry is one leaf in its canonical bytes. */
export function logRoot(stored: readonly unknown[]): string {
  return bytesToHex(rootOf(stored.map(storedLeaf)))
}

/**
 * What a growing tree needs to keep of the leaves it has: how many there are, and the hash of each whole
 * subtree at its right edge, the largest first, as hexadecimal digits. One subtree a binary digit of `size`.
 */
export interface Frontier { size: number, peaks: string[] }

export const EMPTY_FRONTIER: Frontier = { size: 0, peaks: [] }

/** The frontier with one more leaf; a handful of hashes, however large the tree. @param leaf its hash, 32 bytes */
export function addLeaf({ size, peaks }: Frontier, leaf: Uint8Array): Frontier {
  const rest = [...peaks]
  let hash = leaf
  for (let level = size; level % 2 === 1; level = (level - 1) / 2) hash = nodeHash(hexToBytes(rest.pop()!), hash)
  return { size: size + 1, peaks: [...rest, bytesToHex(hash)] }
}

/** The root of all leaves of a frontier, 64 hexadecimal digits: the same as that of the whole tree (RFC 9162, 2.1.1). */
export function frontierRoot({ peaks }: Frontier): string {
  if (peaks.length === 0) return bytesToHex(rootOf([]))
  return bytesToHex(peaks.map(hexToBytes).reduceRight((right, left) => nodeHash(left, right)))
}

/** The frontier of a log, or of one that goes on from an earlier frontier. */
export function frontierOf(stored: readonly unknown[], from: Frontier = EMPTY_FRONTIER): Frontier {
  return stored.reduce<Frontier>((frontier, entry) => addLeaf(frontier, storedLeaf(entry)), from)
}
