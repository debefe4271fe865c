// The shop's contact, who has no account: from the letter to the record; promises of this project's own, no published source.
import { startTestServer } from '../tests/support/server'
import type { TestServer } from '../tests/support/server'
import { axe, expect, hydrated, signInAs, test as base } from './support/fixtures'

/** A server that does its jobs, as the start command's does. */
const test = base.extend<object, { server: TestServer }>({
  server: [async ({ playwright: _playwright }, use) => {
    const server = await startTestServer({ demo: true, jobs: true })
    await use(server)
    await server.stop()
  }, { scope: 'worker', timeout: 180_000 }],
})

test('the shop reads its notice by the link of the letter, and the technician sees that it did', async ({ page, open, server, faults }) => {
  test.setTimeout(120_000)
  // The letter stands in a frame that runs no script; what the browser refuses there is this test's own looking in.
  faults.allow(/Blocked script execution in 'about:srcdoc'/)
  const desk = await open('desk')
  await signInAs(desk, 'admin@quillfeather.example')
  const letters = async () => (await (await desk.request.get('/api/mailbox')).json() as { items: { name: string, subject: string }[] }).items
  await expect.poll(async () => (await letters()).some(item => item.subject.startsWith('Abbot Green: refrigeration control away')), { timeout: 20_000 }).toBe(true)
  await desk.goto('/admin/mailbox')
  await hydrated(desk)
  await axe(desk)
  await desk.getByRole('link', { name: /Abbot Green: refrigeration control away/ }).click()
  await expect(desk.frameLocator('iframe').getByText('What your staff must do')).toBeVisible()
  const link = await desk.getByRole('link', { name: /\/notice\// }).getAttribute('href')
  expect(link).toContain(`${server.url}/notice/`)

  await page.goto(link!)
  await hydrated(page)
  await axe(page, { enhanced: true })
  await page.getByLabel('Your name').fill('Tamsin Wray')
  await page.getByRole('button', { name: 'I have read this' }).click()
  await expect(page.getByText(/^Tamsin Wray has read this on/)).toBeVisible()
  await axe(page, { enhanced: true })

  const phone = await open('phone')
  await signInAs(phone, 'technician@quillfeather.example')
  const { items } = await (await phone.request.get('/api/outages?phase=dark')).json() as { items: { id: string }[] }
  await phone.goto(`/outages/${items[0]!.id}/checks`)
  await hydrated(phone)
  await expect(phone.getByText(/read by Tamsin Wray at \d\d:\d\d/)).toBeVisible()
})
