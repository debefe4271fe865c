/** Sealed records of about 60 entries to attack, and clean variations of them. Everything follows from a seed. */
import { privateKeyOf, publicKeyText, signBytes, verifierOf } from '../../../server/utils/record/keys'
import { sha256Hex } from '../../../shared/record/canonical'
import type { Checkpoint } from '../../../shared/record/checkpoint'
import { checkpointStatement, statementBytes } from '../../../shared/record/checkpoint'
import type { AnyEntry, StoredEntry } from '../../../shared/record/entry'
import { entryBytes, entryHash, isoTime } from '../../../shared/record/entry'
import { foldLog } from '../../../shared/record/fold'
import { addLeaf, EMPTY_FRONTIER, frontierRoot, storedLeaf } from '../../../shared/record/merkle'
import { PROGRAM_VERSION } from '../../../shared/program-version'
import type { RecordDocument } from '../../../shared/record/record-document'
import { recordDocument } from '../../../shared/record/record-document'
import type { CheckSignature } from '../../../shared/record/verify'
import { RecordWriter, recordOf, secondTechnician, technician, uuidFor } from '../../support/record'
import { BEGAN, DAIRY, goOn, opening, reading } from '../record/store'

/** Draws numbers: the same for the same seed. */
export type Draw = (below: number) => number

/** A small generator of 32 bits by counter and mixing, good enough to choose with; no published source. */
export function drawer(seed: number): Draw {
  let counter = seed >>> 0
  return (below) => {
    counter = (counter + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(counter ^ (counter >>> 15), counter | 1)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) % below
  }
}

export const pick = <T>(draw: Draw, list: readonly T[]): T => list[draw(list.length)]!
const SAYINGS = ['rain on the roof', 'door left open', 'näch­ste Runde', '“quoted” \\ and / slashed', 'Ελένη was here', '🧊 on top', 'tab\tand line\nbreak']

/** A whole outage with something of everything: a second technician, a refusal, a questioned entry, an odd clock. */
export function sealedRecord(seed: number): RecordWriter {
  const draw = drawer(seed)
  const writer = new RecordWriter(`outage ${seed}`, BEGAN + draw(1_000_000))
  const note = () => void writer.pass(0.2).sign(pick(draw, [technician, secondTechnician]), 'note-added', { words: `${pick(draw, SAYINGS)} ${draw(1000)}`.trim() }, { skew: draw(5) === 0 ? draw(900_000) : 0 })
  writer.sign(technician, 'outage-opened', opening())
  goOn(writer, 'plan', 'in-hand')
  note()
  writer.serverEntry('entry-refused', { device: technician.device, n: writer.state.chain[technician.device]!.n + 1, id: uuidFor(`refused ${seed}`), hash: sha256Hex(`refused ${seed}`), reason: 'the body is not written as its kind lays down' })
  goOn(writer, 'in-hand', 'dark')
  const odd = writer.pass(0.3).sign(technician, 'step-ticked', { step: 'nowhere', state: 'done' }, { expect: 'questioned' })
  const wrong = writer.pass(0.3).sign(technician, 'reading-taken', reading(DAIRY, 36 + draw(4)))
  if (draw(2) === 0) note()
  goOn(writer, 'dark', 'settle')
  writer.pass(0.2).sign(secondTechnician, 'correction', { corrects: wrong.id, reason: 'misread', reading: { value: 37 } })
  writer.pass(0.2).sign(secondTechnician, 'questioned-settled', { entry: odd.id, words: 'pressed the wrong line' })
  goOn(writer, 'settle', 'sealed')
  if (draw(3) === 0) writer.pass(60).sign(technician, 'note-added', { words: 'after the seal' }, { expect: 'questioned' })
  return writer
}

export const documentOf = (writer: RecordWriter): RecordDocument => structuredClone(recordOf(writer))

/** What the server would hand out of a log as far as it goes. */
export function documentUpTo(document: RecordDocument, size: number): RecordDocument {
  const entries = document.entries.slice(0, size)
  return recordDocument(foldLog(document.outage.id, entries), entries, { program: PROGRAM_VERSION, rulebook: document.rulebook.data, checkpoints: document.checkpoints.slice(0, size) })
}

