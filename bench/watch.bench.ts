// How long after a phone has sent an entry a hundred screens that watch two hundred outages hold what changed, from the
// built server; and what one such change costs a browser in script.
import { chmod, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { chromium } from '@playwright/test'
import type { CDPSession, Page } from '@playwright/test'
import { buildServer } from '../scripts/lib/build.mjs'
import { startPostgres } from '../scripts/lib/postgres.mjs'
import { closeAll, onClose } from '../scripts/lib/processes.mjs'
import type { WatchAnswer } from '../shared/schemas/watch'
import { openStream } from '../tests/support/stream'
import type { World } from '../tests/support/world'
import { startWorld } from '../tests/support/world'

const OUTAGES = 200
const WATCHERS = 100
const PUSHES = 40
const REPAINTS = 20

const pause = (ms: number) => new Promise(resolve => setTimeout(resolve, ms))
const at = (values: number[], share: number) => [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(values.length * share))]!
const rounded = (value: number) => Number(value.toFixed(1))

/** A PostgreSQL of its own, which writes to the disk at each commit; one that is named by the environment is used instead. */
async function findPostgres(): Promise<void> {
  if (process.env.TEST_DATABASE_ADMIN_URL) return
  const room = await mkdtemp(join(tmpdir(), 'holdover-bench-'))
  onClose(() => rm(room, { recursive: true, force: true }))
  await chmod(room, 0o711)
  process.env.TEST_DATABASE_ADMIN_URL = (await startPostgres(room)).urlOf('postgres')
}

async function measure(world: World) {
  const phone = await world.phoneOf('technician')
  const { client } = world.people.supervisor
  const outages: string[] = []
  for (let place = 0; place < OUTAGES; place++) {
    const outage = await world.open(phone, world.server.now() - (5 + place % 20) * 60_000)
    for (const item of world.snapshot.cases) await phone.act(outage, 'reading-taken', { round: 0, caseId: item.id, value: 37 + place % 4, unit: 'F', method: 'product', instrumentId: null, words: '', photos: [] })
    outages.push(outage)
  }
  const pull = (only?: string[]) => client.send<WatchAnswer>('POST', '/api/watch/outages', { known: {}, only })
  const began = performance.now()
  const { body: all } = await pull()
  const wholeMs = performance.now() - began
  if (all.items.length !== OUTAGES) throw new Error(`${all.items.length} of ${OUTAGES} outages are on the watch`)

  const streams = await Promise.all(Array.from({ length: WATCHERS }, () => openStream(client)))
  for (const stream of streams) await stream.next('beat')
  const note = (outage: string) => phone.act(outage, 'note-added', { words: 'night covers are down' })
  const [held, pushed, bare]: number[][] = [[], [], []]
  for (let push = 0; push < PUSHES; push++) {
    const outage = outages[push * 5 % OUTAGES]!
    const sent = performance.now()
    const screens = streams.map(async (stream) => {
      const { outage: woken } = await stream.next('wake', 20_000)
      const { body } = await pull([woken as string])
      if (body.items[0]?.id !== outage) throw new Error('another outage woke')
      held!.push(performance.now() - sent)
    })
    await note(outage)
    pushed!.push(performance.now() - sent)
    await Promise.all(screens)
    // The same pulls alone, as the least that a hundred screens cost.
    const asked = performance.now()
    await Promise.all(streams.map(() => pull([outage]).then(() => bare!.push(performance.now() - asked))))
    await pause(100)
  }
  for (const stream of streams) stream.close()
  return { held: held!, pushed: pushed!, bare: bare!, wholeMs, wholeKb: JSON.stringify(all).length / 1024, ...await inBrowser(world, outages, note) }
}

/** Milliseconds of script, style and layout in the page since it was opened. */
async function spent(session: CDPSession): Promise<{ script: number, layout: number }> {
  const { metrics } = await session.send('Performance.getMetrics') as { metrics: { name: string, value: number }[] }
  const of = (name: string) => (metrics.find(metric => metric.name === name)?.value ?? 0) * 1000
  return { script: of('ScriptDuration'), layout: of('LayoutDuration') + of('RecalcStyleDuration') }
}

/** What one wake-up costs a browser that shows all outages, less what its clocks cost in the same time. */
async function inBrowser(world: World, outages: string[], note: (outage: string) => Promise<unknown>) {
  const browser = await chromium.launch({ executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium', args: ['--no-sandbox', '--disable-gpu'] })
  try {
    const context = await browser.newContext({ viewport: { width: 1280, height: 800 } })
    await context.addCookies([...world.people.supervisor.client.cookies].map(([name, value]) => ({ name, value, url: world.server.url })))
    const page = await context.newPage()
    await page.goto(`${world.server.url}/watch`)
    await page.waitForFunction(count => document.querySelectorAll('.watch-row').length === count, outages.length, { timeout: 60_000 })
    await page.getByText('Live', { exact: true }).waitFor()
    const session = await context.newCDPSession(page)
    await session.send('Performance.enable')
    const [idle, woken]: { script: number, layout: number }[][] = [[], []]
    for (let turn = 0; turn < REPAINTS; turn++) {
      idle!.push(await over(page, session, async () => undefined))
      woken!.push(await over(page, session, () => note(outages[turn]!)))
    }
    const less = (of: 'script' | 'layout') => rounded(at(woken!.map(one => one[of]), 0.5) - at(idle!.map(one => one[of]), 0.5))
    return { script: less('script'), layout: less('layout'), clocksScript: rounded(at(idle!.map(one => one.script), 0.5)), slowestScript: rounded(at(woken!.map(one => one.script), 1)) }
  } finally {
    await browser.close()
  }
}

async function over(page: Page, session: CDPSession, work: () => Promise<unknown>): Promise<{ script: number, layout: number }> {
  const before = await spent(session)
  await work()
  await page.waitForTimeout(1000)
  const after = await spent(session)
  return { script: after.script - before.script, layout: after.layout - before.layout }
}

await buildServer(fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, ''))
await findPostgres()
const world = await startWorld()
try {
  const { held, pushed, bare, wholeMs, wholeKb, script, layout, clocksScript, slowestScript } = await measure(world)
  process.stdout.write(`\n${JSON.stringify({
    name: `from a phone's request to ${WATCHERS} screens that watch ${OUTAGES} outages`,
    ratio: rounded(at(held, 0.5) / at(bare, 0.5)),
    baseline: `${WATCHERS} screens that ask for one outage in the same moment, nothing signed and nobody woken`,
    p50Milliseconds: rounded(at(held, 0.5)),
    p99Milliseconds: rounded(at(held, 0.99)),
    requestOfThePhoneMilliseconds: rounded(at(pushed, 0.5)),
    baselineMilliseconds: rounded(at(bare, 0.5)),
    wholeWatchMilliseconds: rounded(wholeMs),
    wholeWatchKilobytes: rounded(wholeKb),
    scriptOfOneWakeUpMilliseconds: script,
    layoutOfOneWakeUpMilliseconds: layout,
    scriptOfClocksASecondMilliseconds: clocksScript,
    slowestSecondOfScriptMilliseconds: slowestScript,
    goalOfScriptMilliseconds: 'under 50',
  })}\n`)
} finally {
  await world.server.stop()
  await closeAll()
}
