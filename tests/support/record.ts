/** Writes records as the server does: entries signed with real Ed25519 keys, judged, numbered and folded. Nothing random. */
import { marginAt } from '../../server/utils/hold/margin'
import { handBackAfter, planRefusals } from '../../server/utils/order/for-outage'
import { rulebookById } from '../../server/utils/holding'
import { actNeeded, holdsAgain } from '../../server/utils/hold/act-needed'
import { assessCase } from '../../server/utils/holding/for-outage'
import { plantChanges } from '../../server/utils/record/plant-entries'
import { privateKeyOf, publicKeyText, signBytes } from '../../server/utils/record/keys'
import { PROGRAM_VERSION } from '../../shared/program-version'
import { sha256Hex } from '../../shared/record/canonical'
import type { Checkpoint } from '../../shared/record/checkpoint'
import { checkpointStatement, statementBytes } from '../../shared/record/checkpoint'
import type { AnyEntry, Entry, Standing, StoredEntry } from '../../shared/record/entry'
import { entryBytes, entryHash, isoTime, SERVER } from '../../shared/record/entry'
import { applyStored } from '../../shared/record/fold'
import type { BodyInput, BodyOf, EntryKind, ServerKind } from '../../shared/record/kinds'
import { newestVersion, schemaOf } from '../../shared/record/kinds'
import type { Frontier } from '../../shared/record/merkle'
import { addLeaf, EMPTY_FRONTIER, frontierRoot, logRoot, storedLeaf } from '../../shared/record/merkle'
import type { RecordDocument } from '../../shared/record/record-document'
import { recordDocument } from '../../shared/record/record-document'
import { judge } from '../../shared/record/rules'
import type { Surroundings } from '../../shared/record/rules'
import { watchedCases } from '../../shared/record/select'
import type { OutageState } from '../../shared/record/state'
import { emptyState } from '../../shared/record/state'
import type { Role } from '../../shared/schemas/people'

/** A person with a device, and the key on it. */
export interface TestSigner {
  id: string
  name: string
  role: Role | 'server'
  device: string
  deviceName: string
  publicKey: string
  sign: (bytes: Uint8Array) => string
}

/** A UUIDv7 that depends on nothing but its words and the time. @param now Unix ms */
export function uuidFor(words: string, now = Date.UTC(2026, 0, 1)): string {
  const time = now.toString(16).padStart(12, '0')
  const hash = sha256Hex(words)
  return `${time.slice(0, 8)}-${time.slice(8, 12)}-7${hash.slice(0, 3)}-8${hash.slice(3, 6)}-${hash.slice(6, 18)}`
}

export function testSigner(name: string, role: TestSigner['role'], deviceName = 'Phone'): TestSigner {
  const key = privateKeyOf(Buffer.from(sha256Hex(`key of ${name} on ${deviceName}`), 'hex'))
  return {
    id: role === 'server' ? SERVER : uuidFor(`person ${name}`), name, role, deviceName,
    device: uuidFor(`device ${name} ${deviceName}`),
    publicKey: publicKeyText(key),
    sign: bytes => signBytes(bytes, key),
  }
}

export const technician = testSigner('Ada Quill', 'technician')
export const secondTechnician = testSigner('Bram Oster', 'technician')
export const supervisor = testSigner('Ines Calloway', 'supervisor', 'Desk')
export const server = testSigner('Holdover', 'server', 'Holdover server')

export interface SignOptions {
  /** the device's last measured difference from the server, ms; its clock shows that much more */
  skew?: number
  /** the standing that the entry must get; another one is an error */
  expect?: Standing
}

/** One outage being written. `now` is the server's clock, Unix ms. */
export class RecordWriter {
  readonly id: string
  readonly entries: StoredEntry[] = []
  /** the server's word after each entry */
  readonly checkpoints: Checkpoint[] = []
  readonly state: OutageState
  /** bytes of photos and drawings that have come, by SHA-256 */
  readonly files = new Map<string, Uint8Array>()
  now: number
  private count = 0
  private frontier: Frontier = EMPTY_FRONTIER

  constructor(name: string, now: number) {
    this.id = uuidFor(`outage ${name}`)
    this.state = emptyState(this.id)
    this.now = now
  }

  /** Lets time go by. */
  pass(minutes: number): this {
    this.now += Math.round(minutes * 60_000)
    return this
  }

  /** Keeps a file as if it had been sent. Gives its hash. */
  keep(bytes: Uint8Array): string {
    const hash = sha256Hex(bytes)
    this.files.set(hash, bytes)
    return hash
  }

