/** What somebody with full rights over the database, but without the keys, can do to a sealed record. */
import type { Checkpoint } from '../../../shared/record/checkpoint'
import type { StoredEntry } from '../../../shared/record/entry'
import { entryHash, isoTime } from '../../../shared/record/entry'
import type { RecordDocument } from '../../../shared/record/record-document'
import { uuidFor } from '../../support/record'
import type { Draw } from './records'
import { documentUpTo, pick, rootsOf, signedAnew } from './records'

/**
 * How far the traces are wiped: not at all; the heading made to fit; the checkpoints too, but for their
 * signatures; or all checkpoints taken away.
 */
export type Tidy = 'not' | 'heading' | 'checkpoints' | 'stripped'

export interface Attack {
  kind: string
  document: RecordDocument
  tidy: Tidy
  /** the entry that must be named, where the attack concerns one */
  seq: number | null
  /** what must be said */
  outcome: 'fails' | 'not-sealed' | 'another'
}

const TIDY: readonly Tidy[] = ['not', 'not', 'not', 'heading', 'heading', 'checkpoints', 'stripped']
type Field = keyof StoredEntry['entry']
const sealOf = (document: RecordDocument) => document.sealed!.seq

/** The document with other entries, its traces wiped as far as said. */
function withEntries(document: RecordDocument, entries: StoredEntry[], tidy: Tidy): RecordDocument {
  if (tidy === 'not') return { ...document, entries }
  const roots = rootsOf(entries)
  const seal = entries.find(({ entry, standing }) => entry.kind === 'sealed' && standing === 'accepted')
  const body = seal?.entry.kind === 'sealed' ? seal.entry.body : null
  const sealed = seal && body ? { seq: seal.seq, at: isoTime(Date.parse(seal.entry.at) - seal.entry.skew), by: seal.entry.by, size: body.size, root: body.root } : null
  const heading = { ...document, entries, size: entries.length, root: roots.at(-1)!, sealed }
  if (tidy === 'stripped') return { ...heading, checkpoints: [] }
  if (tidy === 'heading') return heading
  const checkpoints = entries.map((stored, index): Checkpoint => {
    const old = document.checkpoints[index] ?? document.checkpoints.at(-1)!
    const { root, time, size } = old.statement
    return root === roots[index] && time === stored.receivedAt && size === index + 1 ? old : { ...old, statement: { ...old.statement, size: index + 1, root: roots[index]!, time: stored.receivedAt } }
  })
  return { ...heading, checkpoints }
}

const replaced = (document: RecordDocument, seq: number, change: (stored: StoredEntry) => StoredEntry) => document.entries.map(stored => stored.seq === seq ? change(stored) : stored)
const numbered = (entries: readonly StoredEntry[]) => entries.map((stored, index) => stored.seq === index + 1 ? stored : { ...stored, seq: index + 1 })

/** Another value of the same type somewhere in a body; a body without any gets a field more. */
function changedBody(body: object, draw: Draw): object {
  const copy = structuredClone(body) as Record<string, unknown>
  let at: Record<string, unknown> = copy
  for (;;) {
    const names = Object.keys(at)
    if (names.length === 0) { at.more = 1; return copy }
    const name = pick(draw, names)
    const value = at[name]
    if (typeof value === 'object' && value !== null && Object.keys(value).length > 0) { at = value as Record<string, unknown>; continue }
    at[name] = typeof value === 'number' ? value + 1 : typeof value === 'boolean' ? !value : typeof value === 'string' ? `${value}x` : 'x'
    return copy
  }
}

const CHANGES: Partial<Record<Field, (stored: StoredEntry, draw: Draw) => unknown>> = {
  body: ({ entry }, draw) => changedBody(entry.body, draw),
  at: ({ entry }, draw) => isoTime(Date.parse(entry.at) + 1 + draw(60_000)),
  by: (_stored, draw) => uuidFor(`somebody ${draw(1000)}`),
  skew: ({ entry }, draw) => entry.skew + 1 + draw(1000),
  device: (_stored, draw) => uuidFor(`some device ${draw(1000)}`),
  id: (_stored, draw) => uuidFor(`some id ${draw(100_000)}`),
  n: ({ entry }, draw) => entry.n + 1 + draw(3),
  prev: (_stored, draw) => String(draw(10)).repeat(64),
  kind: ({ entry }) => entry.kind === 'note-added' ? 'question-asked' : 'note-added',
  outage: (_stored, draw) => uuidFor(`another outage ${draw(1000)}`),
}

function editSigned(document: RecordDocument, draw: Draw): Attack {
  const field = pick(draw, ['body', 'body', 'body', 'at', 'at', 'by', 'by', 'skew', 'device', 'id', 'n', 'prev', 'kind', 'outage'] as const)
  const seq = 1 + draw(document.size)
  const tidy = pick(draw, TIDY)
  const entries = replaced(document, seq, stored => ({ ...stored, entry: { ...stored.entry, [field]: CHANGES[field]!(stored, draw) } as StoredEntry['entry'] }))
  return { kind: `edit ${field}`, document: withEntries(document, entries, tidy), tidy, seq, outcome: 'fails' }
}

