import { expect, hydrated, signInAs, test } from './support/fixtures'
import { enrol, sign } from './support/run'

/** What is signed on a phone shows on the watch by itself, and an order from there shows on the phone. */
test('a phone and the watch see each other', async ({ page, open }) => {
  test.setTimeout(120_000)
  const desk = await open('desk')
  await signInAs(page, 'technician@quillfeather.example')
  await enrol(page)
  await signInAs(desk, 'supervisor@quillfeather.example')
  await expect(desk).toHaveURL(/\/watch$/)
  await enrol(desk)

  const { items } = await (await page.request.get('/api/outages')).json() as { items: { id: string, phase: string, code: string }[] }
  const dark = items.find(item => item.phase === 'dark')!
  await desk.goto('/watch')
  await expect(desk.getByRole('heading', { level: 1 })).toHaveText(/^\s*\d sites? without control\s*$/)
  await expect(desk.getByText('Live', { exact: true })).toBeVisible()
  await desk.getByRole('link').filter({ hasText: dark.code }).click()
  await expect(desk.getByRole('heading', { name: 'Latest entries' })).toBeVisible()

  await test.step('a note signed on the phone appears beside the watch without reload', async () => {
    await page.goto(`/outages/${dark.id}/note`)
    await hydrated(page)
    await page.getByLabel('Note').fill('Night covers drawn by the second aisle')
    await sign(page, 'Sign the note')
    await expect(desk.getByText('Night covers drawn by the second aisle')).toBeVisible({ timeout: 10_000 })
  })

  await test.step('an order to turn back, signed at the desk, stands large on the phone', async () => {
    await desk.getByRole('button', { name: 'Order to turn back…' }).click()
    await desk.getByLabel('Why the work is left').fill('The fish comes first')
    await sign(desk, 'Sign: order to turn back')
    await expect(desk.getByText(/^Ordered: .+ screen says so/)).toBeVisible()
    await expect(page.getByRole('alert').filter({ hasText: 'The fish comes first' })).toBeVisible({ timeout: 15_000 })
    await page.getByRole('link', { name: 'Go to the way back…' }).click()
    await expect(page.getByLabel('Why')).toHaveValue(/^As ordered by .+: The fish comes first$/)
    await sign(page, 'Sign: turn back')
    await expect(desk.getByText(/^\s*Turning back since/)).toBeVisible({ timeout: 10_000 })
  })
})
