import { eq } from 'drizzle-orm'
import type { AnyEntry, Standing, StoredEntry } from '../../../shared/record/entry'
import { entryBytes, isoTime, SERVER } from '../../../shared/record/entry'
import { applyStored } from '../../../shared/record/fold'
import type { BodyOf, ServerKind } from '../../../shared/record/kinds'
import { newestVersion } from '../../../shared/record/kinds'
import { pointsInHand } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import { FOLD_VERSION } from '../../../shared/record/state'
import { canonicalText, sha256Hex } from '../../../shared/record/canonical'
import { uuidv7 } from '../../../shared/record/uuid'
import { devices, entries, outages, people } from '../../database/schema'
import type { Queries } from '../database'
import { signBytes } from './keys'
import type { ServerSigner } from './server-signer'

/** An outage being written under its row's lock: the state goes along with each entry that is added. */
export interface Draft { db: Queries, state: OutageState, signer: ServerSigner, now: number }

/** Adds a signed entry to the log and to the state. */
export async function addEntry(draft: Draft, entry: AnyEntry, signature: string, standing: Standing, why: string[]): Promise<StoredEntry> {
  await nameSigner(draft, entry)
  const stored: StoredEntry = { entry, signature, seq: draft.state.size + 1, receivedAt: isoTime(draft.now), standing, why }
  const signed = canonicalText(entry)
  await draft.db.insert(entries).values({
    outageId: entry.outage, seq: stored.seq, id: entry.id, kind: entry.kind,
    personId: entry.by === SERVER ? null : entry.by, deviceId: entry.device, n: entry.n,
    hash: sha256Hex(signed), signed, signature, receivedAt: new Date(draft.now), standing, why,
  })
  applyStored(draft.state, stored)
  return stored
}

/** Signs and adds an entry of the server's own. */
export async function addServerEntry<K extends ServerKind>(draft: Draft, kind: K, body: BodyOf<K>): Promise<StoredEntry> {
  const chain = draft.state.chain[draft.signer.device]
  const entry = {
    v: newestVersion(kind), id: uuidv7(draft.now), outage: draft.state.id, kind, body, at: isoTime(draft.now), skew: 0,
    by: SERVER, device: draft.signer.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null,
  } as AnyEntry
  return addEntry(draft, entry, signBytes(entryBytes(entry), draft.signer.key), 'accepted', [])
}

/** A signer's printed name, role and key enter the log before their first entry; the server, which names others, names itself first. */
async function nameSigner(draft: Draft, entry: AnyEntry): Promise<void> {
  const { signer } = draft
  if (!draft.state.signers[signer.device] && !namesDevice(entry, signer.device)) {
    await addServerEntry(draft, 'signer-named', { device: signer.device, deviceName: 'Holdover server', person: SERVER, name: 'Holdover', role: 'server', publicKey: signer.publicKey, enrolledAt: signer.enrolledAt.toISOString() })
  }
  if (entry.device === signer.device || draft.state.signers[entry.device]) return
  const [row] = await draft.db.select({ device: devices, person: people }).from(devices).innerJoin(people, eq(people.id, devices.personId)).where(eq(devices.id, entry.device))
  await addServerEntry(draft, 'signer-named', { device: row!.device.id, deviceName: row!.device.name, person: row!.person.id, name: row!.person.name, role: row!.person.role, publicKey: row!.device.publicKey, enrolledAt: row!.device.enrolledAt.toISOString() })
}

function namesDevice(entry: AnyEntry, device: string): boolean {
  return entry.kind === 'signer-named' && entry.body.device === device
}

/** Writes the projection that lists and screens read. */
export async function saveProjection(draft: Draft): Promise<void> {
  const { state } = draft
  const dark = state.darks.at(-1) // the present time without control, or the last one
  const ended = state.sealed?.mark.at ?? state.calledOff?.mark.at ?? null
  await draft.db.update(outages).set({
    phase: state.phase,
    size: state.size,
    state,
    foldVersion: FOLD_VERSION,
    workKind: state.plan.workKind.name,
    pointsInHand: pointsInHand(state).length,
    startsAt: state.plan.startsAt ? new Date(state.plan.startsAt) : null,
    darkAt: dark ? new Date(dark.from) : null,
    endedAt: ended === null ? null : new Date(ended),
    updatedAt: new Date(draft.now),
  }).where(eq(outages.id, state.id))
}