  /**
   * Signs an entry now and adds it, with the server's own entries that follow from it.
   * @throws Error where it is refused, its body is wrong, or its standing is not the expected one
   */
  sign<K extends EntryKind>(signer: TestSigner, kind: K, body: BodyInput<K>, { skew = 0, expect = 'accepted' }: SignOptions = {}): Entry<K> {
    if (signer.role === 'server') throw new Error('The server signs by serverEntry')
    const entry = this.entryOf(signer, kind, schemaOf(kind, newestVersion(kind))!.parse(body) as BodyOf<K>, skew)
    const judged = judge(this.state, entry as AnyEntry, { id: signer.id, role: signer.role }, this.around(kind))
    if (judged.standing !== expect) throw new Error(`${kind} is ${judged.standing}: ${judged.why.join('; ')}`)
    this.nameSigner(signer)
    // Where the signer had first to be named, the chain of the device is as it was: names are the server's.
    this.store(entry as AnyEntry, signer, judged.standing, judged.why)
    if (kind === 'outage-opened' && expect === 'accepted') this.serverEntry('outage-numbered', { code: `${this.state.snapshot.site.code}-0041` })
    this.followUp()
    return entry
  }

  /** An entry of the server's own. */
  serverEntry<K extends ServerKind>(kind: K, body: BodyOf<K>): void {
    if (kind !== 'signer-named') this.nameSigner(server)
    this.store(this.entryOf(server, kind, body, 0) as AnyEntry, server, 'accepted', [])
  }

  private entryOf<K extends EntryKind>(signer: TestSigner, kind: K, body: BodyOf<K>, skew: number): Entry<K> {
    const chain = this.state.chain[signer.device]
    return { v: newestVersion(kind), id: uuidFor(`${this.id} entry ${this.count++}`, this.now), outage: this.id, kind, body, at: isoTime(this.now + skew), skew, by: signer.id, device: signer.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null }
  }

  private store(entry: AnyEntry, signer: TestSigner, standing: Standing, why: string[]): void {
    const stored: StoredEntry = { entry, signature: signer.sign(entryBytes(entry)), seq: this.entries.length + 1, receivedAt: isoTime(this.now), standing, why }
    this.entries.push(stored)
    this.frontier = addLeaf(this.frontier, storedLeaf(stored))
    const statement = checkpointStatement(stored, frontierRoot(this.frontier), server.device)
    this.checkpoints.push({ statement, signature: server.sign(statementBytes(statement)) })
    applyStored(this.state, stored)
  }

  private nameSigner(signer: TestSigner): void {
    if (this.state.signers[signer.device]) return
    if (signer !== server) this.nameSigner(server)
    const { device, deviceName, id: person, name, role, publicKey } = signer
    this.serverEntry('signer-named', { device, deviceName, person, name, role, publicKey, enrolledAt: isoTime(Date.UTC(2026, 0, 5)) })
  }

  private around(kind: EntryKind): Surroundings {
    return {
      planRefusals,
      handBackAfter,
      margin: marginAt,
      filesAwaited: state => state.files.filter(file => !this.files.has(file)),
      root: kind === 'sealed' ? logRoot(this.entries) : null,
    }
  }

  /** Warnings of the plant and verdicts that changed, as the server enters them. */
  private followUp(): void {
    for (const body of plantChanges(this.state, this.now)) this.serverEntry('plant-warned', body)
    if (this.state.darks.length === 0 || this.state.phase === 'sealed' || this.state.phase === 'submitted') return
    for (const item of watchedCases(this.state)) {
      const judged = item.empty ? null : assessCase(this.state, item.id, this.now)
      if (judged && judged.verdict !== (item.verdict?.verdict ?? 'within')) {
        this.serverEntry('verdict-changed', {
          caseId: item.id, verdict: judged.verdict, deadline: judged.deadline === null ? null : isoTime(Date.parse(judged.deadline)),
          minutesAbove: judged.minutesAbove.careful, clause: judged.clause, source: judged.source, act: judged.act, why: judged.why, judgedAt: isoTime(this.now),
        })
      }
      const again = holdsAgain(this.state, item.id, this.now)
      if (again !== null) this.serverEntry('act-lapsed', { caseId: item.id, holdMinutes: again === 'forever' ? null : again, judgedAt: isoTime(this.now) })
      const need = actNeeded(this.state, item.id, this.now, judged)
      if (need && !need.entered && (need.cause === 'deadline-near' || need.cause === 'hold-short')) this.serverEntry('act-opened', { caseId: item.id, cause: need.cause, deadline: need.deadline === null ? null : isoTime(need.deadline), openedAt: isoTime(this.now) })
    }
  }
}

/** record.json of a written record. */
export function recordOf({ state, entries, checkpoints }: RecordWriter): RecordDocument {
  const { id, version } = state.snapshot.rulebook
  return recordDocument(state, entries, { program: PROGRAM_VERSION, rulebook: rulebookById(id, version) ?? null, checkpoints })
}

/** Hash that a log's last entry of a device has, for checks of its chain. */
export function lastHash(entries: readonly StoredEntry[], device: string): string | null {
  const last = entries.filter(stored => stored.entry.device === device).at(-1)
  return last ? entryHash(last.entry) : null
}
