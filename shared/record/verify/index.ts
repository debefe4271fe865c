import type { StoredEntry } from '../entry'
import { SERVER } from '../entry'
import { applyStored } from '../fold'
import type { BodyOf } from '../kinds'
import { isServerKind } from '../kinds'
import { EMPTY_FRONTIER, addLeaf, frontierRoot } from '../merkle'
import { asNewest } from '../newest'
import { recordDocument, RECORD_VERSION } from '../record-document'
import { RULES } from '../rules'
import type { Actor } from '../rules'
import type { OutageState } from '../state'
import { emptyState, FOLD_VERSION } from '../state'
import { canonicalText } from '../canonical'
import type { RecordFault, Verification, VerifiedFacts, VerifiedSeal, VerifiedSigner } from './result'
import type { RecordHead } from './shape'
import { readCheckpoint, readItem, recordHeadSchema } from './shape'
import type { CheckSignature } from './signatures'

/** How a verification goes: what signs, and the root that was sent out when the record was sealed, if it is at hand. */
export interface VerifyOptions { check: CheckSignature, root?: string | null }

/** One record under verification: what is known so far of its signers, chains and tree. */
class Walk {
  readonly faults: RecordFault[] = []
  readonly signers = new Map<string, BodyOf<'signer-named'>>()
  readonly named: VerifiedSigner[] = []
  seal: VerifiedSeal | null = null
  frontier = EMPTY_FRONTIER
  /** false once a leaf could not be hashed, or a checkpoint showed that the tree is another */
  treeHolds = true
  hashed = true
  private readonly chains = new Map<string, { n: number, hash: string }>()
  private readonly ids = new Set<string>()
  private readonly checkpoints = new Map<number, unknown>()
  private readonly signatures: { fault: RecordFault, good: boolean | Promise<boolean> }[] = []
  private readonly firstCheckpoint: number

  constructor(readonly head: RecordHead, private readonly check: CheckSignature) {
    for (const item of head.checkpoints) {
      const size = (item as { statement?: { size?: unknown } } | null)?.statement?.size
      if (typeof size !== 'number' || !Number.isInteger(size) || size < 1) this.fault(null, 'checkpoints', 'one of them has not the form of a checkpoint')
      else if (this.checkpoints.has(size)) this.fault(null, 'checkpoints', `there are two of size ${size}`)
      else this.checkpoints.set(size, item)
    }
    this.firstCheckpoint = Math.min(...this.checkpoints.keys())
    if (head.checkpoints.length > 0 && Math.max(...this.checkpoints.keys()) > head.entries.length) this.fault(null, 'checkpoints', `the server signed that there are ${Math.max(...this.checkpoints.keys())} entries, and here are ${head.entries.length}: the rest is gone`)
  }

  private fault(stored: StoredEntry | null, field: string, why: string): void {
    this.faults.push({ seq: stored?.seq ?? null, id: stored?.entry.id ?? null, field, why })
  }

  /** @param place of the item in the document, from 1 */
  take(item: unknown, place: number): void {
    const found = readItem(item)
    if (found.fault) {
      this.treeHolds = this.hashed = false
      const id = (item as { entry?: { id?: unknown } } | null)?.entry?.id
      this.faults.push({ seq: place, id: typeof id === 'string' ? id : null, ...found.fault })
      return
    }
    const { stored, bytes, hash, leaf } = found
    if (stored.seq !== place) this.faults.push({ seq: place, id: stored.entry.id, field: 'seq', why: `it says ${stored.seq}, and it stands at place ${place}` })
    if (stored.entry.outage !== this.head.outage.id) this.fault(stored, 'outage', 'it belongs to another outage')
    if (this.ids.has(stored.entry.id)) this.fault(stored, 'id', 'the same id stands before it')
    this.ids.add(stored.entry.id)
    this.takeChain(stored, hash)
    this.takeSigner(stored, bytes)
    if (this.hashed) this.takeTree(stored, leaf)
  }

