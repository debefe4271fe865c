import { axe, expect, hydrated, signInAs, test } from './support/fixtures'

test('an auditor finds a record', async ({ page }) => {
  await signInAs(page, 'auditor@quillfeather.example')
  await page.goto('/records')
  await hydrated(page)
  const status = page.getByRole('status').filter({ hasText: /record/ })
  const codes = page.getByRole('rowheader').getByRole('link')
  await expect(status).toHaveText(/^\d+ records$/)
  const all = await codes.count()
  expect(all).toBeGreaterThan(2)

  await test.step('by its code, with the keyboard alone', async () => {
    await page.getByLabel('Words').focus()
    await page.keyboard.type('q027-0041')
    await page.keyboard.press('Enter')
    await expect(status).toHaveText('1 record fits')
    await expect(codes).toHaveText(['Q027-0041'])
    await expect(page).toHaveURL(/\/records\?words=q027-0041$/)
  })

  await test.step('by several things at once, each of which can be taken away', async () => {
    await page.getByLabel('Phase').selectOption('Dark')
    await expect(page.getByText('No outage fits what is looked for').last()).toBeVisible()
    await axe(page)
    await page.getByRole('button', { name: 'Take away: words “q027-0041”' }).click()
    await expect(codes).toHaveText(['Q008-0007'])
    await expect(page.getByLabel('Words')).toHaveValue('')
  })

  await test.step('in another order, and again by the address alone', async () => {
    await page.getByRole('button', { name: 'Take away: Dark' }).click()
    await page.getByLabel('Order').selectOption('longest-dark')
    await expect(page).toHaveURL(/sort=longest-dark/)
    await expect(codes).toHaveCount(all)
    // Quarry Street has no third defrost heater.
    const withPoint = (await codes.allTextContents()).filter(code => !code.startsWith('Q027'))
    await page.getByText('More to look for').click()
    await page.getByLabel('Point tag').fill('dh-3')
    await page.keyboard.press('Enter')
    await expect(codes).toHaveText(withPoint)
    await page.reload()
    await hydrated(page)
    await expect(page.getByLabel('Point tag')).toHaveValue('dh-3')
    await expect(codes).toHaveText(withPoint)
  })

  await test.step('days that lie the wrong way round are said, not searched', async () => {
    await page.getByLabel('Opened from').fill('2026-03-02')
    await page.getByLabel('Opened to').fill('2026-03-01')
    await page.getByLabel('Opened to').blur()
    await expect(page.getByText('The last day lies before the first')).toBeVisible()
  })
})
