import type { DBSchema, IDBPDatabase, IDBPTransaction, StoreNames } from 'idb'
import { openDB } from 'idb'
import type { StoredEntry } from '~~/shared/record/entry'
import type { Phase } from '~~/shared/record/phases'
import type { Snapshot } from '~~/shared/record/snapshot'
import type { Role } from '~~/shared/schemas/people'
import type { PinTries } from '~~/shared/signing/pin'
import type { ChainEnd, OutboxEntry } from './outbox-ports'
import type { SealedBytes } from './sealed-key'

interface KeyOwner { person: string, device: string, name: string, publicKey: string, enrolledAt: string }
/** A person's signing key on this device, under their PIN and under a key that only this browser can use. */
export interface PinKey extends KeyOwner { sealed: SealedBytes, deviceKey: CryptoKey, tries: PinTries }
/** A key made before there were PINs: it can be used, but not taken out to be sealed, so a new one takes its place. */
export interface PlainKey extends KeyOwner { privateKey: CryptoKey }
export type KeptKey = PinKey | PlainKey

/** A photo or drawing on its way to the server. */
export interface KeptFile { sha256: string, outage: string, person: string, blob: Blob, keptAt: string, /** the server will not have it, and why */ refusal?: string }

/** Who is signed in on this device, as the server last said. */
export interface KeptPerson { id: string, name: string, email: string, role: Role, mustChangePassword: boolean }

/** An outage whose log is kept here, with what a list shows of it. */
export interface KeptOutage {
  id: string
  person: string
  /** how many entries of the log are kept, from the first without gaps */
  size: number
  /** by the server's clock, Unix ms */
  heardAt: number
  code: string | null
  phase: Phase
  site: string
  controller: string
  timeZone: string
  planned: boolean
}

/** The equipment of a controller at one of a person's sites, as an opening entry carries it. */
export interface KeptEquipment { controller: string, person: string, snapshot: Snapshot, keptAt: number }

export interface HoldoverDatabase extends DBSchema {
  keys: { key: string, value: KeptKey }
  chains: { key: string, value: ChainEnd }
  outbox: { key: string, value: OutboxEntry, indexes: { outage: string, place: number } }
  files: { key: string, value: KeptFile, indexes: { outage: string } }
  /** entries of kept logs, by outage and seq */
  log: { key: [string, number], value: StoredEntry }
  outages: { key: string, value: KeptOutage }
  equipment: { key: string, value: KeptEquipment }
  /** single facts by name: person, skew, equipment's tag */
  facts: { key: string, value: unknown }
}

let opened: Promise<IDBPDatabase<HoldoverDatabase>> | null = null

/** The one database of this origin. Nothing outside app/offline touches it. */
export function openKept(): Promise<IDBPDatabase<HoldoverDatabase>> {
  opened ??= openDB<HoldoverDatabase>('holdover', 2, {
    async upgrade(database, from, _to, tx) {
      if (from < 1) {
        database.createObjectStore('keys', { keyPath: 'person' })
        database.createObjectStore('chains')
        database.createObjectStore('outbox', { keyPath: 'id' }).createIndex('outage', 'outage')
        database.createObjectStore('files', { keyPath: 'sha256' }).createIndex('outage', 'outage')
      }
      if (from < 2) {
        database.createObjectStore('log')
        database.createObjectStore('outages', { keyPath: 'id' })
        database.createObjectStore('equipment', { keyPath: 'controller' })
        database.createObjectStore('facts')
        await numberOutbox(tx)
      }
    },
    // Another tab has a newer version: let go, so that it can open.
    blocking: () => { void opened?.then(database => database.close()); opened = null },
    terminated: () => { opened = null },
  }).catch((error) => {
    // The next call tries again.
    opened = null
    throw error
  })
  return opened
}

/** Entries of the first version had no place; they get one in the order in which they were signed. */
async function numberOutbox(tx: IDBPTransaction<HoldoverDatabase, StoreNames<HoldoverDatabase>[], 'versionchange'>): Promise<void> {
  const outbox = tx.objectStore('outbox')
  const kept = (await outbox.getAll()).sort((one, other) => one.keptAt.localeCompare(other.keptAt) || one.n - other.n)
  for (const [index, entry] of kept.entries()) await outbox.put({ ...entry, place: index + 1, receipt: null, refusal: entry.refusal && { ...entry.refusal, recorded: true } })
  outbox.createIndex('place', 'place')
}

/** Chrome commits to the disk's cache by default; what is signed must be on the disk. */
export const STRICT = { durability: 'strict' } as const

export const chainKey = (device: string, outage: string) => `${device}/${outage}`
