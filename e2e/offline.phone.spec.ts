import type { Page } from '@playwright/test'
import { expect, hydrated, signInAs, test } from './support/fixtures'
import { enrol, givePin, sign } from './support/run'

/** Without a network nothing of what the page asks for is answered, and the browser says so on its console. */
const UNHEARD = /console error: Failed to load resource: net::ERR_/

async function signNote(page: Page, id: string, words: string) {
  await page.goto(`/outages/${id}/note`)
  await page.getByLabel('Note').fill(words)
  await sign(page, 'Sign the note')
  await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
}

/** A phone in a machine room: no network and no server, a tab that is killed, then the network again. */
test('a run goes on without network and server, and all is in the record within 5 s of their return', async ({ page, context, server, faults }) => {
  test.setTimeout(180_000)
  faults.allow(UNHEARD)
  await signInAs(page, 'technician@quillfeather.example')
  await enrol(page)
  const { items } = await (await page.request.get('/api/outages')).json() as { items: { id: string, phase: string }[] }
  const { id } = items.find(item => item.phase === 'dark')!

  await test.step('one visit with a network', async () => {
    await page.goto(`/outages/${id}`)
    await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
    await page.evaluate(async () => { await navigator.serviceWorker.ready })
    await page.goto('/outages')
    await expect(page.getByText(/The equipment of \d+ controllers is kept/)).toBeVisible()
  })

  await test.step('network and server are gone: the run is read anew and two entries are signed', async () => {
    await context.setOffline(true)
    await server.down()
    await page.goto(`/outages/${id}`)
    await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
    await expect(page.getByText('No connection, last heard')).toBeVisible()
    await signNote(page, id, 'first, in the machine room')
    await signNote(page, id, 'second, in the machine room')
    await expect(page.getByText('2 entries kept on this phone')).toBeVisible()
  })

  const again = await test.step('the tab is killed and opened again: both are there, and the first page leads to them', async () => {
    await page.close()
    const opened = await context.newPage()
    await givePin(opened)
    await opened.goto('/')
    await expect(opened.getByRole('heading', { level: 1, name: 'On this phone' })).toBeVisible()
    await expect(opened.getByText('Kept on this phone')).toHaveCount(2)
    return opened
  })

  const lost = await test.step('control is lost elsewhere: an unplanned outage begins without a network', async () => {
    await again.getByRole('link', { name: 'Control is lost now' }).click()
    await expect(again.getByText('the equipment is as this phone keeps it')).toBeVisible()
    await again.getByLabel('Controller').selectOption({ index: 1 })
    await sign(again, 'Sign: control is lost')
    await expect(again.getByText('no number yet')).toBeVisible()
    await expect(again.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
    return again.url().split('/').at(-1)!
  })

  await test.step('all comes into the record by itself, in order', async () => {
    await server.up()
    await context.setOffline(false)
    const back = Date.now()
    await expect(again.getByText('All in the record')).toBeVisible({ timeout: 5000 })
    await expect(again.getByText('no number yet')).toHaveCount(0, { timeout: 5000 })
    const notes = async () => {
      const { entries } = await (await again.request.get(`/api/outages/${id}/entries?after=0`)).json() as { entries: { entry: { kind: string, body: { words: string } }, standing: string }[] }
      return entries.filter(({ entry }) => entry.kind === 'note-added').slice(-2).map(({ entry, standing }) => `${standing}: ${entry.body.words}`)
    }
    await expect.poll(notes, { timeout: Math.max(1, 5000 - (Date.now() - back)) }).toEqual(['accepted: first, in the machine room', 'accepted: second, in the machine room'])
    expect((await again.request.get(`/api/outages/${lost}`)).status()).toBe(200)
    await again.goto(`/outages/${id}/sent`)
    await hydrated(again)
    await expect(again.getByText('In the record', { exact: true })).toHaveCount(2)
  })
})
