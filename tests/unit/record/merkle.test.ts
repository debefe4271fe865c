/** Roots of Certificate Transparency's test tree (RFC 6962 and RFC 9162, 2.1.1). */
import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { canonicalText } from '../../../shared/record/canonical'
import { leafHash, logRoot, nodeHash, rootOf } from '../../../shared/record/merkle'
import { storyTo } from './store'

const LEAVES = ['', '00', '10', '2021', '3031', '40414243', '5051525354555657', '606162636465666768696a6b6c6d6e6f']
const ROOTS = [
  'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855',
  '6e340b9cffb37a989ca544e6bb780a2c78901d3fb33738768511a30617afa01d',
  'fac54203e7cc696cf0dfcb42c92a1d9dbaf70ad9e621f4bd8d98662f00e3c125',
  'aeb6bcfe274b70a14fb067a5e5578264db0fa9b51af5e0ba159158f329e06e77',
  'd37ee418976dd95753c1c73862b9398fa2a2cf9b4ff0fdfe8b30cd95209614b7',
  '4e3bbb1f7b478dcfe71fb631631519a3bca12c9aefca1612bfce4c13a86264d4',
  '76e67dadbcdf1e10e1b74ddc608abd2f98dfb16fbce75277b5232a127f2087ef',
  'ddb89be403809e325750d3d263cd78929c2942b7942a34b77e122c9594a74c8c',
  '5dc9da79a70659a9ad559cb701ded9a2ab9d823aad2f4960cfe370eff4604328',
]

/** The root a second way, sharing no code with the product: a stack of whole subtrees. */
function rootByStack(leaves: Buffer[]): string {
  const hash = (...parts: Buffer[]) => createHash('sha256').update(Buffer.concat(parts)).digest()
  const stack: { size: number, hash: Buffer }[] = []
  for (const leaf of leaves) {
    stack.push({ size: 1, hash: hash(Buffer.of(0), leaf) })
    while (stack.length > 1 && stack.at(-1)!.size === stack.at(-2)!.size) {
      const right = stack.pop()!
      const left = stack.pop()!
      stack.push({ size: left.size * 2, hash: hash(Buffer.of(1), left.hash, right.hash) })
    }
  }
  const tops = stack.map(top => top.hash)
  return (tops.length === 0 ? hash() : tops.reduceRight((right, left) => hash(Buffer.of(1), left, right))).toString('hex')
}

describe('Merkle root', () => {
  it.each(ROOTS.map((root, size) => [size, root] as const))('of the first %i leaves', (size, root) => {
    const leaves = LEAVES.slice(0, size).map(hex => Buffer.from(hex, 'hex'))
    expect(Buffer.from(rootOf(leaves.map(leafHash))).toString('hex')).toBe(root)
    expect(rootByStack(leaves)).toBe(root)
  })

  it.each([0, 31, 33, 64])('refuses a hash of %i bytes on either side', (length) => {
    expect(() => nodeHash(new Uint8Array(length), new Uint8Array(32))).toThrow('exactly 32 bytes')
    expect(() => nodeHash(new Uint8Array(32), new Uint8Array(length))).toThrow('exactly 32 bytes')
  })

  it('of a log is that of the canonical bytes of its stored entries', () => {
    const { entries } = storyTo('dark')
    for (const size of [0, 1, 2, 3, entries.length - 1, entries.length]) {
      expect(logRoot(entries.slice(0, size))).toBe(rootByStack(entries.slice(0, size).map(entry => Buffer.from(canonicalText(entry)))))
    }
  })

  it('changes when any stored entry changes', () => {
    const { entries } = storyTo('in-hand')
    const whole = logRoot(entries)
    for (let index = 0; index < entries.length; index++) {
      expect(logRoot(entries.map((entry, at) => at === index ? { ...entry, standing: 'questioned' } : entry))).not.toBe(whole)
    }
  })
})
