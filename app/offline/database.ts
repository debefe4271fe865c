import type { DBSchema, IDBPDatabase } from 'idb'
import { openDB } from 'idb'
import type { AnyEntry } from '~~/shared/record/entry'

/** A person's signing key on this device. The private half cannot be taken out of the browser. */
export interface KeptKey { person: string, device: string, name: string, publicKey: string, privateKey: CryptoKey, enrolledAt: string }

/** A signed entry that has no receipt yet, or was refused and not yet seen by its signer. */
export interface KeptEntry {
  id: string
  outage: string
  person: string
  device: string
  n: number
  entry: AnyEntry
  signature: string
  keptAt: string
  refusal: { code: number, field: string | null, reason: string } | null
}

/** A photo or drawing on its way to the server. */
export interface KeptFile { sha256: string, outage: string, person: string, blob: Blob, keptAt: string }

interface HoldoverDatabase extends DBSchema {
  keys: { key: string, value: KeptKey }
  chains: { key: string, value: { n: number, hash: string } }
  outbox: { key: string, value: KeptEntry, indexes: { outage: string } }
  files: { key: string, value: KeptFile, indexes: { outage: string } }
}

let opened: Promise<IDBPDatabase<HoldoverDatabase>> | null = null

/** The one database of this origin. Nothing outside app/offline touches it. */
export function openKept(): Promise<IDBPDatabase<HoldoverDatabase>> {
  opened ??= openDB<HoldoverDatabase>('holdover', 1, {
    upgrade(database) {
      database.createObjectStore('keys', { keyPath: 'person' })
      database.createObjectStore('chains')
      database.createObjectStore('outbox', { keyPath: 'id' }).createIndex('outage', 'outage')
      database.createObjectStore('files', { keyPath: 'sha256' }).createIndex('outage', 'outage')
    },
    // Another tab has a newer version: let go, so that it can open.
    blocking: () => { void opened?.then(database => database.close()); opened = null },
    terminated: () => { opened = null },
  })
  return opened
}

/** Chrome commits to the disk's cache by default; what is signed must be on the disk. */
export const STRICT = { durability: 'strict' } as const

export const chainKey = (device: string, outage: string) => `${device}/${outage}`