const leaves = new WeakMap<object, Uint8Array>()
function leafOf(stored: StoredEntry): Uint8Array {
  const known = leaves.get(stored)
  if (known) return known
  const leaf = storedLeaf(stored)
  leaves.set(stored, leaf)
  return leaf
}

/** The root after each entry. */
export function rootsOf(entries: readonly StoredEntry[]): string[] {
  let frontier = EMPTY_FRONTIER
  return entries.map((stored) => {
    frontier = addLeaf(frontier, leafOf(stored))
    return frontierRoot(frontier)
  })
}

/** What a person can do who owns every key: a log written and signed anew under keys of their own, as if nothing had been. */
export function signedAnew(document: RecordDocument, seed: string, change: (entry: AnyEntry, index: number) => AnyEntry = entry => entry): RecordDocument {
  const keys = new Map(document.signers.map(({ device }) => [device, privateKeyOf(Buffer.from(sha256Hex(`${seed} ${device}`), 'hex'))]))
  const chains = new Map<string, { n: number, hash: string }>()
  const entries: StoredEntry[] = []
  const checkpoints: Checkpoint[] = []
  let frontier = EMPTY_FRONTIER
  for (const [index, { entry: before, receivedAt, standing, why }] of document.entries.entries()) {
    const entry = structuredClone(change(before, index))
    const chain = chains.get(entry.device)
    entry.n = (chain?.n ?? 0) + 1
    entry.prev = chain?.hash ?? null
    if (entry.kind === 'signer-named') entry.body.publicKey = publicKeyText(keys.get(entry.body.device)!)
    if (entry.kind === 'sealed' && standing === 'accepted') Object.assign(entry.body, { size: index, root: frontierRoot(frontier) })
    chains.set(entry.device, { n: entry.n, hash: entryHash(entry) })
    if (entry.kind === 'entry-refused') chains.set(entry.body.device, { n: entry.body.n, hash: entry.body.hash })
    const stored: StoredEntry = { entry, signature: signBytes(entryBytes(entry), keys.get(entry.device)!), seq: index + 1, receivedAt, standing, why }
    frontier = addLeaf(frontier, leafOf(stored))
    const server = document.checkpoints[index]!.statement.key
    const statement = checkpointStatement(stored, frontierRoot(frontier), server)
    checkpoints.push({ statement, signature: signBytes(statementBytes(statement), keys.get(server)!) })
    entries.push(stored)
  }
  return recordDocument(foldLog(document.outage.id, entries), entries, { program: PROGRAM_VERSION, rulebook: document.rulebook.data, checkpoints })
}

/** A clean record of the same story: other keys, other times, other words. */
export function variation(document: RecordDocument, seed: number): RecordDocument {
  const draw = drawer(seed)
  const shift = draw(40) * 86_400_000 + draw(86_400_000)
  return signedAnew(document, `variation ${seed}`, (entry) => {
    const moved = { ...entry, at: isoTime(Date.parse(entry.at) + shift) } as AnyEntry
    return moved.kind === 'note-added' ? { ...moved, body: { ...moved.body, words: `${pick(draw, SAYINGS)} ${draw(10_000)}` } } : moved
  })
}

const verified = new WeakMap<Uint8Array, Map<string, boolean>>()
const verifiers = new Map<string, ReturnType<typeof verifierOf>>()

/** Signatures by node:crypto, each asked once: the bytes of an untouched entry are the same object each time. */
export const checkOnce: CheckSignature = (publicKey, signature, bytes) => {
  const known = verified.get(bytes) ?? new Map<string, boolean>()
  verified.set(bytes, known)
  const name = `${publicKey} ${signature}`
  if (!known.has(name)) {
    if (!verifiers.has(publicKey)) verifiers.set(publicKey, verifierOf(publicKey))
    known.set(name, verifiers.get(publicKey)!(bytes, signature))
  }
  return known.get(name)!
}