  /** The device's own count and the hash of its entry before; a refused one has its place through the entry that says so. */
  private takeChain(stored: StoredEntry, hash: string): void {
    const { device, n, prev } = stored.entry
    const before = this.chains.get(device)
    if (n !== (before?.n ?? 0) + 1) this.fault(stored, 'n', `it is its device's entry ${n}, and the one before is ${before?.n ?? 'missing'}`)
    if (prev !== (before?.hash ?? null)) this.fault(stored, 'prev', 'it does not name the hash of its device\'s entry before')
    this.chains.set(device, { n, hash })
    if (stored.entry.kind !== 'entry-refused') return
    const { body } = stored.entry
    if (body.n !== (this.chains.get(body.device)?.n ?? 0) + 1) this.fault(stored, 'body.n', `it takes the place ${body.n} in its device's chain, which is not the next`)
    this.chains.set(body.device, { n: body.n, hash: body.hash })
  }

  /** The key that the log names for the device, who holds it, and what they may sign. */
  private takeSigner(stored: StoredEntry, bytes: Uint8Array): void {
    const { entry } = stored
    // The server's own first entry names the server itself; nobody else does.
    if (entry.kind === 'signer-named' && entry.by === SERVER && entry.body.device === entry.device && !this.signers.has(entry.device)) this.name(stored, entry.body)
    const signer = this.signers.get(entry.device)
    if (!signer) return this.fault(stored, 'device', 'no entry before it names its signer and key')
    if (signer.person !== entry.by) this.fault(stored, 'by', `its device belongs to ${signer.name}`)
    this.signatures.push({ fault: { seq: stored.seq, id: entry.id, field: 'signature', why: `it does not fit the key of ${signer.name}` }, good: this.check(signer.publicKey, stored.signature, bytes) })
    if (isServerKind(entry.kind) ? signer.role !== 'server' : signer.role === 'server' || !RULES[entry.kind].roles.includes(signer.role)) this.fault(stored, 'by', `${signer.name} (${signer.role}) may not sign "${entry.kind}"`)
    const count = this.named.findLast(named => named.device === entry.device)
    if (count) count.entries++
    if (entry.kind === 'signer-named' && entry.body.device !== entry.device) this.name(stored, entry.body)
  }

  private name(stored: StoredEntry, body: BodyOf<'signer-named'>): void {
    const before = this.signers.get(body.device)
    if (before && (before.publicKey !== body.publicKey || before.person !== body.person)) this.fault(stored, 'body.publicKey', 'the same device had another key or owner before')
    if ((body.person === SERVER) !== (body.role === 'server')) this.fault(stored, 'body.role', 'only Holdover itself is a server')
    this.signers.set(body.device, body)
    this.named.push({ ...body, seq: stored.seq, entries: 0 })
  }

  private takeTree(stored: StoredEntry, leaf: Uint8Array): void {
    const { entry, standing } = stored
    if (entry.kind === 'sealed' && standing === 'accepted') this.takeSeal(stored, entry.body)
    this.frontier = addLeaf(this.frontier, leaf)
    this.takeCheckpoint(stored)
  }

  /** The server's word on the log with this entry in it. Behind the first that does not fit all others would fail alike. */
  private takeCheckpoint(stored: StoredEntry): void {
    const size = this.frontier.size
    if (!this.treeHolds || size < this.firstCheckpoint) return
    const wrong = (why: string) => {
      this.treeHolds = false
      this.fault(stored, 'checkpoint', why)
    }
    if (!this.checkpoints.has(size)) return wrong('the server\'s checkpoint of it is missing')
    const found = readCheckpoint(this.checkpoints.get(size))
    if (!found) return wrong('it has not the form of a checkpoint')
    const { statement, signature } = found.checkpoint
    if (statement.outage !== this.head.outage.id) return wrong('it is of another outage')
    const key = this.signers.get(statement.key)
    if (key?.role !== 'server') return wrong('no entry names the server\'s key that signed it')
    if (statement.root !== frontierRoot(this.frontier) || statement.time !== stored.receivedAt) return wrong('the root that the server signed when it stored this entry is another: this entry, or what the server noted beside it (seq, receivedAt, standing, why), was changed')
    const good = this.check(key.publicKey, signature, found.bytes)
    if (good === false) return wrong('its signature does not fit the server\'s key')
    if (good !== true) this.signatures.push({ fault: { seq: stored.seq, id: stored.entry.id, field: 'checkpoint', why: 'its signature does not fit the server\'s key' }, good })
  }

