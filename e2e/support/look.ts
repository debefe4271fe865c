import type { Page } from '@playwright/test'
import { expect, test } from '@playwright/test'
import { axe, hydrated } from './fixtures'

/** Every screen, for the people who use it: nothing wider than the screen, and no accessibility fault. */
export async function look(page: Page, path: string, enhanced: boolean) {
  await test.step(path, async () => {
    await page.goto(path)
    await hydrated(page)
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
    await expect(page.getByText('Reading the log…')).toHaveCount(0)
    expect.soft(await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth), `${path} is wider than the screen`).toBeLessThanOrEqual(0)
    await axe(page, { enhanced })
  })
}
