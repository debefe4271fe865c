#!/usr/bin/env node
// Verifies a record of Holdover: `node scripts/verify.mjs record.json [root]` (or the PDF that carries it).
// One file of plain Node 20 that shares no code with the program, written after docs/record-format.md alone.
// Ends with 0 (whole in itself; or the one that was sealed), 1 (it fails, or is another), 2 (not read as a record).
// It does not judge whether a body is as its kind lays down, nor fold the log; the page /verify does that too.
import { createHash, createPublicKey, verify } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { pathToFileURL } from 'node:url'
import { inflateSync } from 'node:zlib'

const WORDS = {
  'the-sealed-one': 'the one that was sealed',
  'whole': 'whole in itself',
  'not-sealed': 'whole in itself, not sealed',
  'another': 'whole in itself, but not the one that was sealed',
  'fails': 'fails',
  'no-record': 'not a record',
}
/** Kinds by which somebody has a part in the plan or submits, and so may not seal. */
const OWN = ['outage-opened', 'plan-changed', 'plan-submitted', 'submitted']

/**
 * Canonical JSON (RFC 8785).
 * @param {unknown} value
 * @returns {string}
 */
export function canonical(value) {
  if (value === null || typeof value === 'boolean') return String(value)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new TypeError('JSON has no such number')
    return JSON.stringify(value)
  }
  if (typeof value === 'string') {
    if (!value.isWellFormed()) throw new TypeError('half a surrogate pair stands alone')
    return JSON.stringify(value)
  }
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`
  if (typeof value !== 'object') throw new TypeError('JSON has no such value')
  return `{${Object.keys(value).sort().map(name => `${canonical(name)}:${canonical(value[name])}`).join(',')}}`
}

/** @param {...(string | Uint8Array)} parts */
const sha256 = (...parts) => parts.reduce((hash, part) => hash.update(part), createHash('sha256')).digest()

/** Adds a leaf to the whole subtrees at the right edge of a tree (RFC 9162, 2.1.1). @param {{ size: number, hash: Buffer }[]} stack @param {string} text */
function grow(stack, text) {
  stack.push({ size: 1, hash: sha256(Uint8Array.of(0), text) })
  while (stack.length > 1 && stack.at(-1).size === stack.at(-2).size) {
    const right = stack.pop()
    const left = stack.pop()
    stack.push({ size: left.size * 2, hash: sha256(Uint8Array.of(1), left.hash, right.hash) })
  }
}

/** @param {{ hash: Buffer }[]} stack */
const rootOf = stack => stack.length === 0 ? sha256().toString('hex') : stack.map(tree => tree.hash).reduceRight((right, left) => sha256(Uint8Array.of(1), left, right)).toString('hex')

/** Public keys of small order fit signatures that nobody made: y = 0, 1, -1 and two of order eight, with their unreduced spellings. */
const WEAK = ['00'.repeat(32), `01${'00'.repeat(31)}`, `ec${'ff'.repeat(30)}7f`, `ed${'ff'.repeat(30)}7f`, `ee${'ff'.repeat(30)}7f`, '26e8958fc2b227b045c3f489f2ef98f0d5dfac05d3c63339b13802886d53fc05', 'c7176a703d4dd84fba3c0b760d10670f2a2053fa2c39ccc64ec7fd7792ac037a']

/** @type {Map<string, import('node:crypto').KeyObject | null>} */
const keys = new Map()
/** @param {string} text 32 bytes in base64url */
function keyOf(text) {
  if (!keys.has(text)) {
    const raw = Buffer.from(String(text), 'base64url')
    const y = Buffer.from(raw)
    if (y.length === 32) y[31] &= 0x7F
    let key = null
    try {
      if (raw.length === 32 && !WEAK.includes(y.toString('hex'))) key = createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: text }, format: 'jwk' })
    } catch { /* no key: nothing fits it */ }
    keys.set(text, key)
  }
  return keys.get(text)
}

/** Whether a signature fits. @param {string} publicKey @param {string} signature @param {string} text */
function fits(publicKey, signature, text) {
  const key = keyOf(publicKey)
  const mark = Buffer.from(String(signature), 'base64url')
  return key !== null && mark.length === 64 && verify(null, Buffer.from(text), key, mark)
}

/** What is wrong with the form of an item, or ''. @param {any} item */
function formFault(item) {
  const names = (value, expected) => typeof value === 'object' && value !== null && canonical(Object.keys(value).sort()) === canonical(expected)
  if (!names(item, ['entry', 'receivedAt', 'seq', 'signature', 'standing', 'why'])) return 'it has not the fields of an entry'
  const { entry, standing, why, receivedAt } = item
  if (!names(entry, ['at', 'body', 'by', 'device', 'id', 'kind', 'n', 'outage', 'prev', 'skew', 'v'])) return 'it has not the fields of what is signed'
  const isTime = text => typeof text === 'string' && !Number.isNaN(Date.parse(text)) && new Date(text).toISOString() === text
  if (!isTime(entry.at) || !isTime(receivedAt)) return 'a time is not written as UTC with milliseconds'
  if (!Array.isArray(why) || !(standing === 'accepted' ? why.length === 0 : standing === 'questioned' && why.length > 0)) return 'its standing and the reasons for it do not agree'
  return ''
}

/**
 * Verifies a record.
 * @param {any} document record.json, parsed
 * @param {string | null} [root] the root that was sent out when it was sealed, 64 hexadecimal digits
 * @returns {{ verdict: string, faults: { seq: number | null, id: string | null, field: string, why: string }[], seal: any, size: number, root: string, signers: any[], notes: string[] }}
 */
export function verifyRecord(document, root = null) {
  const none = { seal: null, size: 0, root: '', signers: [], notes: [] }
  const isRecord = document?.format === 'holdover-record' && Array.isArray(document.entries) && document.entries.length > 0 && (document.checkpoints === undefined || Array.isArray(document.checkpoints))
  if (!isRecord) return { verdict: 'no-record', faults: [{ seq: null, id: null, field: 'format', why: 'this is no record that Holdover wrote' }], ...none }
  if (!(document.version === 1 || document.version === 2)) return { verdict: 'no-record', faults: [{ seq: null, id: null, field: 'version', why: `version ${document.version} of the format is not known here` }], ...none }

  /** @type {{ seq: number | null, id: string | null, field: string, why: string }[]} */
  const faults = []
  const { entries, checkpoints = [] } = document
  const bySize = new Map(checkpoints.map(checkpoint => [checkpoint?.statement?.size, checkpoint]))
  const first = checkpoints.length === 0 ? Infinity : Math.min(...bySize.keys())
  if (bySize.size !== checkpoints.length || !checkpoints.every(checkpoint => Number.isInteger(checkpoint?.statement?.size) && checkpoint.statement.size > 0)) faults.push({ seq: null, id: null, field: 'checkpoints', why: 'one of them has not the form of a checkpoint, or stands twice' })
  if (Math.max(0, ...bySize.keys()) > entries.length) faults.push({ seq: null, id: null, field: 'checkpoints', why: `the server signed that there are ${Math.max(...bySize.keys())} entries, and here are ${entries.length}: the rest is gone` })

  const signers = new Map()
  const chains = new Map()
  const ids = new Set()
  const own = new Set()
  const named = []
  const stack = []
  let seal = null
  let treeHolds = true

  for (const [index, item] of entries.entries()) {
    const place = index + 1
    const fault = (field, why) => faults.push({ seq: place, id: typeof item?.entry?.id === 'string' ? item.entry.id : null, field, why })
    let text = ''
    let leaf = ''
    try {
      const form = formFault(item)
      if (form) { fault('entry', form); treeHolds = false; continue }
      text = canonical(item.entry)
      leaf = canonical(item)
    } catch (error) { fault('entry', `it has no canonical form: ${error.message}`); treeHolds = false; continue }
    const { entry, signature } = item
    const { body } = entry

    if (item.seq !== place) fault('seq', `it says ${item.seq}, and it stands at place ${place}`)
    if (entry.outage !== document.outage?.id) fault('outage', 'it belongs to another outage')
    if (ids.has(entry.id)) fault('id', 'the same id stands before it')
    ids.add(entry.id)

    const before = chains.get(entry.device)
    if (entry.n !== (before?.n ?? 0) + 1) fault('n', `it is its device's entry ${entry.n}, and the one before is ${before?.n ?? 'missing'}`)
    if (entry.prev !== (before?.hash ?? null)) fault('prev', 'it does not name the hash of its device\'s entry before')
    chains.set(entry.device, { n: entry.n, hash: sha256(text).toString('hex') })
    if (entry.kind === 'entry-refused') {
      if (body.n !== (chains.get(body.device)?.n ?? 0) + 1) fault('body.n', 'it takes a place in its device\'s chain that is not the next')
      chains.set(body.device, { n: body.n, hash: body.hash })
    }

    const name = () => {
      const known = signers.get(body.device)
      if (known && (known.publicKey !== body.publicKey || known.person !== body.person)) fault('body.publicKey', 'the same device had another key or owner before')
      signers.set(body.device, body)
      named.push(body)
    }
    const namesItself = entry.kind === 'signer-named' && entry.by === 'server' && body.device === entry.device
    if (namesItself && !signers.has(entry.device)) name()
    const signer = signers.get(entry.device)
    if (!signer) fault('device', 'no entry before it names its signer and key')
    else {
      if (!fits(signer.publicKey, signature, text)) fault('signature', `it does not fit the key of ${signer.name}`)
      if (signer.person !== entry.by) fault('by', `its device belongs to ${signer.name}`)
      if ((entry.kind === 'signer-named' || entry.kind === 'entry-refused') && signer.role !== 'server') fault('by', `only Holdover itself signs "${entry.kind}"`)
      if (entry.kind === 'signer-named' && !namesItself) name()
    }

    if (item.standing === 'accepted' && OWN.includes(entry.kind)) own.add(entry.by)
    if (item.standing === 'accepted' && entry.kind === 'sealed') {
      if (seal) fault('kind', 'the record is sealed already')
      if (signer?.role !== 'supervisor') fault('by', 'the countersigner is no supervisor')
      if (own.has(entry.by)) fault('by', 'the countersigner planned or submitted it themselves')
      if (treeHolds && body.size !== index) fault('body.size', `the seal is over ${body.size} entries, and ${index} stand before it`)
      else if (treeHolds && body.root !== rootOf(stack)) fault('body.root', 'the root of the entries before the seal is not the one that was sealed')
      seal = { seq: item.seq, at: new Date(Date.parse(entry.at) - entry.skew).toISOString(), by: entry.by, name: signer?.name, size: body.size, root: body.root }
    }

    grow(stack, leaf)
    if (place <= first - 1) continue
    const checkpoint = bySize.get(place)
    const statement = checkpoint?.statement
    const key = signers.get(statement?.key)
    if (!checkpoint) fault('checkpoint', 'the server\'s checkpoint of it is missing')
    else if (key?.role !== 'server') fault('checkpoint', 'no entry names the server\'s key that signed it')
    else if (statement.type !== 'holdover-checkpoint' || statement.outage !== document.outage?.id) fault('checkpoint', 'it is of another outage')
    else if (!fits(key.publicKey, checkpoint.signature, canonical(statement))) fault('checkpoint', 'its signature does not fit the server\'s key')
    else if (treeHolds && (statement.root !== rootOf(stack) || statement.time !== item.receivedAt)) {
      fault('checkpoint', 'the root that the server signed when it stored this entry is another: this entry, or what the server noted beside it, was changed')
      treeHolds = false
    }
  }

  const whole = rootOf(stack)
  if (treeHolds) {
    if (document.size !== entries.length) faults.push({ seq: null, id: null, field: 'size', why: `it says ${document.size} entries, and there are ${entries.length}` })
    if (document.root !== whole) faults.push({ seq: null, id: null, field: 'root', why: 'it is not the root of the entries' })
    const told = document.sealed ?? null
    if ((told === null) !== (seal === null) || (told && canonical([told.seq, told.at, told.by, told.size, told.root]) !== canonical([seal.seq, seal.at, seal.by, seal.size, seal.root]))) faults.push({ seq: null, id: null, field: 'sealed', why: 'it is not what the entries say' })
  }
  faults.sort((a, b) => (a.seq ?? Infinity) - (b.seq ?? Infinity) || Number(a.field === 'checkpoint') - Number(b.field === 'checkpoint'))
  const notes = []
  if (seal && entries.length > seal.seq) notes.push(`${entries.length - seal.seq} entries stand behind the seal, which does not cover them; the server's checkpoints do.`)
  if (checkpoints.length === 0) notes.push('It carries no checkpoints of the server: a change behind the seal, or of the time at which the seal was received, does not show.')
  const verdict = faults.length > 0 ? 'fails' : root === null ? (seal ? 'whole' : 'not-sealed') : seal?.root === root ? 'the-sealed-one' : 'another'
  if (verdict === 'whole') notes.push('Give the root from the closing e-mail as well: the record alone cannot show that everything was not signed anew with other keys.')
  return { verdict, faults, seal, size: entries.length, root: whole, signers: named, notes }
}

