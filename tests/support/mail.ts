import type { AddressInfo } from 'node:net'
import type { Email } from 'postal-mime'
import PostalMime from 'postal-mime'
import { SMTPServer } from 'smtp-server'

/** A mail as it was received: `to` is the envelope's. */
export interface Received { to: string, from: string, mail: Email & { text: string, html: string } }

/** A receiver of mail for a test. */
export interface MailReceiver {
  /** For HOLDOVER_SMTP_URL. */
  url: string
  received: Received[]
  /** Says what is answered to a mail from now on; null: it is taken. */
  answer: (fault: { code: number, words: string } | null) => void
  /** Keeps the answer to the next mail back, after the mail has come; resolves with its Message-ID. */
  holdNext: () => Promise<string>
  /** The first mail that fits and has come, or comes within ten seconds. */
  find: (fits: (item: Received) => boolean) => Promise<Received>
  close: () => Promise<void>
}

export async function startMailReceiver(): Promise<MailReceiver> {
  const received: Received[] = []
  let fault: { code: number, words: string } | null = null
  let hold: ((messageId: string) => void) | null = null
  const server = new SMTPServer({
    authOptional: true, disabledCommands: ['AUTH', 'STARTTLS'], logger: false,
    onData(stream, session, done) {
      const parts: Buffer[] = []
      stream.on('data', (part: Buffer) => parts.push(part))
      stream.on('end', async () => {
        if (fault) return done(Object.assign(new Error(fault.words), { responseCode: fault.code }))
        const mail = await PostalMime.parse(Buffer.concat(parts))
        received.push({ to: session.envelope.rcptTo.map(item => item.address).join(), from: session.envelope.mailFrom ? session.envelope.mailFrom.address : '', mail: { ...mail, text: mail.text ?? '', html: mail.html ?? '' } })
        if (hold) {
          hold(mail.messageId ?? '')
          hold = null
        } else done(null)
      })
    },
  })
  server.on('error', () => {})
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  return {
    url: `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`,
    received,
    answer: (next) => { fault = next },
    holdNext: () => new Promise((resolve) => { hold = resolve }),
    async find(fits) {
      const deadline = Date.now() + 10_000
      while (Date.now() < deadline) {
        const found = received.find(fits)
        if (found) return found
        await new Promise(resolve => setTimeout(resolve, 50))
      }
      throw new Error(`No such mail; there came: ${received.map(item => `${item.to} “${item.mail.subject}”`).join('; ') || 'none'}`)
    },
    close: () => new Promise(resolve => server.close(() => resolve())),
  }
}

/** The links of a mail that lead to a path. */
export function linkIn({ mail }: Received, path: string): string {
  const found = mail.text.match(/https?:\/\/\S+/g)?.find(link => new URL(link).pathname.startsWith(path))
  if (!found) throw new Error(`No link to ${path} in: ${mail.text}`)
  return found
}
