import { z } from 'zod'
import { canonicalBytes, canonicalText, sha256Hex } from '../canonical'
import { checkpointSchema } from '../checkpoint'
import type { StoredEntry } from '../entry'
import { envelopeSchema } from '../entry'
import { isEntryKind, schemaOf } from '../kinds'
import { time } from '../kinds/common'
import { storedLeaf } from '../merkle'

/** What must be there for a text to be a record at all; what stands in it is checked entry by entry. */
export const recordHeadSchema = z.object({
  format: z.literal('holdover-record'),
  version: z.number().int().min(1),
  versions: z.object({ program: z.string(), fold: z.number().int() }).optional(),
  outage: z.object({ id: z.string() }).passthrough(),
  size: z.number(),
  root: z.string(),
  sealed: z.object({ seq: z.number(), at: z.string(), by: z.string(), size: z.number(), root: z.string() }).nullable(),
  checkpoints: z.array(z.unknown()).default([]),
  entries: z.array(z.unknown()).min(1),
}).passthrough()

export type RecordHead = z.infer<typeof recordHeadSchema>

const storedSchema = z.object({
  entry: envelopeSchema,
  signature: z.string().regex(/^[A-Za-z0-9_-]{86}$/, 'a signature is 64 bytes in base64url'),
  seq: z.number().int().min(1),
  receivedAt: time,
  standing: z.enum(['accepted', 'questioned']),
  why: z.array(z.string()),
}).strict()

/** An item of the log, read: what it hashes to, or what is wrong with its shape. */
export type ReadItem
  = | { stored: StoredEntry, bytes: Uint8Array, hash: string, leaf: Uint8Array, fault: null }
    | { stored: null, fault: { field: string, why: string } }

/** Reading an item is most of the work, and the same object reads the same each time. */
const read = new WeakMap<object, ReadItem>()

export function readItem(item: unknown): ReadItem {
  if (typeof item !== 'object' || item === null) return { stored: null, fault: { field: 'entry', why: 'it is no entry' } }
  const known = read.get(item)
  if (known) return known
  const found = readAfresh(item)
  read.set(item, found)
  return found
}

function readAfresh(item: object): ReadItem {
  const wrong = (field: string, why: string): ReadItem => ({ stored: null, fault: { field, why } })
  const parsed = storedSchema.safeParse(item)
  if (!parsed.success) return wrong(parsed.error.issues[0]!.path.join('.') || 'entry', parsed.error.issues[0]!.message)
  const stored = item as StoredEntry
  const { kind, v, body } = stored.entry
  if (!isEntryKind(kind)) return wrong('kind', `this program knows no entry of the kind "${String(kind)}"`)
  const schema = schemaOf(kind, v)
  if (!schema) return wrong('v', `this program does not know version ${v} of "${kind}": check it with a newer one`)
  if ((stored.standing === 'accepted') !== (stored.why.length === 0)) return wrong('standing', stored.standing === 'accepted' ? 'it is accepted, yet reasons against it are given' : 'it is questioned, yet no reason is given')
  try {
    const good = schema.safeParse(body)
    if (!good.success) return wrong(['body', ...good.error.issues[0]!.path].join('.'), good.error.issues[0]!.message)
    if (canonicalText(good.data) !== canonicalText(body)) return wrong('body', 'it is not written as its kind lays down')
    const bytes = canonicalBytes(stored.entry)
    return { stored, bytes, hash: sha256Hex(bytes), leaf: storedLeaf(stored), fault: null }
  } catch {
    return wrong('entry', 'it has no canonical form (RFC 8785)')
  }
}

/** A checkpoint with the bytes that were signed; null where it has not the shape of one. */
export type ReadCheckpoint = { checkpoint: z.infer<typeof checkpointSchema>, bytes: Uint8Array } | null
const readBefore = new WeakMap<object, ReadCheckpoint>()

export function readCheckpoint(item: unknown): ReadCheckpoint {
  if (typeof item !== 'object' || item === null) return null
  if (readBefore.has(item)) return readBefore.get(item)!
  const parsed = checkpointSchema.safeParse(item)
  const found = parsed.success ? { checkpoint: parsed.data, bytes: canonicalBytes(parsed.data.statement) } : null
  readBefore.set(item, found)
  return found
}
