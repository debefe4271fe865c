/** A reader of server-sent events, as a browser has one (WHATWG HTML, 9.2). */
import type { Client } from './client'

export interface Told { name: string, data: Record<string, unknown> }

export interface Stream {
  status: number
  told: Told[]
  /** resolves once the other side has ended it */
  ended: Promise<void>
  /** waits for an event that comes after this call or was not asked for yet. @throws Error when none comes in time */
  next: (name: string, milliseconds?: number) => Promise<Told['data']>
  close: () => void
}

/** Opens the person's stream of wake-ups. */
export async function openStream(client: Client, path = '/api/watch'): Promise<Stream> {
  const abort = new AbortController()
  const response = await client.fetch(path, { headers: { accept: 'text/event-stream' }, signal: abort.signal })
  const told: Told[] = []
  const seen = new Map<string, number>()
  const ended = read(response, told).catch(() => undefined)
  return {
    status: response.status, told, ended,
    close: () => abort.abort(),
    async next(name, milliseconds = 5000) {
      const from = seen.get(name) ?? 0
      for (const until = Date.now() + milliseconds; Date.now() < until; await new Promise(resolve => setTimeout(resolve, 5))) {
        const at = told.findIndex((item, place) => place >= from && item.name === name)
        if (at < 0) continue
        seen.set(name, at + 1)
        return told[at]!.data
      }
      throw new Error(`No "${name}" came in ${milliseconds} ms`)
    },
  }
}

async function read(response: Response, told: Told[]): Promise<void> {
  let text = ''
  for await (const part of response.body!.pipeThrough(new TextDecoderStream())) {
    const whole = (text + part).split('\n\n')
    text = whole.pop()!
    for (const lines of whole) {
      const fields = Object.fromEntries(lines.split('\n').map(line => [line.slice(0, line.indexOf(':')), line.slice(line.indexOf(':') + 1).trim()]))
      if (fields.event) told.push({ name: fields.event, data: JSON.parse(fields.data ?? '{}') })
    }
  }
}