function editSignature(document: RecordDocument, draw: Draw): Attack {
  const seq = 1 + draw(document.size)
  const at = draw(85)
  const tidy = pick(draw, TIDY)
  const entries = replaced(document, seq, stored => ({ ...stored, signature: `${stored.signature.slice(0, at)}${stored.signature[at] === 'A' ? 'B' : 'A'}${stored.signature.slice(at + 1)}` }))
  return { kind: 'edit signature', document: withEntries(document, entries, tidy), tidy, seq, outcome: 'fails' }
}

/** What the server noted beside an entry; with every checkpoint gone the seal alone shows it, and that something before it was changed. */
function editNoted(document: RecordDocument, draw: Draw): Attack {
  const field = pick(draw, ['standing', 'receivedAt', 'why'] as const)
  const tidy = pick(draw, TIDY)
  const seq = 1 + draw(tidy === 'stripped' ? sealOf(document) - 1 : document.size)
  const entries = replaced(document, seq, (stored) => {
    if (field === 'receivedAt') return { ...stored, receivedAt: isoTime(Date.parse(stored.receivedAt) + 1 + draw(600_000)) }
    if (field === 'why' && stored.standing === 'questioned') return { ...stored, why: ['for another reason'] }
    return stored.standing === 'accepted' ? { ...stored, standing: 'questioned', why: ['it does not fit'] } : { ...stored, standing: 'accepted', why: [] }
  })
  return { kind: `edit ${field}`, document: withEntries(document, entries, tidy), tidy, seq: tidy === 'stripped' ? sealOf(document) : seq, outcome: 'fails' }
}

function deleteOne(document: RecordDocument, draw: Draw): Attack {
  const seq = 1 + draw(sealOf(document) - 1)
  const tidy = pick(draw, TIDY)
  const rest = document.entries.filter(stored => stored.seq !== seq)
  const renumber = draw(3) > 0
  const entries = renumber ? numbered(rest) : rest
  return { kind: 'delete', document: withEntries(document, entries, tidy), tidy, seq: tidy === 'stripped' && renumber ? null : seq, outcome: 'fails' }
}

function insertOne(document: RecordDocument, draw: Draw): Attack {
  const seq = 1 + draw(document.size)
  const tidy = pick(draw, TIDY)
  const copied = pick(draw, document.entries)
  const forged = draw(2) === 0 ? copied : { ...copied, entry: { ...copied.entry, id: uuidFor(`forged ${draw(1_000_000)}`) } }
  const entries = numbered([...document.entries.slice(0, seq - 1), { ...forged, seq }, ...document.entries.slice(seq - 1)])
  // A copy put right before the entry that it was taken from stands in that one's place; the next is then the double.
  // So it does further up too, where its device signed nothing between and no checkpoint is left to tell.
  const between = document.entries.slice(seq - 1, copied.seq - 1)
  const stands = forged === copied && (copied.seq === seq || (copied.seq > seq && tidy === 'stripped' && between.every(({ entry }) => entry.device !== copied.entry.device)))
  const place = stands ? copied.seq + 1 : seq
  return { kind: 'insert', document: withEntries(document, entries, tidy), tidy, seq: place, outcome: 'fails' }
}

function reorder(document: RecordDocument, draw: Draw): Attack {
  const first = 1 + draw(sealOf(document) - 2)
  const second = first + 1 + draw(sealOf(document) - 1 - first)
  const tidy = pick(draw, TIDY)
  const entries = [...document.entries]
  ;[entries[first - 1], entries[second - 1]] = [entries[second - 1]!, entries[first - 1]!]
  return { kind: 'reorder', document: withEntries(document, numbered(entries), tidy), tidy, seq: tidy === 'stripped' ? null : first, outcome: 'fails' }
}

function cutTail(document: RecordDocument, draw: Draw): Attack {
  const size = 1 + draw(sealOf(document) - 1)
  const wiped = draw(2) === 0
  const entries = document.entries.slice(0, size)
  // Cut with its checkpoints it is what the log once was: it says of itself that it is not sealed.
  return wiped
    ? { kind: 'cut the tail', document: documentUpTo(document, size), tidy: 'heading', seq: null, outcome: 'not-sealed' }
    : { kind: 'cut the tail', document: withEntries(document, entries, 'heading'), tidy: 'heading', seq: null, outcome: 'fails' }
}

function dropDevice(document: RecordDocument, draw: Draw): Attack {
  const sealer = document.entries[sealOf(document) - 1]!.entry.device
  const device = pick(draw, document.signers.map(signer => signer.device).filter(item => item !== sealer))
  const tidy = pick(draw, TIDY)
  const first = document.entries.find(({ entry }) => entry.device === device)!.seq
  const entries = numbered(document.entries.filter(({ entry }) => entry.device !== device))
  return { kind: 'drop a device', document: withEntries(document, entries, tidy), tidy, seq: tidy === 'stripped' ? null : first, outcome: 'fails' }
}

