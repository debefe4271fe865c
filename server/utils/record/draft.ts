import { eq } from 'drizzle-orm'
import type { Checkpoint } from '../../../shared/record/checkpoint'
import { checkpointStatement, statementBytes } from '../../../shared/record/checkpoint'
import type { AnyEntry, Standing, StoredEntry } from '../../../shared/record/entry'
import { isoTime, SERVER } from '../../../shared/record/entry'
import { applyStored } from '../../../shared/record/fold'
import type { BodyOf, ServerKind } from '../../../shared/record/kinds'
import { newestVersion } from '../../../shared/record/kinds'
import type { Frontier } from '../../../shared/record/merkle'
import { addLeaf, EMPTY_FRONTIER, frontierRoot } from '../../../shared/record/merkle'
import { pointsInHand } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import { openVoices } from '../../../shared/record/voice'
import { emptyState, FOLD_VERSION } from '../../../shared/record/state'
import { uuidv7 } from '../../../shared/record/uuid'
import { devices, entries, outages, people } from '../../database/schema'
import type { Person } from '../access'
import type { Queries } from '../database'
import { keepFacts } from '../insights/keep'
import { saveSearch } from '../records/save'
import type { HeldFold } from './folds'
import { signBytes } from './keys'
import type { OutageRow } from './log'
import { readFrontier, readState } from './log'
import type { ServerSigner } from './server-signer'
import type { SignedText } from './signed-text'
import { leafOf, signedTextOf } from './signed-text'

/** An outage being written under its row's lock: state, frontier and newest checkpoint go along with each entry that is added. */
export interface Draft {
  db: Queries
  state: OutageState
  frontier: Frontier
  checkpoint: Checkpoint | null
  signer: ServerSigner
  now: number
  /** rows of added entries, stored together by `saveProjection` */
  rows: (typeof entries.$inferInsert)[]
  /** what the cached fold in the row says; null: it is to be written whatever has changed */
  cached: CachedFold | null
}

/** Of the cached fold in a row: how many entries it counts, and what lists read off it. */
interface CachedFold { size: number, phase: OutageState['phase'], planSubmitted: boolean, voices: string }

/** The cached fold, which is long, is written once it lacks this many entries, or a list would show another thing. */
const ENTRIES_BEHIND = 48

/** A draft of an outage as its locked row has it; null for one that is still to be opened. */
export async function draftOf(db: Queries, outageId: string, row: OutageRow | null, signer: ServerSigner, now: number): Promise<Draft> {
  if (!row) return { db, state: emptyState(outageId), frontier: EMPTY_FRONTIER, checkpoint: null, signer, now, rows: [], cached: null }
  const cached = row.foldVersion === FOLD_VERSION && row.state.size <= row.size ? cachedFold(row.state) : null
  return { db, state: await readState(db, row), frontier: await readFrontier(db, row), checkpoint: row.checkpoint, signer, now, rows: [], cached }
}

/** A draft that goes on from a fold which this process held, whose log is known to end there. What lists read off the row is what the fold says: each write sees to that. */
export function draftFrom(db: Queries, held: HeldFold, signer: ServerSigner, now: number): Draft {
  const { state, frontier, checkpoint, cachedSize } = held
  return { db, state, frontier, checkpoint, signer, now, rows: [], cached: cachedSize === null ? null : { ...cachedFold(state), size: cachedSize } }
}

/** What a process may hold of a draft that is stored for good; null where its log has no checkpoint to know it again by. */
export function heldAfter({ state, frontier, checkpoint, cached }: Draft): HeldFold | null {
  return checkpoint === null ? null : { state, frontier, checkpoint, cachedSize: cached?.size ?? null }
}

const cachedFold = (state: OutageState): CachedFold => ({ size: state.size, phase: state.phase, planSubmitted: state.planSubmitted !== null, voices: openVoiceIds(state) })

/** Adds a signed entry to the log and to the state; its row is stored with the projection, in the same transaction. */
export async function addEntry(draft: Draft, entry: AnyEntry, signed: SignedText, signature: string, standing: Standing, why: string[]): Promise<StoredEntry> {
  await nameSigner(draft, entry)
  const stored: StoredEntry = { entry, signature, seq: draft.state.size + 1, receivedAt: isoTime(draft.now), standing, why }
  draft.frontier = addLeaf(draft.frontier, leafOf(signed, stored))
  draft.checkpoint = signCheckpoint(draft, stored)
  draft.rows.push({
    outageId: entry.outage, seq: stored.seq, id: entry.id, kind: entry.kind,
    personId: entry.by === SERVER ? null : entry.by, deviceId: entry.device, n: entry.n,
    hash: signed.hash, signed: signed.text, signature, receivedAt: new Date(draft.now), standing, why, checkpoint: draft.checkpoint,
  })
  applyStored(draft.state, stored, signed.hash)
  return stored
}

