// Promises of this project's own; no published source. SMTP replies: 4yz is tried again, 5yz is not (RFC 5321, 4.2.1).
import { randomUUID } from 'node:crypto'
import postgres from 'postgres'
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import type { MailReceiver } from '../support/mail'
import { startMailReceiver } from '../support/mail'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

let receiver: MailReceiver
let server: TestServer
let sql: ReturnType<typeof postgres>

beforeAll(async () => {
  receiver = await startMailReceiver()
  server = await startTestServer({ jobs: true, env: { HOLDOVER_SMTP_URL: receiver.url, HOLDOVER_MAIL_FROM: 'Holdover <watch@quillfeather.example>' } })
  sql = postgres(server.databaseUrl, { max: 1 })
}, 120_000)
afterAll(async () => {
  await sql?.end()
  await server?.stop()
  await receiver?.close()
})
beforeEach(() => receiver.answer(null))

async function write(subject: string): Promise<string> {
  const [id, at] = [randomUUID(), new Date(server.now())]
  await sql`insert into mails (id, key, kind, "to", subject, text, html, created_at, next_try_at) values (${id}, ${id}, 'alert', 'maud@quillfeather.example', ${subject}, 'Plain words', '<p>Drawn words</p>', ${at}, ${at})`
  await wake()
  return id
}
/** Asks for a run of the job, as whoever writes a mail does; by itself it looks again only every ten seconds. */
const wake = () => sql`insert into jobs.job (name, singleton_key) values ('send-mails', ${randomUUID()})`
const row = async (id: string) => (await sql`select attempts, sent_at, failed_at, last_error, next_try_at from mails where id = ${id}`)[0]!
async function until(id: string, fits: (mail: Awaited<ReturnType<typeof row>>) => boolean) {
  for (let tries = 0; tries < 300; tries++) {
    const mail = await row(id)
    if (fits(mail)) return mail
    await new Promise(resolve => setTimeout(resolve, 50))
  }
  throw new Error(`It stayed at ${JSON.stringify(await row(id))}`)
}

it('is sent with text and HTML, from the address that is set', async () => {
  const id = await write('First')
  const { to, from, mail } = await receiver.find(item => item.mail.subject === 'First')
  expect([to, from, mail.messageId, mail.text.trim(), mail.html.trim()]).toEqual(['maud@quillfeather.example', 'watch@quillfeather.example', `<${id}@quillfeather.example>`, 'Plain words', '<p>Drawn words</p>'])
  expect(await until(id, state => state.sent_at !== null)).toMatchObject({ attempts: 1, last_error: null })
}, 20_000)

it('is tried again when the receiver cannot take it now', async () => {
  receiver.answer({ code: 451, words: 'Not now' })
  const id = await write('Later')
  const waiting = await until(id, state => state.attempts === 1)
  expect([waiting.sent_at, waiting.failed_at]).toEqual([null, null])
  expect(waiting.last_error).toContain('Not now')
  expect(waiting.next_try_at.getTime() - server.now()).toBeGreaterThan(40_000)
  receiver.answer(null)
  await server.advance(2)
  await wake()
  await receiver.find(item => item.mail.subject === 'Later')
  expect(await until(id, state => state.sent_at !== null)).toMatchObject({ attempts: 2, last_error: null })
}, 40_000)

it('is given up when the receiver refuses it for good, and keeps no other mail back', async () => {
  receiver.answer({ code: 550, words: 'Nobody of that name' })
  const refused = await write('Refused')
  expect((await until(refused, state => state.failed_at !== null)).last_error).toContain('Nobody of that name')
  receiver.answer(null)
  await write('Another')
  await receiver.find(item => item.mail.subject === 'Another')
}, 40_000)

it('is sent again under the same Message-ID when the process is killed before it could mark it, and never stands twice', async () => {
  const held = receiver.holdNext()
  const id = await write('Killed')
  expect(await held).toBe(`<${id}@quillfeather.example>`)
  await server.kill()
  expect(await row(id)).toMatchObject({ attempts: 0, sent_at: null })
  await server.up()
  await until(id, state => state.sent_at !== null)
  expect(receiver.received.filter(item => item.mail.subject === 'Killed').map(item => item.mail.messageId)).toEqual([`<${id}@quillfeather.example>`, `<${id}@quillfeather.example>`])
  expect(await sql`select count(*)::int as count from mails where key = ${id}`).toEqual([{ count: 1 }])
}, 60_000)
