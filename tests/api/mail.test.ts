// What is told by mail, to whom, and what its links do; promises of this project's own, no published source.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { StoredEntry } from '../../shared/record/entry'
import type { MailPage } from '../../shared/schemas/mails'
import type { NoticeView } from '../../shared/schemas/notices'
import type { PersonItem } from '../../shared/schemas/people'
import { DEMO_PASSWORD, signIn, visitor } from '../support/client'
import type { Client } from '../support/client'
import type { MailReceiver, Received } from '../support/mail'
import { linkIn, startMailReceiver } from '../support/mail'
import { Phone } from '../support/phone'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

interface Item { id: string, code: string, phase: string, planSubmitted: boolean, site: { name: string } }
interface Fault { data: { field?: string, reason: string } }

let receiver: MailReceiver
let server: TestServer
let supervisor: Client
let administrator: Client
let desk: Phone
let items: Item[]

beforeAll(async () => {
  receiver = await startMailReceiver()
  server = await startTestServer({ demo: true, jobs: true, env: { HOLDOVER_SMTP_URL: receiver.url, HOLDOVER_MAIL_FROM: 'holdover@quillfeather.example' } })
  supervisor = await signIn(server.url, 'supervisor@quillfeather.example')
  administrator = await signIn(server.url, 'admin@quillfeather.example')
  const { id } = (await supervisor.send<{ id: string }>('GET', '/api/account')).body
  desk = await new Phone(supervisor, id, server.now).enrol(DEMO_PASSWORD)
  items = (await supervisor.send<{ items: Item[] }>('GET', '/api/outages')).body.items
}, 120_000)
afterAll(async () => {
  await server?.stop()
  await receiver?.close()
})

const to = (address: string, words: string) => (item: Received) => item.to === address && item.mail.text.includes(words)
const logOf = async (outage: string) => (await supervisor.send<{ entries: StoredEntry[] }>('GET', `/api/outages/${outage}/entries`)).body.entries
/** The first entry of a kind that comes into a log within ten seconds. */
async function entryOf(outage: string, kind: string, fits: (body: Record<string, unknown>) => boolean): Promise<StoredEntry> {
  for (let tries = 0; tries < 100; tries++) {
    const found = (await logOf(outage)).find(({ entry }) => entry.kind === kind && fits(entry.body as unknown as Record<string, unknown>))
    if (found) return found
    await new Promise(resolve => setTimeout(resolve, 100))
  }
  throw new Error(`No ${kind} in the log`)
}
const pathOf = (link: string) => new URL(link).pathname

describe('the demo\'s own story', () => {
  it('told the supervisor of the plan that waits, with what to do and by when', async () => {
    const plan = items.find(item => item.phase === 'plan' && item.planSubmitted)!
    const { mail } = await receiver.find(to('supervisor@quillfeather.example', `${plan.site.name}: the plan for`))
    expect(mail.text.split('\n')[0]).toMatch(new RegExp(`^${plan.site.name}: the plan for “.+” waits for a supervisor\\. Approve or return it before `))
    expect(linkIn({ to: '', from: '', mail }, '/outages/')).toBe(`${server.url}/outages/${plan.id}/plan`)
  })

  it('told supervisor, author and the shop of the sealed record, each with its root', async () => {
    const sealed = items.find(item => item.phase === 'sealed')!
    const { sealed: seal } = (await supervisor.send<{ sealed: { size: number, root: string } }>('GET', `/api/outages/${sealed.id}/record.json`)).body
    for (const address of ['supervisor@quillfeather.example', 'technician@quillfeather.example', 'quarry-street@quillfeather.example']) {
      const { mail } = await receiver.find(to(address, `Root: ${seal.root}`))
      expect(mail.text).toContain(`Entries before the seal: ${seal.size} `)
      expect(mail.html).toContain(seal.root)
      expect(mail.subject).toContain(sealed.code)
    }
  })
})

