import { randomUUID } from 'node:crypto'
import { mkdir, readdir, readFile, rename, writeFile } from 'node:fs/promises'
import type { AddressInfo } from 'node:net'
import { join } from 'node:path'
import { SMTPServer } from 'smtp-server'

/** Bytes of one message at most. */
const MESSAGE_MAX = 1_000_000
const NAME = /^\d{13}-[0-9a-f-]{36}$/

/** Where the demo keeps the mail that it received. @param dataDirectory NUXT_DATA_DIR */
export function mailboxDirectory(dataDirectory: string): string {
  return join(dataDirectory, 'mailbox')
}

/**
 * A receiver of mail on a free port of loopback that keeps each message as it came, in a file of its own.
 * @param now Unix ms, for the names of the files
 */
export async function openMailbox(directory: string, now: () => number = Date.now): Promise<{ port: number, close: () => Promise<void> }> {
  await mkdir(directory, { recursive: true })
  const server = new SMTPServer({
    authOptional: true, disabledCommands: ['AUTH', 'STARTTLS'], size: MESSAGE_MAX, logger: false,
    onData(stream, _session, done) {
      const parts: Buffer[] = []
      stream.on('data', (part: Buffer) => parts.push(part))
      stream.on('error', done)
      stream.on('end', () => {
        if (stream.sizeExceeded) return done(Object.assign(new Error('The message is too large'), { responseCode: 552 }))
        keep(directory, `${String(now()).padStart(13, '0')}-${randomUUID()}`, Buffer.concat(parts)).then(() => done(null), done)
      })
    },
  })
  server.on('error', error => console.error('The demo\'s mailbox:', error.message))
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject)
    server.listen(0, '127.0.0.1', resolve)
  })
  return { port: (server.server.address() as AddressInfo).port, close: () => new Promise(resolve => server.close(() => resolve())) }
}

/** A message is seen whole or not at all. */
async function keep(directory: string, name: string, bytes: Buffer): Promise<void> {
  await writeFile(join(directory, `${name}.part`), bytes)
  await rename(join(directory, `${name}.part`), join(directory, `${name}.eml`))
}

/** Names of the messages, the newest first. */
export async function mailboxNames(directory: string): Promise<string[]> {
  const files = await readdir(directory).catch(() => [])
  return files.filter(file => file.endsWith('.eml')).map(file => file.slice(0, -4)).filter(name => NAME.test(name)).sort().reverse()
}

/** A message as it came; null: there is none of that name. */
export async function mailboxMessage(directory: string, name: string): Promise<Buffer | null> {
  return NAME.test(name) ? readFile(join(directory, `${name}.eml`)).catch(() => null) : null
}
