import type { H3Event } from 'h3'
import { getRequestHeader, setResponseHeader } from 'h3'
import { tooLarge } from '../errors'

/** The raw body. Reading stops as soon as it is larger than is taken: 413. */
export async function readRaw(event: H3Event, maxBytes: number): Promise<Uint8Array> {
  const tooMuch = () => {
    // What is still on its way is not read, so this connection cannot be used again.
    setResponseHeader(event, 'connection', 'close')
    return tooLarge(`A file takes at most ${maxBytes / 1_000_000} MB`)
  }
  if (Number(getRequestHeader(event, 'content-length') ?? 0) > maxBytes) return tooMuch()
  const chunks: Buffer[] = []
  let size = 0
  for await (const chunk of event.node.req as AsyncIterable<Buffer>) {
    size += chunk.length
    if (size > maxBytes) return tooMuch()
    chunks.push(chunk)
  }
  return Buffer.concat(chunks)
}
