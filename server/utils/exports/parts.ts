/** A file of any length in the store, as parts of a few megabytes: neither store takes a stream. */
import type { Storage } from 'unstorage'

/** Bytes of a part. */
export const PART_BYTES = 4_000_000

const keyOf = (id: string, attempt: number, part: number) => `exports:${id}:${attempt}:${String(part).padStart(6, '0')}`

/**
 * Writes what comes, a part at a time, so that one part and one chunk are in memory.
 * @param attempt which try of the export this is: each has a folder of its own
 * @returns how many parts and bytes there are
 */
export async function writeParts(storage: Storage, id: string, attempt: number, chunks: AsyncIterable<Uint8Array>): Promise<{ parts: number, bytes: number }> {
  let waiting: Uint8Array[] = []
  let size = 0
  let parts = 0
  let bytes = 0
  const write = async () => {
    await storage.setItemRaw(keyOf(id, attempt, parts++), Buffer.concat(waiting))
    waiting = []
    size = 0
  }
  for await (const chunk of chunks) {
    for (let from = 0; from < chunk.length;) {
      const piece = chunk.subarray(from, from + PART_BYTES - size)
      waiting.push(piece)
      size += piece.length
      bytes += piece.length
      from += piece.length
      if (size === PART_BYTES) await write()
    }
  }
  if (size > 0) await write()
  return { parts, bytes }
}

/** The parts in order. @throws Error where one is not there any more */
export async function* readParts(storage: Storage, id: string, attempt: number, parts: number): AsyncGenerator<Uint8Array> {
  for (let part = 0; part < parts; part++) {
    const bytes: unknown = await storage.getItemRaw(keyOf(id, attempt, part))
    if (bytes instanceof ArrayBuffer) yield new Uint8Array(bytes)
    else if (bytes instanceof Uint8Array) yield bytes
    else throw new Error(`Part ${part} of the export ${id} is not in the store`)
  }
}

/** Whether every part is there. */
export async function hasParts(storage: Storage, id: string, attempt: number, parts: number): Promise<boolean> {
  for (let part = 0; part < parts; part++) if (!await storage.hasItem(keyOf(id, attempt, part))) return false
  return true
}

/**
 * Takes away what the tries of an export wrote. Parts of a try have no gaps, so the first that is missing ends it.
 * @param keep a try that stays @param from the first try that is looked at
 */
export async function removeParts(storage: Storage, id: string, tries: number, keep: number | null = null, from = 1): Promise<void> {
  for (let attempt = from; attempt <= tries; attempt++) {
    if (attempt === keep) continue
    for (let part = 0; await storage.hasItem(keyOf(id, attempt, part)); part++) await storage.removeItem(keyOf(id, attempt, part))
  }
}