describe('a notice to the shop', () => {
  let plan: Item
  let link: string
  const open = (path: string) => visitor(server.url).send<NoticeView & Fault>('GET', `/api/notices/${path.split('/').at(-1)}`)
  const read = (path: string, name: string) => visitor(server.url).send<NoticeView & Fault>('POST', `/api/notices/${path.split('/').at(-1)}`, { name })

  it('goes out with the approval, says what to do, and leads to a page that needs no account', async () => {
    plan = items.find(item => item.phase === 'plan' && item.planSubmitted)!
    const { result } = await desk.act(plan.id, 'plan-approved', { note: '' })
    expect(result.status).toBe('accepted')
    await receiver.find(to('technician@quillfeather.example', 'approved the plan'))
    await receiver.find(to('monitoring@quillfeather.example', 'expect silence from'))
    const notice = await receiver.find(item => item.to !== 'monitoring@quillfeather.example' && item.mail.text.includes('Doors shut, night covers down, no restocking.') && item.mail.text.includes('is taken away') && item.mail.text.includes(plan.code))
    for (const words of ['What your staff must do', 'Keep the doors of cases and cold rooms shut.', 'How long: about']) expect(notice.mail.text).toContain(words)
    link = linkIn(notice, '/notice/')
    const page = await visitor(server.url).fetch(pathOf(link), { headers: { accept: 'text/html' } })
    expect(page.status).toBe(200)
    expect(await page.text()).toContain('I have read this')
    expect((await open(link)).body).toMatchObject({ party: 'shop', site: plan.site.name, standing: 'announced', acknowledged: null, open: true })
  })

  it('stands in the record once it is sent', async () => {
    const { entry } = await entryOf(plan.id, 'notice-sent', body => body.party === 'shop')
    expect(entry.by).toBe('server')
    expect(entry.body).toMatchObject({ subject: 'control-away', to: expect.stringMatching(/@quillfeather\.example$/) })
    await entryOf(plan.id, 'notice-sent', body => body.party === 'monitoring')
  })

  it('asks for a name, and takes it down as the server\'s entry', async () => {
    expect(await read(link, '  ')).toMatchObject({ status: 422, body: { data: { field: 'name' } } })
    const { status, body } = await read(link, ' Tamsin Wray ')
    expect([status, body.acknowledged?.name, body.open]).toEqual([200, 'Tamsin Wray', false])
    const { entry } = await entryOf(plan.id, 'notice-acknowledged', () => true)
    expect([entry.by, entry.body]).toEqual(['server', { mail: expect.any(String), party: 'shop', name: 'Tamsin Wray' }])
  })

  it('used twice shows who was first, and when, and enters nothing more', async () => {
    const before = (await logOf(plan.id)).length
    const { status, body } = await read(link, 'Somebody else')
    expect([status, body.acknowledged?.name]).toEqual([200, 'Tamsin Wray'])
    expect((await open(link)).body.acknowledged).toEqual(body.acknowledged)
    expect((await logOf(plan.id)).length).toBe(before)
    const page = await (await visitor(server.url).fetch(pathOf(link), { headers: { accept: 'text/html' } })).text()
    expect(page).toContain('Tamsin Wray has read this on')
  })

  it('altered opens nothing, and says so', async () => {
    const altered = `${link.slice(0, -3)}${link.at(-3) === 'A' ? 'B' : 'A'}${link.slice(-2)}`
    expect((await open(altered)).status).toBe(404)
    expect((await read(altered, 'Eve')).status).toBe(404)
    expect(await (await visitor(server.url).fetch(pathOf(altered), { headers: { accept: 'text/html' } })).text()).toContain('This link is not whole')
  })
})

describe('an invitation', () => {
  let link: string
  const password = 'chosen by its owner'

  it('comes with a link instead of a password that an administrator knows', async () => {
    const { status, body } = await administrator.send<PersonItem>('POST', '/api/people', { email: 'maud@quillfeather.example', name: 'Maud Finch', role: 'technician', password: null, siteIds: [] })
    expect([status, body.mustChangePassword, typeof body.invitedAt]).toEqual([201, true, 'string'])
    link = linkIn(await receiver.find(to('maud@quillfeather.example', 'made you an account')), '/welcome/')
    expect((await visitor(server.url).send('GET', `/api/password-links/invitation/${link.split('/').at(-1)}`)).body).toMatchObject({ name: 'Maud Finch', email: 'maud@quillfeather.example' })
  })

  it('opens no page of another kind', async () => {
    expect((await visitor(server.url).send('POST', `/api/password-links/password-reset/${link.split('/').at(-1)}`, { password })).status).toBe(404)
    expect((await visitor(server.url).send('GET', `/api/notices/${link.split('/').at(-1)}`)).status).toBe(404)
  })

  it('sets the password once', async () => {
    const path = `/api/password-links/invitation/${link.split('/').at(-1)}`
    expect(await visitor(server.url).send('POST', path, { password: 'short' })).toMatchObject({ status: 422, body: { data: { field: 'password' } } })
    expect((await visitor(server.url).send('POST', path, { password })).status).toBe(200)
    const client = await signIn(server.url, 'maud@quillfeather.example', password)
    expect((await client.send('GET', '/api/account')).body).toMatchObject({ mustChangePassword: false })
    expect((await visitor(server.url).send('POST', path, { password: 'another long one' })).status).toBe(410)
    const { items } = (await administrator.send<{ items: PersonItem[] }>('GET', '/api/people')).body
    expect(items.find(person => person.email === 'maud@quillfeather.example')?.invitedAt).toBeNull()
  })

  it('is not kept with its link once it is sent', async () => {
    const { items } = (await administrator.send<MailPage>('GET', '/api/mails')).body
    expect(items.some(item => item.kind === 'invitation' && item.state === 'sent')).toBe(true)
    expect(JSON.stringify(items)).not.toContain('/welcome/')
  })
})

