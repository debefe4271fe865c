import type { AnyEntry } from '~~/shared/record/entry'

/** The end of a device's chain in one outage: its count and the hash of its last entry. */
export interface ChainEnd { n: number, hash: string }

/** The server's word that an entry is in the record. */
export interface Receipt { status: 'accepted' | 'questioned', seq: number, receivedAt: string, why: string[] }

export interface Refusal { code: number, field: string | null, reason: string, /** its place in the device's chain is taken */ recorded: boolean }

/** A signed entry on this device. It waits while it has neither a receipt nor a refusal. */
export interface OutboxEntry {
  id: string
  outage: string
  person: string
  device: string
  n: number
  entry: AnyEntry
  signature: string
  /** by the clock of this device, ISO 8601 */
  keptAt: string
  /** rises with each entry that is kept here: the order in which they were signed, whatever the clock said */
  place: number
  receipt: Receipt | null
  refusal: Refusal | null
}

/** The server's answer to one entry. `later`: nothing is decided about it, it waits on. */
export type PushResult
  = | { id: string } & Receipt
    | { id: string | null, status: 'refused', later?: 'signer' | 'version' | 'log' } & Refusal

/**
 * Why entries wait: no answer; nobody is signed in; somebody else is; the outage is not to be found;
 * the server failed; it takes no body of this size; it does not know this version of a kind yet; its log is
 * not the one that this device saw; this device keeps no answer.
 */
export type Trouble = 'away' | 'signed-out' | 'another-signer' | 'missing' | 'failed' | 'too-large' | 'newer' | 'other-log' | 'storage'

/** Why sending broke off: by this device's storage, as where it is full, else by the server. */
export const troubleOfFault = (error: unknown): Trouble => error instanceof DOMException ? 'storage' : 'failed'

/** A push without answers to its entries. What was signed stays kept. */
export class Unsent extends Error {
  constructor(readonly trouble: Trouble) { super(trouble) }
}

/**
 * Pushes signed entries of one outage, in order; one answer an entry.
 * @throws Unsent
 */
export type Send = (outage: string, entries: { entry: AnyEntry, signature: string }[]) => Promise<PushResult[]>

export interface Refused {
  id: string
  refusal: Refusal
  /** the refusal took no place in the chain: what the device signed after `n` is refused too, and its chain ends at `end` */
  after: { device: string, n: number, end: ChainEnd | null, refusal: Refusal } | null
}

/** Answers of one push, written in one transaction. Only an entry that still waits is changed. */
export interface Settlement { outage: string, received: { id: string, receipt: Receipt }[], refused: Refused[] }

/** Where the outbox keeps what it holds. Each method is one transaction: wholly done and on the disk when it resolves, or not done. */
export interface OutboxStore {
  /** entries of an outage, or all, by place */
  entries: (outage?: string) => Promise<OutboxEntry[]>
  chain: (device: string, outage: string) => Promise<ChainEnd | null>
  /** Keeps an entry and the chain's new end. Null, and nothing done, where the chain no longer ends at `from`; else the entry's place. */
  keep: (entry: Omit<OutboxEntry, 'place'>, from: ChainEnd | null, end: ChainEnd) => Promise<number | null>
  settle: (settlement: Settlement) => Promise<void>
  /** Takes a refused entry away; its outage, or null where it is not there or not refused. */
  dismiss: (id: string) => Promise<string | null>
  /** Takes away what has a receipt up to `seq`; whether there was any. */
  collect: (outage: string, seq: number) => Promise<boolean>
}

/** One task of a name at a time, among all tabs where the browser can. A courtesy: nothing depends on it. */
export interface Locks { run: <T>(name: string, task: () => Promise<T>) => Promise<T> }

/** Who signs, with which device. */
export interface Signing { person: string, device: string, /** 64 bytes in base64url */ sign: (bytes: Uint8Array) => Promise<string> }

export interface OutboxPorts {
  store: OutboxStore
  send: Send
  locks: Locks
  /** Unix ms by this device */
  now: () => number
  /** a fresh UUIDv7 */
  newId: (now: number) => string
  /** told after each change, so that screens and other tabs read anew */
  changed?: (outage: string) => void
}

/** Whether an entry has neither its receipt nor a refusal. */
export function isWaiting(kept: Pick<OutboxEntry, 'receipt' | 'refusal'>): boolean {
  return kept.receipt === null && kept.refusal === null
}
