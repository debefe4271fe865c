import type { DBSchema, IDBPDatabase } from 'idb'
import { openDB } from 'idb'
import type { Ref } from 'vue'
import { shallowRef } from 'vue'
import type { Checkpoint, Parting } from '~~/shared/record/checkpoint'
import { follow, shortfall, statementBytes } from '~~/shared/record/checkpoint'
import type { StoredEntry } from '~~/shared/record/entry'
import { EMPTY_FRONTIER } from '~~/shared/record/merkle'
import type { CheckSignature } from '~~/shared/record/verify/signatures'
import { webSignatures } from '~~/shared/record/verify/signatures'

/** What a device has seen of an outage's log: the last checkpoint that the log gave, and where it once parted from it. */
export interface Seen { outage: string, checkpoint: Checkpoint, parting: Parting | null, /** those of logs that this device left, by its person's word */ left?: Checkpoint[] }

export interface SeenStore { get: (outage: string) => Promise<Seen | null>, put: (seen: Seen) => Promise<void> }

interface SeenDatabase extends DBSchema { seen: { key: string, value: Seen } }
let opened: Promise<IDBPDatabase<SeenDatabase>> | null = null

/** A database of its own: what was seen outlives the logs that are kept and let go. */
function openSeen(): Promise<IDBPDatabase<SeenDatabase>> {
  opened ??= openDB<SeenDatabase>('holdover-seen', 1, {
    upgrade: (database) => { database.createObjectStore('seen', { keyPath: 'outage' }) },
    blocking: () => { void opened?.then(database => database.close()); opened = null },
    terminated: () => { opened = null },
  })
  return opened
}

export const seenStore: SeenStore = {
  get: async outage => await (await openSeen()).get('seen', outage) ?? null,
  put: async (seen) => {
    const tx = (await openSeen()).transaction('seen', 'readwrite', { durability: 'strict' })
    await tx.store.put(seen)
    await tx.done
  },
}

/** The device goes on from another log: what it saw of the one before stays beside it. @param checkpoint of the log that is taken */
export async function leaveSeen(outage: string, checkpoint: Checkpoint, store: SeenStore = seenStore): Promise<void> {
  const before = await store.get(outage)
  await store.put({ outage, checkpoint, parting: null, left: [...before?.left ?? [], ...before ? [before.checkpoint] : []] })
}

export interface LogPage { size: number, checkpoint: Checkpoint | null }

export interface LogWatch {
  /** where the log parts from what this device saw; null while it is the same one */
  parting: Readonly<Ref<Parting | null>>
  /** Reads what was seen before. */
  open: () => Promise<void>
  /**
   * Compares the log with what was seen before, and keeps its newest checkpoint once it gives that too.
   * @param log every entry that this device knows
   * @param page what the server says of the log: its size and its newest checkpoint
   * @param keyOf the public key of a server's signer in this log, by device
   */
  look: (log: readonly StoredEntry[], page: LogPage, keyOf: (device: string) => string | undefined) => Promise<void>
}

/** Watches that one outage's log stays the one that this device saw. Only new entries are hashed at each look. */
export function watchLog(outage: string, store: SeenStore = seenStore, signatures: () => Promise<CheckSignature> = webSignatures): LogWatch {
  const parting = shallowRef<Parting | null>(null)
  let frontier = EMPTY_FRONTIER
  let seen: Checkpoint | null = null
  let left: Pick<Seen, 'left'> = {}
  let check: Promise<CheckSignature> | null = null

  async function open(): Promise<void> {
    const kept = await store.get(outage).catch(() => null)
    seen = kept?.checkpoint ?? null
    left = kept?.left ? { left: kept.left } : {}
    parting.value = kept?.parting ?? null
  }

  async function look(log: readonly StoredEntry[], page: LogPage, keyOf: (device: string) => string | undefined): Promise<void> {
    if (parting.value) return
    const told = page.checkpoint
    const claims = [seen, told].filter(claim => claim !== null)
    const { frontier: reached, parting: found } = follow(frontier, log.slice(frontier.size), claims)
    frontier = reached
    const parted = (seen && shortfall(page.size, [seen])) ?? found
    if (parted) return part(parted)
    if (!told || told.statement.size > frontier.size || told.statement.size <= (seen?.statement.size ?? 0) || !await isSigned(told, keyOf)) return
    seen = told
    await store.put({ outage, checkpoint: told, parting: null, ...left }).catch(() => undefined)
  }

  /** What is shown is what this device saw first, not what it is told now. */
  async function part(found: Parting): Promise<void> {
    const checkpoint = seen ?? found.checkpoint
    parting.value = { ...found, checkpoint }
    await store.put({ outage, checkpoint, parting: parting.value, ...left }).catch(() => undefined)
  }

  /** A checkpoint that is not validly signed proves nothing, and is not kept; where signatures cannot be checked it is taken as it comes. */
  async function isSigned({ statement, signature }: Checkpoint, keyOf: (device: string) => string | undefined): Promise<boolean> {
    const key = keyOf(statement.key)
    if (statement.outage !== outage || key === undefined) return false
    check ??= signatures()
    const verify = await check.catch(() => null)
    return verify === null || await verify(key, signature, statementBytes(statement))
  }

  return { parting, open, look }
}
