import { expect } from '@playwright/test'
import type { Page } from '@playwright/test'
import { DEMO_PASSWORD } from '../../tests/support/client'
import { hydrated } from './fixtures'

export const PIN = '407152'

/** Enrols the browser of somebody who is signed in as their signing device, and gives its PIN from then on wherever it is asked for. */
export async function enrol(page: Page) {
  await page.goto('/account/device')
  await hydrated(page)
  for (const label of ['Choose a signing PIN', 'The same PIN once more']) {
    await page.getByLabel(label, { exact: true }).click()
    await page.keyboard.type(PIN)
  }
  await page.getByLabel('Password').fill(DEMO_PASSWORD)
  await page.getByRole('button', { name: 'Enrol this browser' }).click()
  await expect(page).not.toHaveURL(/account\/device/)
  await givePin(page)
}

/** Gives the PIN on a page wherever it is asked for. */
export async function givePin(page: Page) {
  await page.addLocatorHandler(page.getByRole('dialog', { name: /^PIN / }), async (dialog) => {
    await dialog.getByLabel('Signing PIN', { exact: true }).click()
    await page.keyboard.type(PIN)
  })
}

/** Presses a button that signs, and waits until it has. */
export async function sign(page: Page, name: string | RegExp) {
  await page.getByRole('button', { name }).click()
  await expect(page.getByText('Signing…')).toHaveCount(0)
}

/** Signs every open check on the page of checks. */
export async function signChecks(page: Page, count: number) {
  for (let left = count; left > 0; left--) {
    await expect(page.getByRole('img', { name: 'signed' })).toHaveCount(count - left)
    await sign(page, 'Sign: done')
  }
  await expect(page.getByText('All are signed.')).toBeVisible()
}

/** Reads every case that the round lists. @param readings by case name, or one for all, in the site's unit */
export async function takeRound(page: Page, reading: (name: string) => number) {
  // Until the log is read, the page says only that it is an outage.
  await expect(page.getByRole('heading', { level: 1 })).toHaveText(/^(?!\s*Outage\s*$)\s*\S/)
  for (;;) {
    const name = (await page.getByRole('heading', { level: 1 }).textContent())!.trim()
    if (/Round \d+ is complete/.test(name)) return
    const value = reading(name)
    const field = page.getByRole('textbox', { name, exact: true })
    await field.click()
    await page.keyboard.type(String(Math.round(Math.abs(value) * 10)))
    if (value < 0) await page.keyboard.type('-')
    await page.getByRole('button', { name: `Sign: ${name}` }).click()
    const sure = page.getByRole('button', { name: /^It is right/ })
    await expect(async () => {
      if (await sure.isVisible()) await sure.click()
      await expect(page.getByRole('heading', { level: 1, name, exact: true })).toHaveCount(0, { timeout: 1000 })
    }).toPass({ timeout: 15_000 })
  }
}

/** Puts every point of the list in hand as the plan says; each is seen as asked. */
export async function putPointsInHand(page: Page, amps = '12.4') {
  const done = page.getByRole('link', { name: 'All are in hand or excused: go on' })
  const button = page.getByRole('button', { name: /^Sign: .+/ })
  await expect(button.or(done)).toBeVisible()
  while (await button.isVisible()) {
    const name = (await button.textContent())!.trim()
    await page.getByRole('radio').first().check({ force: true })
    const current = page.getByLabel('Current, A')
    if (await current.isVisible()) await current.fill(amps)
    await button.click()
    await expect(page.getByRole('button', { name, exact: true })).toHaveCount(0)
    await expect(button.or(done)).toBeVisible()
  }
  await expect(done).toBeVisible()
}

/** Returns every point to the controller; each is seen to answer, but for those that `notCalled` names. */
export async function returnPoints(page: Page, notCalled: string[] = []) {
  const done = page.getByText('Nothing is left in hand.')
  const button = page.getByRole('button', { name: /^Sign: .+ back in auto$/ })
  await expect(button.or(done)).toBeVisible()
  while (await button.isVisible()) {
    const name = (await button.textContent())!.trim()
    const tag = /^Sign: (.+) back in auto$/.exec(name)![1]!
    await page.getByRole('radio', { name: notCalled.includes(tag) ? /^Not called for now/ : /^It answers the controller/ }).check({ force: true })
    await button.click()
    await expect(page.getByRole('button', { name, exact: true })).toHaveCount(0)
    await expect(button.or(done)).toBeVisible()
  }
}

/** Signs suction (and discharge) of every group. */
export async function readPressures(page: Page, suction: number[]) {
  const buttons = page.getByRole('button', { name: /^Sign: .+ pressures$/ })
  await expect(buttons).toHaveCount(suction.length)
  for (const [index, value] of suction.entries()) {
    await page.getByLabel(/^Suction/).nth(index).fill(String(value))
    await buttons.nth(index).click()
    await expect(page.getByLabel(/^Suction/).nth(index)).toHaveValue('')
  }
}

/** Types the name where a signature is drawn. */
export async function typeSignature(page: Page, name: string) {
  await page.getByRole('button', { name: 'Type it instead' }).click()
  await page.getByLabel('Your name').fill(name)
}
