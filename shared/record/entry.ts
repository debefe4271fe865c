import { z } from 'zod'
import { canonicalBytes, sha256Hex } from './canonical'
import type { BodyOf, EntryKind } from './kinds'
import { time } from './kinds/common'

/** The signer that stands for the server itself in `by`. */
export const SERVER = 'server'

/** One spelling only: chains are looked up by device, and bytes are what is signed. */
const id = z.string().uuid().regex(/^[0-9a-f-]+$/, 'An id is in lower case')

/** What every entry carries beside its body; the body is checked by its own kind's schema. */
export const envelopeSchema = z.object({
  v: z.number().int().min(1).max(1000),
  id,
  outage: id,
  kind: z.string().max(40).regex(/^[a-z]+(-[a-z]+)*$/, 'A kind is lower-case words with hyphens'),
  body: z.record(z.unknown()),
  at: time,
  skew: z.number().int().min(-3_153_600_000_000).max(3_153_600_000_000),
  by: z.union([id, z.literal(SERVER)]),
  device: id,
  n: z.number().int().min(1).max(1_000_000),
  prev: z.string().regex(/^[0-9a-f]{64}$/).nullable(),
}).strict()

export const signedEntrySchema = z.object({
  entry: envelopeSchema,
  signature: z.string().regex(/^[A-Za-z0-9_-]{86}$/, 'A signature is 64 bytes in base64url'),
}).strict()

/** What a device sends at once of what it has kept. */
export const ENTRIES_PER_PUSH = 50
/** What the server takes at once: a round of the largest shop is one request, so that all of it is judged together or not at all. */
export const MOST_ENTRIES_PER_PUSH = 100
export const pushSchema = z.object({
  entries: z.array(z.unknown()).min(1, 'At least one entry').max(MOST_ENTRIES_PER_PUSH, `At most ${MOST_ENTRIES_PER_PUSH} entries at once`),
  /** how the log stood when the device last saw it: on a log that does not give it nothing is built */
  seen: z.object({ size: z.number().int().positive(), root: z.string().regex(/^[0-9a-f]{64}$/, 'A root is 64 hexadecimal digits') }).strict().optional(),
})

/** One signed act. See docs/record-format.md. */
export interface Entry<K extends EntryKind = EntryKind> {
  v: number
  id: string
  outage: string
  kind: K
  body: BodyOf<K>
  at: string
  skew: number
  by: string
  device: string
  n: number
  prev: string | null
}

/** Distributes over the kinds, so that a check of `kind` narrows `body`. */
export type AnyEntry = { [K in EntryKind]: Entry<K> }[EntryKind]

export interface SignedEntry { entry: AnyEntry, signature: string }

export type Standing = 'accepted' | 'questioned'

/** An entry as it stands in the log: one leaf of the outage's Merkle tree. */
export interface StoredEntry extends SignedEntry {
  seq: number
  receivedAt: string
  standing: Standing
  /** why it is questioned, in words; empty when accepted */
  why: string[]
}

/** The bytes that are signed and hashed. */
export function entryBytes(entry: AnyEntry): Uint8Array {
  return canonicalBytes(entry)
}

export function entryHash(entry: AnyEntry): string {
  return sha256Hex(entryBytes(entry))
}

/** When it happened by the server's clock, Unix ms: the device's time less its last measured difference. */
export function happenedAt(entry: { at: string, skew: number }): number {
  return Date.parse(entry.at) - entry.skew
}

/** A time inside a body, read off the same device, on the same footing. Unix ms. */
export function correctedTime(entry: { skew: number }, time: string): number {
  return Date.parse(time) - entry.skew
}

/** An ISO time with milliseconds in UTC, as entries hold it. @param ms Unix time, ms */
export function isoTime(ms: number): string {
  return new Date(ms).toISOString()
}