function swapOutages(document: RecordDocument, draw: Draw, other: RecordDocument): Attack {
  const tidy = pick(draw, TIDY)
  const from = draw(2) === 0 ? 1 : 1 + draw(Math.min(document.size, other.size))
  const entries = [...document.entries.slice(0, from - 1), ...other.entries.slice(from - 1)]
  return { kind: 'swap two outages', document: withEntries(document, entries, tidy), tidy, seq: from, outcome: 'fails' }
}

function rollBack(document: RecordDocument, draw: Draw): Attack {
  return { kind: 'roll back', document: documentUpTo(document, 1 + draw(sealOf(document) - 1)), tidy: 'not', seq: null, outcome: 'not-sealed' }
}

/** An edit with every hash after it made to fit: the device's chain, the seal's root, the heading, the checkpoints. */
function rehash(document: RecordDocument, draw: Draw): Attack {
  const seq = 1 + draw(sealOf(document) - 1)
  const chains = new Map<string, string>()
  const entries: StoredEntry[] = []
  for (const stored of document.entries) {
    let { entry } = stored
    if (stored.seq === seq) entry = { ...entry, body: changedBody(entry.body, draw) } as StoredEntry['entry']
    const prev = chains.get(entry.device)
    if (prev !== undefined && prev !== entry.prev) entry = { ...entry, prev }
    if (entry.kind === 'sealed' && stored.standing === 'accepted') entry = { ...entry, body: { ...entry.body, root: rootsOf(entries).at(-1)! } }
    chains.set(entry.device, entryHash(entry))
    if (entry.kind === 'entry-refused') chains.set(entry.body.device, entry.body.hash)
    entries.push(entry === stored.entry ? stored : { ...stored, entry })
  }
  return { kind: 're-hash everything', document: withEntries(document, entries, 'checkpoints'), tidy: 'checkpoints', seq, outcome: 'fails' }
}

function otherKey(document: RecordDocument, draw: Draw): Attack {
  const { seq } = pick(draw, document.signers)
  const tidy = pick(draw, TIDY)
  const entries = replaced(document, seq, stored => ({ ...stored, entry: { ...stored.entry, body: { ...stored.entry.body, publicKey: document.signers[draw(document.signers.length)]!.publicKey.split('').reverse().join('').replace(/.$/, 'A') } } as StoredEntry['entry'] }))
  return { kind: 'another key', document: withEntries(document, entries, tidy), tidy, seq, outcome: 'fails' }
}

function editCheckpoint(document: RecordDocument, draw: Draw): Attack {
  const index = draw(document.size)
  const old = document.checkpoints[index]!
  const way = draw(4)
  const changed = way === 0 ? { ...old, signature: document.checkpoints[(index + 1) % document.size]!.signature } : { ...old, statement: { ...old.statement, ...(way === 1 ? { root: 'a'.repeat(64) } : { time: isoTime(Date.parse(old.statement.time) + 1) }) } }
  const last = index === document.size - 1
  const checkpoints = way === 3 && !last && index > 0 ? document.checkpoints.filter(item => item !== old) : document.checkpoints.map(item => item === old ? changed : item)
  return { kind: 'edit a checkpoint', document: { ...document, checkpoints }, tidy: 'not', seq: index + 1, outcome: 'fails' }
}

function editHeading(document: RecordDocument, draw: Draw): Attack {
  const changes: Partial<RecordDocument>[] = [
    { root: 'b'.repeat(64) }, { size: document.size + 1 }, { sealed: null }, { sealed: { ...document.sealed!, root: 'c'.repeat(64) } }, { sealed: { ...document.sealed!, by: uuidFor('somebody') } },
    { outage: { ...document.outage, code: `X-${draw(1000)}` } }, { signers: document.signers.slice(1) }, { refusals: [] }, { rulebook: { ...document.rulebook, version: 'another' } },
  ]
  return { kind: 'edit the heading', document: { ...document, ...pick(draw, changes) }, tidy: 'not', seq: null, outcome: 'fails' }
}

function signAnew(document: RecordDocument, draw: Draw): Attack {
  const at = draw(sealOf(document) - 1)
  const edited = signedAnew(document, `attacker ${draw(1000)}`, (entry, index) => index === at ? { ...entry, at: isoTime(Date.parse(entry.at) + 60_000) } as StoredEntry['entry'] : entry)
  return { kind: 're-sign under new keys', document: edited, tidy: 'checkpoints', seq: null, outcome: 'another' }
}

const CHEAP: ((document: RecordDocument, draw: Draw, other: RecordDocument) => Attack)[] = [
  editSigned, editSigned, editSigned, editSignature, editNoted, editNoted, deleteOne, insertOne, reorder, dropDevice, swapOutages, rehash, otherKey, editCheckpoint, editHeading,
]
/** Each of these writes or folds a whole log, and there is little to vary: one in fifty. */
const COSTLY = [cutTail, rollBack, signAnew]

/** One attack on one of the records. @param number of the attack */
export function attackOn(documents: readonly RecordDocument[], number: number, draw: Draw): Attack {
  const document = pick(draw, documents)
  const other = pick(draw, documents.filter(item => item !== document))
  return (number % 50 === 0 ? pick(draw, COSTLY) : pick(draw, CHEAP))(document, draw, other)
}