describe('a forgotten password', () => {
  const ask = (email: string) => visitor(server.url).send('POST', '/api/password-links', { email })
  const use = (link: string, password: string) => visitor(server.url).send<Fault>('POST', `/api/password-links/password-reset/${link.split('/').at(-1)}`, { password })

  it('is answered alike for whoever has an account and whoever has none, and only the one is written to', async () => {
    const [one, other] = [await ask('maud@quillfeather.example'), await ask('nobody@quillfeather.example')]
    expect(one).toEqual(other)
    expect(one.status).toBe(202)
    await receiver.find(to('maud@quillfeather.example', 'a new password was asked for'))
    expect(receiver.received.some(item => item.to === 'nobody@quillfeather.example')).toBe(false)
  })

  it('is set by the link once, ends every session, and its owner is told', async () => {
    const link = linkIn(await receiver.find(to('maud@quillfeather.example', 'a new password was asked for')), '/new-password/')
    const before = await signIn(server.url, 'maud@quillfeather.example', 'chosen by its owner')
    expect((await use(link, 'a quite new password')).status).toBe(200)
    expect((await before.send('GET', '/api/account')).status).toBe(401)
    await signIn(server.url, 'maud@quillfeather.example', 'a quite new password')
    await receiver.find(to('maud@quillfeather.example', 'was set by a link in a letter to this address'))
    expect(await use(link, 'yet another password')).toMatchObject({ status: 410 })
  })

  it('cannot be asked for without end', async () => {
    for (let tries = 0; tries < 25; tries++) await ask(`nobody${tries}@quillfeather.example`)
    expect((await ask('nobody@quillfeather.example')).status).toBe(429)
  })
})

it('tells the owner of a device that it signs in their name', async () => {
  const { mail } = await receiver.find(to('supervisor@quillfeather.example', 'was enrolled at'))
  expect(mail.text).toContain('revoke it now')
})

it('tells shop and monitoring centre that control is back, once', async () => {
  const dark = items.find(item => item.phase === 'dark')!
  const back = new Date(server.now()).toISOString()
  const { result } = await desk.act(dark.id, 'control-back', { backAt: back, words: '' })
  expect(result.status).toBe('accepted')
  const shop = await receiver.find(item => item.mail.subject === `${dark.site.name}: control is back` && item.to !== 'monitoring@quillfeather.example')
  await receiver.find(item => item.mail.subject === `${dark.site.name}: control is back` && item.to === 'monitoring@quillfeather.example')
  await entryOf(dark.id, 'notice-sent', body => body.subject === 'control-back' && body.to === shop.to)
  expect(receiver.received.filter(item => item.mail.subject === `${dark.site.name}: control is back` && item.to === shop.to)).toHaveLength(1)
})

it('links expire, and say so', async () => {
  const notice = receiver.received.find(item => item.mail.text.includes('/notice/'))!
  const link = linkIn(notice, '/notice/')
  await server.advance(30 * 24 * 60)
  expect((await visitor(server.url).send('GET', `/api/notices/${link.split('/').at(-1)}`)).status).toBe(410)
  expect((await visitor(server.url).send('POST', `/api/notices/${link.split('/').at(-1)}`, { name: 'Late' })).status).toBe(410)
  expect(await (await visitor(server.url).fetch(pathOf(link), { headers: { accept: 'text/html' } })).text()).toContain('This link has expired')
})
