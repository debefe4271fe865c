// Alerts from the job to the screens; the promises are this project's own, no published source.
import { randomUUID } from 'node:crypto'
import postgres from 'postgres'
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

test('a late round is alerted, acknowledged on the phone with one tap, and it is told by whom', async ({ page, server, advance }) => {
  await advance(30)
  const sql = postgres(server.databaseUrl, { max: 1 })
  await sql`insert into jobs.job (name, singleton_key) values ('alerts', ${randomUUID()})`
  await expect.poll(async () => (await sql`select key from alerts where alert = 'round-late'`).length, { timeout: 20_000 }).toBe(1)
  await sql.end()

  await signInAs(page, 'technician@quillfeather.example')
  const { items } = await (await page.request.get('/api/outages?phase=dark')).json() as { items: { id: string }[] }
  await page.goto(`/outages/${items[0]!.id}`)
  await hydrated(page)
  const alerts = page.getByRole('region', { name: 'Alerts' })
  await expect(alerts).toBeVisible()
  await axe(page, { enhanced: true })
  const more = alerts.getByRole('button', { name: /more alert/ })
  if (await more.isVisible()) await more.click()
  const late = alerts.getByRole('listitem').filter({ hasText: 'the round is late' })
  await late.getByRole('button', { name: /^I have seen it/ }).click()
  await expect(late).toHaveCount(0)

  await page.goto('/')
  await hydrated(page)
  await page.getByRole('button', { name: /that w(as|ere) seen/ }).click()
  await expect(page.getByText(/the round is late/)).toBeVisible()
  await expect(page.getByText(/seen by Juno Tarrant at \d\d:\d\d/)).toBeVisible()
  await axe(page, { enhanced: true })
})