/** The server's word on the log as it stands with its last entry. */
function signCheckpoint({ frontier, signer }: Draft, last: StoredEntry): Checkpoint {
  const statement = checkpointStatement(last, frontierRoot(frontier), signer.device)
  return { statement, signature: signBytes(statementBytes(statement), signer.key) }
}

/** Signs and adds an entry of the server's own. */
export async function addServerEntry<K extends ServerKind>(draft: Draft, kind: K, body: BodyOf<K>): Promise<StoredEntry> {
  const chain = draft.state.chain[draft.signer.device]
  const entry = {
    v: newestVersion(kind), id: uuidv7(draft.now), outage: draft.state.id, kind, body, at: isoTime(draft.now), skew: 0,
    by: SERVER, device: draft.signer.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null,
  } as AnyEntry
  const signed = signedTextOf(entry)
  return addEntry(draft, entry, signed, signBytes(signed.bytes, draft.signer.key), 'accepted', [])
}

/** A signer's printed name, role and key enter the log before their first entry; the server, which names others, names itself first. */
async function nameSigner(draft: Draft, entry: AnyEntry): Promise<void> {
  const { signer } = draft
  if (!draft.state.signers[signer.device] && !namesDevice(entry, signer.device)) {
    await addServerEntry(draft, 'signer-named', { device: signer.device, deviceName: 'Holdover server', person: SERVER, name: 'Holdover', role: 'server', publicKey: signer.publicKey, enrolledAt: signer.enrolledAt.toISOString() })
  }
  if (entry.device !== signer.device && !draft.state.signers[entry.device]) await nameDevice(draft, entry.device)
}

/** Names a signer anew whose printed name or role is no longer what the log says, so that each signature stands under what it was signed as. */
export async function renameSigner(draft: Draft, person: Person, device: string): Promise<void> {
  const known = draft.state.signers[device]
  if (known && (known.name !== person.name || known.role !== person.role)) await nameDevice(draft, device)
}

async function nameDevice(draft: Draft, id: string): Promise<void> {
  const [row] = await draft.db.select({ device: devices, person: people }).from(devices).innerJoin(people, eq(people.id, devices.personId)).where(eq(devices.id, id))
  const { device, person } = row!
  await addServerEntry(draft, 'signer-named', { device: device.id, deviceName: device.name, person: person.id, name: person.name, role: person.role, publicKey: device.publicKey, enrolledAt: device.enrolledAt.toISOString() })
}

function namesDevice(entry: AnyEntry, device: string): boolean {
  return entry.kind === 'signer-named' && entry.body.device === device
}

/** Stores the added entries, and writes the projection that lists and screens read. */
export async function saveProjection(draft: Draft): Promise<void> {
  if (draft.rows.length > 0) await draft.db.insert(entries).values(draft.rows)
  await saveSearch(draft.db, draft.state, draft.rows)
  await draft.db.update(outages).set({
    ...projectionOf(draft),
    ...(isFoldNear(draft) ? {} : { state: draft.state, foldVersion: FOLD_VERSION }),
  }).where(eq(outages.id, draft.state.id))
  await keepFacts(draft.db, draft.state, draft.cached?.phase ?? null, draft.now)
  markSaved(draft)
}

/** What a draft knows of its row, once its entries and projection are written. */
export function markSaved(draft: Draft): void {
  draft.rows = []
  if (!isFoldNear(draft)) draft.cached = cachedFold(draft.state)
}

/** Whether the cached fold in the row may stay as it is for now. */
export function isFoldNear({ state, cached }: Draft): boolean {
  return cached !== null && state.size - cached.size < ENTRIES_BEHIND && cached.phase === state.phase && cached.planSubmitted === (state.planSubmitted !== null) && cached.voices === openVoiceIds(state)
}

/** What an outage's row says of its log beside the cached fold. */
export function projectionOf({ state, frontier, checkpoint, now }: Draft) {
  const dark = state.darks.at(-1) // the present time without control, or the last one
  const ended = state.sealed?.mark.at ?? state.calledOff?.mark.at ?? null
  return {
    phase: state.phase,
    size: state.size,
    frontier,
    checkpoint,
    workKind: state.plan.workKind.name,
    pointsInHand: pointsInHand(state).length,
    startsAt: state.plan.startsAt ? new Date(state.plan.startsAt) : null,
    darkAt: dark ? new Date(dark.from) : null,
    endedAt: ended === null ? null : new Date(ended),
    updatedAt: new Date(now),
  }
}

/** Decisions by voice that wait for a signature: lists read them off the cached fold. */
function openVoiceIds(state: OutageState): string {
  return openVoices(state).map(voice => voice.entry).join()
}
