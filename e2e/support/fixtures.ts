import { expect, test as base } from '@playwright/test'
import type { BrowserContext, BrowserContextOptions, Page } from '@playwright/test'
import { DEMO_PASSWORD } from '../../tests/support/client'
import { startTestServer } from '../../tests/support/server'
import type { TestServer } from '../../tests/support/server'
import { collectFaults } from './faults'
import type { Faults } from './faults'

export { axe } from './axe'
export { expect }

/** The two sizes of screen that Holdover is drawn for. */
const SCREENS = {
  phone: { viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true },
  desk: { viewport: { width: 1280, height: 800 }, hasTouch: false, isMobile: false },
} satisfies Record<string, BrowserContextOptions>

interface TestFixtures {
  faults: Faults
  /** Every context of this test; `page` is in the first. */
  contexts: BrowserContext[]
  /** Opens a browser of its own, as another person's device. */
  open: (screen: keyof typeof SCREENS, options?: BrowserContextOptions) => Promise<Page>
  /** Moves the clocks of the server and of every open browser on, firing the timers on the way. */
  advance: (minutes: number) => Promise<void>
}

interface WorkerFixtures {
  /** The built server with the demo's seed. A worker has one; a failed test or a change of project brings a fresh one. */
  server: TestServer
}

export const test = base.extend<TestFixtures, WorkerFixtures>({
  server: [async ({ playwright: _playwright }, use) => {
    const server = await startTestServer({ demo: true })
    await use(server)
    await server.stop()
  }, { scope: 'worker', timeout: 180_000 }],

  baseURL: async ({ server }, use) => use(server.url),

  faults: async ({ playwright: _playwright }, use) => {
    const faults = collectFaults()
    await use(faults)
    expect(faults.list(), 'faults noticed while the test ran').toEqual([])
  },

  contexts: async ({ playwright: _playwright }, use) => use([]),

  context: async ({ context, contexts, faults, server }, use) => {
    await prepare(context, contexts, faults, server)
    await use(context)
  },

  open: async ({ browser, contexts, faults, server }, use) => {
    const opened: BrowserContext[] = []
    await use(async (screen, options = {}) => {
      const context = await browser.newContext({ ...SCREENS[screen], ...options })
      opened.push(context)
      await prepare(context, contexts, faults, server)
      return context.newPage()
    })
    for (const context of opened) await context.close()
  },

  advance: async ({ contexts, server }, use) => {
    await use(async (minutes) => {
      await server.advance(minutes)
      for (const context of contexts) await context.clock.fastForward(minutes * 60_000)
    })
  },
})

/** Watches a context and gives it the server's time, which earlier tests may have moved. */
async function prepare(context: BrowserContext, contexts: BrowserContext[], faults: Faults, server: TestServer) {
  faults.watch(context)
  await context.clock.install({ time: server.now() })
  contexts.push(context)
}

/** Waits until the page answers to a touch. */
export async function hydrated(page: Page) {
  await page.waitForFunction(() => {
    const { useNuxtApp } = window as { useNuxtApp?: () => { isHydrating?: boolean } }
    return useNuxtApp?.().isHydrating === false
  })
}

/** Signs a person in, by the sign-in page to which the first page leads, and waits for the page behind it. */
export async function signInAs(page: Page, email: string, password = DEMO_PASSWORD) {
  await page.goto('/')
  await hydrated(page)
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  const button = page.getByRole('button', { name: 'Sign in' })
  await button.click()
  await expect(button).toBeHidden()
  await hydrated(page)
}