/** The record.json that a PDF carries. @param {Buffer} pdf @returns {string} */
export function recordInPdf(pdf) {
  const text = pdf.toString('latin1')
  for (const found of text.matchAll(/\d+ \d+ obj\b/g)) {
    const begins = text.indexOf('stream', found.index)
    const ends = text.indexOf('endobj', found.index)
    if (begins < 0 || ends < 0 || begins > ends) continue
    const dictionary = text.slice(found.index, begins)
    if (!/\/Type\s*\/EmbeddedFile\b/.test(dictionary)) continue
    const from = begins + 'stream'.length + (text[begins + 6] === '\r' ? 2 : 1)
    const length = /\/Length\s+(\d+)(?!\s+\d+\s+R)/.exec(dictionary)
    const bytes = pdf.subarray(from, length ? from + Number(length[1]) : text.indexOf('endstream', from))
    return (/\/FlateDecode\b/.test(dictionary) ? inflateSync(bytes) : bytes).toString('utf8')
  }
  throw new Error('this PDF carries no record.json')
}

function main([path, ...rest]) {
  if (!path) { process.stderr.write('node scripts/verify.mjs record.json|record.pdf [root]\n'); return 2 }
  const root = rest.join('').replace(/[\s:-]/g, '').toLowerCase() || null
  if (root !== null && !/^[0-9a-f]{64}$/.test(root)) { process.stderr.write(`A root has 64 digits of 0 to 9 and a to f; this one: ${root}\n`); return 2 }
  let document
  try {
    const bytes = readFileSync(path)
    document = JSON.parse(bytes.subarray(0, 5).toString('latin1') === '%PDF-' ? recordInPdf(bytes) : bytes.toString('utf8'))
  } catch (error) {
    process.stderr.write(`${WORDS['no-record']}: ${error.message}\n`)
    return 2
  }
  const { verdict, faults, seal, size, root: own, signers, notes } = verifyRecord(document, root)
  const lines = [WORDS[verdict]]
  for (const { seq, id, field, why } of faults.slice(0, 10)) lines.push(seq === null ? `${field}: ${why}` : `at entry ${seq} (${id}), ${field}: ${why}`)
  if (faults.length > 10) lines.push(`and ${faults.length - 10} more, most of them because of the first`)
  if (verdict !== 'no-record') lines.push(`outage ${document.outage?.code ?? document.outage?.id}, ${size} entries, root ${own}`)
  if (seal) lines.push(`sealed by ${seal.name} on ${seal.at} over ${seal.size} entries, root ${seal.root}`)
  for (const { name, role, deviceName, publicKey, enrolledAt } of signers) lines.push(`signer: ${name}, ${role}, ${deviceName}, key ${publicKey}, enrolled ${enrolledAt}`)
  process.stdout.write(`${[...lines, ...notes].join('\n')}\n`)
  return verdict === 'no-record' ? 2 : verdict === 'fails' || verdict === 'another' ? 1 : 0
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) process.exit(main(process.argv.slice(2)))
