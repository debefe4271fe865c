import { join } from 'node:path'
import { createStorage } from 'unstorage'
import type { Storage } from 'unstorage'
import fsDriver from 'unstorage/drivers/fs'
import s3Driver from 'unstorage/drivers/s3'

/** What says where files are kept. */
export interface StorageSettings {
  /** directory of the local store; used unless a bucket is named */
  dataDir: string
  HOLDOVER_S3_BUCKET?: string
  HOLDOVER_S3_ENDPOINT?: string
  HOLDOVER_S3_REGION?: string
  HOLDOVER_S3_ACCESS_KEY_ID?: string
  HOLDOVER_S3_SECRET_ACCESS_KEY?: string
}

/**
 * A store for files named by their SHA-256: `<dataDir>/files`, or a bucket that all nodes share.
 * @throws Error when a bucket is named without all that it needs
 */
export function openStorage(settings: StorageSettings): Storage {
  const { HOLDOVER_S3_BUCKET: bucket, HOLDOVER_S3_ENDPOINT: endpoint, HOLDOVER_S3_REGION: region, HOLDOVER_S3_ACCESS_KEY_ID: accessKeyId, HOLDOVER_S3_SECRET_ACCESS_KEY: secretAccessKey } = settings
  if (!bucket) return createStorage({ driver: fsDriver({ base: join(settings.dataDir, 'files') }) })
  if (!endpoint || !region || !accessKeyId || !secretAccessKey) throw new Error('HOLDOVER_S3_BUCKET also needs HOLDOVER_S3_ENDPOINT, HOLDOVER_S3_REGION, HOLDOVER_S3_ACCESS_KEY_ID and HOLDOVER_S3_SECRET_ACCESS_KEY')
  return createStorage({ driver: s3Driver({ bucket, endpoint, region, accessKeyId, secretAccessKey }) })
}

/** Files lie in 256 folders, so that no folder grows too long to list. */
const keyOf = (sha256: string) => `${sha256.slice(0, 2)}:${sha256}`

export async function writeBytes(storage: Storage, sha256: string, bytes: Uint8Array): Promise<void> {
  await storage.setItemRaw(keyOf(sha256), Buffer.from(bytes))
}

/** The bytes of a file, or null where the store does not hold them. */
export async function readBytes(storage: Storage, sha256: string): Promise<Uint8Array | null> {
  const bytes: unknown = await storage.getItemRaw(keyOf(sha256))
  if (bytes instanceof ArrayBuffer) return new Uint8Array(bytes)
  return bytes instanceof Uint8Array ? bytes : null
}

/** Takes a file away; one that is not there is taken away already. */
export async function removeBytes(storage: Storage, sha256: string): Promise<void> {
  await storage.removeItem(keyOf(sha256))
}

let opened: Storage | null = null

/** The process's one store. */
export function fileStorage(): Storage {
  opened ??= openStorage({ dataDir: useRuntimeConfig().dataDir || '.data', ...process.env })
  return opened
}