  private takeSeal(stored: StoredEntry, body: BodyOf<'sealed'>): void {
    const { entry } = stored
    if (this.seal) return this.fault(stored, 'kind', 'the record is sealed already')
    if (body.size !== this.frontier.size) this.fault(stored, 'body.size', `the seal is over ${body.size} entries, and ${this.frontier.size} stand before it`)
    else if (body.root !== frontierRoot(this.frontier)) this.fault(stored, 'body.root', 'the root of the entries before the seal is not the one that was sealed')
    this.seal = { seq: stored.seq, id: entry.id, at: new Date(Date.parse(entry.at) - entry.skew).toISOString(), by: entry.by, name: this.signers.get(entry.device)?.name ?? entry.by, size: body.size, root: body.root }
  }

  /** Waits for the signatures, then puts the faults in the order of the log. */
  async settle(): Promise<void> {
    // Some checks answer at once; waiting for those too would cost more than they do.
    for (const { fault, good } of this.signatures) if (!(typeof good === 'boolean' ? good : await good)) this.faults.push(fault)
    this.faults.sort((a, b) => (a.seq ?? Infinity) - (b.seq ?? Infinity) || Number(a.field === 'checkpoint') - Number(b.field === 'checkpoint'))
  }
}

/**
 * Verifies a record: pure but for the signatures that `check` is asked about.
 * @param document record.json, parsed
 */
export async function verifyRecord(document: unknown, { check, root = null }: VerifyOptions): Promise<Verification> {
  const parsed = recordHeadSchema.safeParse(document)
  if (!parsed.success) return noRecord(document)
  const head = parsed.data
  if (head.version > RECORD_VERSION) return { verdict: 'no-record', faults: [{ seq: null, id: null, field: 'version', why: `it was written by a newer program (version ${head.version} of the format; this one reads up to ${RECORD_VERSION})` }], facts: null, notes: [] }
  const walk = new Walk(head, check)
  head.entries.forEach((item, index) => walk.take(item, index + 1))
  await walk.settle()
  const state = walk.faults.length === 0 ? foldStrictly(walk) : null
  const own = walk.hashed ? frontierRoot(walk.frontier) : null
  if (own !== null && walk.treeHolds) headFaults(walk, own, state)
  const facts = factsOf(walk, own, state)
  if (walk.faults.length > 0) return { verdict: 'fails', faults: walk.faults, facts, notes: [] }
  return { verdict: verdictOf(walk.seal, root), faults: [], facts, notes: notesOf(walk, facts, root) }
}

function noRecord(document: unknown): Verification {
  const format = (document as { format?: unknown } | null)?.format
  const why = format === 'holdover-record' ? 'its fields are not those of a record' : 'this is no record that Holdover wrote'
  return { verdict: 'no-record', faults: [{ seq: null, id: null, field: 'format', why }], facts: null, notes: [] }
}

/** Folds the log, asking of each entry whether its signer might sign it at all as things stood (I10 among it). */
function foldStrictly(walk: Walk): OutageState | null {
  const state = emptyState(walk.head.outage.id)
  for (const stored of walk.head.entries as StoredEntry[]) {
    const signed = asNewest(stored.entry)
    const actor = { id: signed.by, role: state.signers[signed.device]?.role } as Actor
    const rule = RULES[signed.kind] as { forbids?: (state: OutageState, entry: typeof signed, actor: Actor) => string | null }
    try {
      const forbidden = rule.forbids?.(state, signed, actor)
      if (forbidden) walk.faults.push({ seq: stored.seq, id: signed.id, field: 'by', why: forbidden })
      applyStored(state, stored)
    } catch {
      walk.faults.push({ seq: stored.seq, id: signed.id, field: 'body', why: 'the log does not fold with this entry in it' })
      return null
    }
  }
  return state
}

