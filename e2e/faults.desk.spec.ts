// That the watch over every other test here does notice; the rules are this project's own.
import { expect, test } from '@playwright/test'
import type { BrowserContext } from '@playwright/test'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { collectFaults } from './support/faults'

/** Serves one page on the loopback, opens it, and answers what the watch has noticed after half a second. */
async function faultsOf(context: BrowserContext, html: string, { policy = '', allow }: { policy?: string, allow?: RegExp } = {}) {
  const server = createServer((request, response) => {
    response.writeHead(200, { 'content-type': 'text/html', ...policy ? { 'content-security-policy': policy } : {} })
    response.end(request.url === '/' ? `<!doctype html><link rel="icon" href="data:,">${html}` : '')
  }).listen(0, '127.0.0.1')
  await new Promise(resolve => server.once('listening', resolve))
  const faults = collectFaults()
  if (allow) faults.allow(allow)
  faults.watch(context)
  const page = await context.newPage()
  await page.goto(`http://127.0.0.1:${(server.address() as AddressInfo).port}/`)
  await page.waitForTimeout(500)
  await page.close()
  server.closeAllConnections()
  server.close()
  return faults.list()
}

test('a quiet page has no fault', async ({ context }) => {
  expect(await faultsOf(context, '<p>Quiet</p><script>console.log("said")</script>')).toEqual([])
})

test('an error in the console is noticed', async ({ context }) => {
  expect(await faultsOf(context, '<script>console.error("so bad")</script>')).toEqual([expect.stringContaining('console error: so bad')])
})

test('an uncaught error and a rejection that nobody takes are noticed', async ({ context }) => {
  const faults = await faultsOf(context, '<script>setTimeout(() => { throw new Error("thrown") }); Promise.reject(new Error("rejected"))</script>')
  expect(faults.filter(fault => fault.startsWith('uncaught')).join()).toMatch(/rejected[\s\S]*thrown|thrown[\s\S]*rejected/)
})

test('a hydration mismatch is noticed even as a warning', async ({ context }) => {
  expect(await faultsOf(context, '<script>console.warn("Hydration node mismatch")</script>')).toHaveLength(1)
})

test('a breach of the content policy is noticed', async ({ context }) => {
  const faults = await faultsOf(context, '<script>document.title = "ran"</script>', { policy: 'script-src \'none\'' })
  expect(faults.join()).toContain('Content Security Policy')
})

test('a request off the machine is noticed', async ({ context }) => {
  await context.route('http://elsewhere.example/**', route => route.fulfill({ status: 200, body: '' }))
  expect(await faultsOf(context, '<img alt="" src="http://elsewhere.example/dot.png">')).toContainEqual('request off the machine: GET http://elsewhere.example/dot.png')
})

test('what a test brings about on purpose passes', async ({ context }) => {
  expect(await faultsOf(context, '<script>console.error("expected refusal"); console.error("another")</script>', { allow: /expected refusal/ }))
    .toEqual([expect.stringContaining('another')])
})
