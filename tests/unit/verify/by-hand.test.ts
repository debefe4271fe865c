/** docs/verify-by-hand.md does what it says: its own commands are run, with OpenSSL 3 (RFC 8032, RFC 9162, 2.1.1). */
import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { canonicalText } from '../../../shared/record/canonical'
import { recordText } from '../../../shared/record/record-document'
import type { RecordDocument } from '../../../shared/record/record-document'
import { documentOf, sealedRecord } from './records'

const page = readFileSync(new URL('../../../docs/verify-by-hand.md', import.meta.url), 'utf8')
const [cutOut, check, root] = [...page.matchAll(/```sh\n([\s\S]*?)```/g)].map(match => match[1]!)

let directory: string
let document: RecordDocument
const shell = (commands: string) => execFileSync('sh', ['-ec', commands], { cwd: directory, encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] })
const file = (name: string) => readFileSync(join(directory, name), 'utf8')
beforeAll(() => {
  directory = mkdtempSync(join(tmpdir(), 'by-hand-'))
  document = documentOf(sealedRecord(5))
  writeFileSync(join(directory, 'record.json'), recordText(document))
}, 60_000)
afterAll(() => rmSync(directory, { recursive: true }))

describe('verifying by hand', () => {
  it('cuts out what was signed, the signature and the key', () => {
    shell(cutOut!)
    const { entry, signature } = document.entries[4]!
    expect(file('signed.txt')).toBe(canonicalText(entry))
    expect(file('signature.txt')).toBe(signature)
    expect(file('key.txt')).toBe(document.signers.find(signer => signer.device === entry.device)!.publicKey)
  })

  it('verifies the signature, and finds a single letter that was changed', () => {
    expect(shell(check!)).toContain('Signature Verified Successfully')
    writeFileSync(join(directory, 'signed.txt'), file('signed.txt').replace('"kind":"', '"kind":"x'))
    expect(() => shell(check!)).toThrow()
  })

  it('verifies every other entry of the record alike', () => {
    for (const { seq } of document.entries.filter(stored => stored.seq % 7 === 1)) {
      shell(cutOut!.replace('\'5p\'', `'${seq}p'`).replace('"seq":5,', `"seq":${seq},`))
      expect(file('signed.txt')).toBe(canonicalText(document.entries[seq - 1]!.entry))
      expect(shell(check!)).toContain('Signature Verified Successfully')
    }
  })

  it('comes to the root that was sealed', () => {
    expect(shell(root!)).toBe(document.sealed!.root)
  })
}, 60_000)
