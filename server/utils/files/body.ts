import type { H3Event } from 'h3'
import { setResponseHeader } from 'h3'
import { tooLarge } from '../errors'

/** A browser hears an answer only once it has sent everything, so this many times too much is read and let go. */
const PATIENCE = 5

/**
 * The raw body. 413 when it is larger than is taken; no more than that is ever held.
 * @param maxBytes bytes that are taken
 */
export async function readRaw(event: H3Event, maxBytes: number): Promise<Uint8Array> {
  let chunks: Buffer[] = []
  let size = 0
  for await (const chunk of event.node.req as AsyncIterable<Buffer>) {
    size += chunk.length
    if (size <= maxBytes) chunks.push(chunk)
    else chunks = []
    if (size > maxBytes * PATIENCE) break
  }
  if (size <= maxBytes) return Buffer.concat(chunks)
  // What is still on its way is not read, so this connection cannot be used again.
  setResponseHeader(event, 'connection', 'close')
  return tooLarge(`A file takes at most ${maxBytes / 1_000_000} MB`)
}
