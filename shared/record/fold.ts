import { applyAccepted, applyQuestioned } from './effects'
import type { AnyEntry, StoredEntry } from './entry'
import { entryHash, happenedAt } from './entry'
import { asNewest } from './newest'
import type { Mark, OutageState } from './state'
import { emptyState } from './state'

/**
 * The state of an outage after its entries: pure and deterministic, the same code on the phone and
 * on the server.
 * @param entries stored entries in the order of `seq`
 * @param from a state to go on from; it is not changed
 */
export function fold(entries: readonly StoredEntry[], from: OutageState): OutageState {
  const state = structuredClone(from)
  const last = new Map<string, AnyEntry>()
  for (const stored of entries) {
    if (stored.seq > state.size) last.set(stored.entry.device, stored.entry)
    applyStored(state, stored, PASSING)
  }
  for (const [device, entry] of last) if (state.chain[device]!.hash === PASSING) state.chain[device]!.hash = entryHash(entry)
  return state
}

/** In place of a hash that the device's next entry takes away again: only the last one's is worked out, as hashing takes longer than all else. */
const PASSING = ''

/** The state of a whole log. @param id the outage's id */
export function foldLog(id: string, entries: readonly StoredEntry[]): OutageState {
  return fold(entries, emptyState(id))
}

/**
 * Applies one entry to a draft that the caller owns. An entry already applied changes nothing.
 * @param hash of the entry, where the caller has it
 */
export function applyStored(state: OutageState, stored: StoredEntry, hash?: string): void {
  if (stored.seq <= state.size) return
  const { entry } = stored
  state.size = stored.seq
  state.heard[entry.device] = { at: Date.parse(stored.receivedAt), until: state.heard[entry.device]?.until ?? null }
  const mark: Mark = { by: entry.by, at: happenedAt(entry), seq: stored.seq, entry: entry.id }
  const read = asNewest(entry)
  if (stored.standing === 'accepted') applyAccepted(state, read, mark)
  else applyQuestioned(state, { ...stored, entry: read }, mark)
  state.chain[entry.device] = { n: entry.n, hash: hash ?? entryHash(entry) }
  for (const file of filesOf(entry)) if (!state.files.includes(file)) state.files.push(file)
  if (Math.abs(entry.skew) > (state.largestSkew?.ms ?? 0)) state.largestSkew = { ms: Math.abs(entry.skew), device: entry.device }
}

/** Hashes of the photos and drawings that an entry names. */
export function filesOf(entry: AnyEntry): string[] {
  const body: Record<string, unknown> = entry.body
  const photos = Array.isArray(body.photos) ? body.photos.filter((file): file is string => typeof file === 'string') : []
  return typeof body.drawing === 'string' ? [...photos, body.drawing] : photos
}
