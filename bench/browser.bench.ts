// What folding and verifying a record of 2,000 entries take in Chromium, beside the same code in Node.
import { fileURLToPath } from 'node:url'
import { chromium } from '@playwright/test'
import { build } from 'vite'
import { foldLog } from '~~/shared/record/fold'
import type { benches } from './browser/record'
import { documentOf, longRecord } from './long-record'
import { microseconds } from './measure'

const ENTRIES = 2000
/** A loopback address, where a browser lets a page check signatures; nothing is asked of it. */
const PAGE = 'http://127.0.0.1/'

/** The page's code in one file, as a browser takes it. */
async function script(): Promise<string> {
  const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
  const built = await build({
    configFile: false,
    root,
    logLevel: 'error',
    resolve: { alias: { '~~': root } },
    build: { write: false, lib: { entry: `${root}/bench/browser/record.ts`, formats: ['iife'], name: 'record' } },
  })
  const [first] = Array.isArray(built) ? built : [built]
  if (!first || !('output' in first)) throw new Error('Nothing was built')
  return first.output[0].code
}

const record = longRecord(ENTRIES)
const inNode = microseconds(() => foldLog(record.id, record.entries), 1, 7) / 1_000
const browser = await chromium.launch({ executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium', args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'] })
try {
  const page = await browser.newPage()
  await page.route('**', route => route.fulfill({ contentType: 'text/html', body: '<!doctype html><title>Bench</title>' }))
  await page.goto(PAGE)
  await page.addScriptTag({ content: await script() })
  const fold = await page.evaluate(([id, entries]) => (globalThis as unknown as { benches: typeof benches }).benches.fold(id, entries), [record.id, record.entries] as const)
  const verified = await page.evaluate(document => (globalThis as unknown as { benches: typeof benches }).benches.verify(document), documentOf(record) as unknown)
  if (verified.faults > 0) throw new Error(`${verified.faults} faults in a record that has none`)
  process.stdout.write(`${JSON.stringify({
    name: 'a record of 2,000 entries folded in Chromium',
    ratio: Number((fold / inNode).toFixed(2)),
    baseline: 'the same fold in Node',
    foldMs: Number(fold.toFixed(1)),
    foldInNodeMs: Number(inNode.toFixed(1)),
    verifyPer1000EntriesMs: Number((verified.ms * 1_000 / record.entries.length).toFixed(1)),
    chromium: browser.version(),
  })}\n`)
} finally {
  await browser.close()
}
