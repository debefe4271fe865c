import { z } from 'zod'
import { canonicalBytes } from './canonical'
import type { Checkpoint } from './checkpoint'
import { checkpointSchema, statementBytes } from './checkpoint'
import type { StoredEntry } from './entry'
import { fileHash, saying, time, uuid } from './kinds/common'
import { logRoot } from './merkle'
import type { OutageState } from './state'
import type { CheckSignature } from './verify/signatures'

/** How far the time in a statement may lie from the server's, ms: a statement is signed to be sent at once. */
export const DELETION_FRESH_MS = 10 * 60_000

/**
 * What an administrator signs who deletes a record. It stands for the record afterwards, so it holds what
 * tells whether a copy that somebody kept is the record that was deleted: size and Merkle root (RFC 9162)
 * of the whole log, and those of its seal.
 */
export const deletionStatementSchema = z.object({
  type: z.literal('holdover-deletion'),
  version: z.literal(1),
  id: uuid,
  outage: uuid,
  code: z.string().min(1).max(40),
  /** its name as the record has it */
  site: z.string().min(1).max(200),
  size: z.number().int().positive(),
  root: fileHash,
  /** null where it was called off: then there is no seal */
  seal: z.object({ size: z.number().int().positive(), root: fileHash }).strict().nullable(),
  /** photos and drawings that go with it */
  files: z.number().int().min(0),
  /** how long it was to be kept, and when that was over */
  retention: z.object({ years: z.number().int().positive(), over: time }).strict(),
  reason: saying('Say why it is deleted'),
  at: time,
  skew: z.number().int(),
  by: uuid,
  name: z.string().min(1).max(80),
  device: uuid,
}).strict()
export type DeletionStatement = z.infer<typeof deletionStatementSchema>

const signatureText = z.string().regex(/^[A-Za-z0-9_-]{86}$/, 'A signature is 64 bytes in base64url')
export const signedDeletionSchema = z.object({ statement: deletionStatementSchema, signature: signatureText }).strict()
export type SignedDeletion = z.infer<typeof signedDeletionSchema>

const publicKey = z.string().regex(/^[A-Za-z0-9_-]{43}$/)

/** What stays of a deleted record, as one JSON document; docs/retention.md says what each field means. */
export const deletionFileSchema = z.object({
  format: z.literal('holdover-deletion'),
  version: z.literal(1),
  statement: deletionStatementSchema,
  signature: signatureText,
  signer: z.object({ device: uuid, deviceName: z.string(), publicKey, enrolledAt: time }),
  /** the server's last word on the log before it was deleted, and the key that signed it */
  checkpoint: checkpointSchema.nullable(),
  serverKey: z.object({ id: uuid, publicKey }).nullable(),
  deletedAt: time,
  /** for the reader; nobody signed these */
  outage: z.object({ controller: z.string(), workKind: z.string(), planned: z.boolean(), openedAt: time, endedAt: time.nullable(), timeZone: z.string() }),
})
export type DeletionFile = z.infer<typeof deletionFileSchema>

export type DeletionFacts = Pick<DeletionStatement, 'outage' | 'code' | 'site' | 'size' | 'root' | 'seal' | 'files' | 'retention'>

/**
 * What a statement says of the record itself: worked out from the log by who signs it and again by the server.
 * @param state the fold of the log @param files how many photos and drawings the server holds
 */
export function factsOf(state: OutageState, log: readonly StoredEntry[], { years, over, files }: { years: number, over: string, files: number }): DeletionFacts {
  const { sealed } = state
  return {
    outage: state.id, code: state.code ?? state.id, site: state.snapshot.site.name, size: log.length, root: logRoot(log),
    seal: sealed ? { size: sealed.size, root: sealed.root } : null, files, retention: { years, over },
  }
}

/** The bytes of a statement that are signed: its canonical JSON (RFC 8785). */
export function deletionBytes(statement: DeletionStatement): Uint8Array {
  return canonicalBytes(statement)
}

export interface DeletionCheck {
  /** the administrator's signature fits the statement */
  signed: boolean
  /** the server's checkpoint says the same size and root, and is validly signed; null: it has none */
  vouched: boolean | null
}

/** Checks what stays of a deleted record: both signatures (Ed25519, RFC 8032). */
export async function checkDeletion({ statement, signature, signer, checkpoint, serverKey }: DeletionFile, check: CheckSignature): Promise<DeletionCheck> {
  const signed = signer.device === statement.device && await check(signer.publicKey, signature, deletionBytes(statement))
  return { signed, vouched: checkpoint === null ? null : await isVouched(statement, checkpoint, serverKey, check) }
}

async function isVouched(statement: DeletionStatement, checkpoint: Checkpoint, key: DeletionFile['serverKey'], check: CheckSignature): Promise<boolean> {
  const { outage, size, root } = checkpoint.statement
  if (outage !== statement.outage || size !== statement.size || root !== statement.root) return false
  return key !== null && key.id === checkpoint.statement.key && await check(key.publicKey, checkpoint.signature, statementBytes(checkpoint.statement))
}