/** What is gathered at the head of the document must be what the entries say. */
function headFaults(walk: Walk, root: string, state: OutageState | null): void {
  const { head } = walk
  const differs = (field: string, why: string) => void walk.faults.push({ seq: null, id: null, field, why })
  if (head.size !== head.entries.length) differs('size', `it says ${head.size} entries, and there are ${head.entries.length}`)
  if (head.root !== root) differs('root', 'it is not the root of the entries')
  if (!state) return
  const right = recordDocument(state, head.entries as StoredEntry[], { program: '', rulebook: null, checkpoints: [] })
  if (canonicalText(head.sealed) !== canonicalText(right.sealed)) differs('sealed', 'it is not what the entries say')
  if (head.versions?.fold !== FOLD_VERSION) return
  for (const field of ['outage', 'signers', 'refusals'] as const) if (canonicalText(head[field] ?? null) !== canonicalText(right[field])) differs(field, 'it is not what the entries say')
  const { id, version, name } = (head.rulebook ?? {}) as Record<string, unknown>
  if (canonicalText({ id, version, name }) !== canonicalText(state.snapshot.rulebook)) differs('rulebook', 'it is not the one that the entries name')
}

function factsOf(walk: Walk, root: string | null, state: OutageState | null): VerifiedFacts {
  const outage = walk.head.outage as { id: string, code?: unknown, site?: { name?: unknown, timeZone?: unknown }, controller?: { name?: unknown } }
  const text = (value: unknown) => typeof value === 'string' ? value : ''
  return {
    version: walk.head.version,
    outage: { id: outage.id, code: state?.code ?? (text(outage.code) || null), site: state?.snapshot.site.name ?? text(outage.site?.name), timeZone: state?.snapshot.site.timeZone ?? 'UTC', controller: state?.snapshot.controller.name ?? text(outage.controller?.name) },
    size: walk.head.entries.length,
    root: root ?? '',
    checkpoints: walk.head.checkpoints.length,
    seal: walk.seal,
    afterSeal: walk.seal ? walk.head.entries.length - walk.seal.seq : 0,
    signers: walk.named,
  }
}

function verdictOf(seal: VerifiedSeal | null, root: string | null): Verification['verdict'] {
  if (root === null) return seal ? 'whole' : 'not-sealed'
  return seal?.root === root ? 'the-sealed-one' : 'another'
}

function notesOf(walk: Walk, facts: VerifiedFacts, root: string | null): string[] {
  const notes: string[] = []
  if (root !== null && !facts.seal) notes.push('A root was given, but this record is not sealed: it ends before the seal, or it is another record.')
  if (root !== null && facts.seal && facts.seal.root !== root) notes.push(`The root that was given is not that of its seal (${facts.seal.root}). Either the root belongs to another record, or everything was signed anew with other keys.`)
  if (root === null && facts.seal) notes.push('Give the root from the closing e-mail to learn whether it is the very record that was sealed: whoever owns the database could have signed everything anew with keys of their own, and the record alone cannot show that.')
  if (facts.afterSeal > 0) notes.push(`${facts.afterSeal} ${facts.afterSeal === 1 ? 'entry stands' : 'entries stand'} behind the seal, which does not cover ${facts.afterSeal === 1 ? 'it' : 'them'}; the server's checkpoints do.`)
  if (facts.checkpoints === 0) notes.push('It carries no checkpoints of the server (it is older than those): whether entries behind the seal, or the time at which the seal itself was received, were changed does not show.')
  const servers = facts.signers.filter(signer => signer.role === 'server').length
  if (servers > 1) notes.push(`${servers} keys of the server signed in it: its key was changed on the way. The server lists its keys under /api/server-keys.`)
  return notes
}

export * from './result'
export * from './root-text'
export * from './signatures'
