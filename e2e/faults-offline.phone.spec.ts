// What `tests/unit/outbox-faults` tells of a model, in Chromium with the built server: killed, cut off, answers lost and doubled.
import type { CDPSession, Page, Route } from '@playwright/test'
import { verifyRecord } from '../scripts/verify.mjs'
import type { StoredEntry } from '../shared/record/entry'
import { expect, hydrated, signInAs, test } from './support/fixtures'
import { enrol, sign } from './support/run'

/** What a browser says on its console of a request that was cut off, refused or met a server that was going down. */
const UNHEARD = /console error: Failed to load resource: (net::ERR_|the server responded with a status of (502|503))/
/** All that waits is in the record this soon after the network is back, on a machine with much else to do, ms; each step says how long it took. */
const DRAINED_MS = 15_000
const PUSH = /\/api\/outages\/[^/]+\/entries$/

const cut = (browser: CDPSession, offline: boolean) => browser.send('Network.emulateNetworkConditions', { offline, latency: 0, downloadThroughput: -1, uploadThroughput: -1 })

/** Signs a note and waits until the phone says that it is kept. */
async function signNote(page: Page, id: string, words: string) {
  await page.goto(`/outages/${id}/note`)
  await page.getByLabel('Note').fill(words)
  await sign(page, 'Sign the note')
  await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
}

/** Does something to the next push in place of sending it. */
async function onNextPush(page: Page, meet: (route: Route) => Promise<void>): Promise<{ met: Promise<void> }> {
  let done: () => void
  const met = new Promise<void>((resolve) => { done = resolve })
  let first = true
  await page.route(PUSH, async (route) => {
    if (route.request().method() !== 'POST' || !first) return route.fallback()
    first = false
    await meet(route)
    done()
  })
  return { met }
}

test('a killed server, a cut network, lost and doubled answers: nothing is lost, nothing doubled, and each entry is said to be where it is', async ({ page, context, server, faults, open }, info) => {
  test.setTimeout(180_000)
  faults.allow(UNHEARD)
  await signInAs(page, 'technician@quillfeather.example')
  await enrol(page)
  const { items } = await (await page.request.get('/api/outages')).json() as { items: { id: string, phase: string }[] }
  const { id } = items.find(item => item.phase === 'dark')!
  await page.goto(`/outages/${id}`)
  await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
  await page.evaluate(async () => { await navigator.serviceWorker.ready })
  const browser = await context.newCDPSession(page)
  await browser.send('Network.enable')

  const log = async () => (await (await page.request.get(`/api/outages/${id}/entries?after=0`)).json() as { entries: StoredEntry[] }).entries
  const mine = async () => (await log()).flatMap(({ entry, standing }) => entry.kind === 'note-added' && signed.includes(entry.body.words) ? [`${standing}: ${entry.body.words}`] : [])
  const signed: string[] = []
  const drains: Record<string, number> = {}

  /** All that was signed is in the record, once and in order, soon after `since`; and the phone says so. */
  async function expectDrained(what: string, since: number) {
    await expect.poll(mine, { timeout: Math.max(1, DRAINED_MS - (Date.now() - since)), intervals: [50] }).toEqual(signed.map(words => `accepted: ${words}`))
    drains[what] = Date.now() - since
    await expect(page.getByText('All in the record')).toBeVisible()
  }
  async function expectPlaces(kept: number, inRecord: number) {
    await page.goto(`/outages/${id}/sent`)
    await hydrated(page)
    await expect(page.getByText('Kept on this phone', { exact: true })).toHaveCount(kept)
    await expect(page.getByText('In the record', { exact: true })).toHaveCount(inRecord)
    await page.goto(`/outages/${id}`)
  }
  const write = async (words: string) => {
    signed.push(words)
    await signNote(page, id, words)
  }

  for (const wait of [0, 15]) {
    await test.step(`the server is killed ${wait} ms after a push has gone out`, async () => {
      const { met } = await onNextPush(page, async (route) => {
        void route.continue().catch(() => undefined)
        await new Promise(resolve => setTimeout(resolve, wait))
        await server.kill()
      })
      await write(`signed as the server went down, ${wait}`)
      await met
      await write(`signed without a server, ${wait}`)
      await expect(page.getByText(/entr(y|ies) kept on this phone/).first()).toBeVisible()
      await server.up()
      await expectDrained(`killed after ${wait} ms`, Date.now())
    })
  }

  await test.step('the network is cut as a push goes out, and comes back', async () => {
    const { met } = await onNextPush(page, async (route) => {
      await cut(browser, true)
      await route.continue().catch(() => undefined)
    })
    await write('signed as the network went')
    await met
    await write('signed without a network')
    await expect(page.getByText(/entr(y|ies) kept on this phone/).first()).toBeVisible()
    await cut(browser, false)
    await expectDrained('cut off', Date.now())
  })

  await test.step('the server has stored a push, and its answer is lost; the push comes twice', async () => {
    let sizes: number[] = []
    const { met } = await onNextPush(page, async (route) => {
      const before = (await log()).length
      await route.fetch()
      const once = (await log()).length
      await route.fetch()
      sizes = [before, once, (await log()).length]
      await route.abort('connectionreset')
    })
    await write('stored, and nobody was told')
    await met
    const since = Date.now()
    expect(sizes[1]).toBeGreaterThan(sizes[0]!)
    expect(sizes[2]).toBe(sizes[1])
    await expectDrained('answer lost', since)
  })

  await expectPlaces(0, signed.length)

  const desk = await open('desk')
  await signInAs(desk, 'auditor@quillfeather.example')
  const record = await (await desk.request.get(`/api/outages/${id}/record.json`)).json()
  expect(verifyRecord(record)).toMatchObject({ faults: [] })
  info.annotations.push({ type: 'drained after, ms', description: JSON.stringify(drains) })
})
