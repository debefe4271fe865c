// That a test's server and all its browsers live in one time; the rule is this project's own.
import { axe, expect, hydrated, signInAs, test } from './support/fixtures'

const SUPERVISOR = 'supervisor@quillfeather.example'
/** Milliseconds that a slow machine may take between two looks at a clock. */
const SLACK = 20_000

test('server, page and another device move together', async ({ page, server, advance, open }) => {
  await page.goto('/sign-in')
  await hydrated(page)
  await axe(page, { enhanced: true })
  await signInAs(page, SUPERVISOR)

  const before = await page.evaluate(() => Date.now())
  await advance(45)
  const after = await page.evaluate(() => Date.now())
  expect(after - before).toBeGreaterThanOrEqual(45 * 60_000)
  expect(Math.abs(after - server.now())).toBeLessThan(SLACK)

  await page.reload()
  await hydrated(page)
  expect(Math.abs(await page.evaluate(() => Date.now()) - server.now())).toBeLessThan(SLACK)

  const other = await open('phone')
  await signInAs(other, SUPERVISOR)
  expect(other.viewportSize()?.width).toBe(390)
  expect(Math.abs(await other.evaluate(() => Date.now()) - server.now())).toBeLessThan(SLACK)
})
