import { axe, signInAs, test } from './support/fixtures'
import { look } from './support/look'
import { enrol } from './support/run'

const people = {
  technician: 'technician@quillfeather.example',
  supervisor: 'supervisor@quillfeather.example',
}

interface Item { id: string, phase: string, planSubmitted: boolean }

test('the technician\'s screens', async ({ page }) => {
  test.setTimeout(300_000)
  await signInAs(page, people.technician)
  await look(page, '/account/device', true)
  await enrol(page)
  const { items } = await (await page.request.get('/api/outages')).json() as { items: Item[] }
  const dark = items.find(item => item.phase === 'dark')!
  const caseId = Object.keys((await (await page.request.get(`/api/outages/${dark.id}`)).json()).cases)[0]
  const tag = Object.keys((await (await page.request.get(`/api/outages/${dark.id}`)).json()).points)[0]
  const instrumentId = (await (await page.request.get(`/api/outages/${dark.id}`)).json()).snapshot.instruments[0].id
  for (const path of ['/', '/outages', '/outages/new', '/outages/lost', '/account', '/rulebooks', '/rulebooks/us-food-code-2022', '/rulebooks/us-food-code-2022/trial']) await look(page, path, true)
  for (const path of ['', '/round', '/points', `/points/${encodeURIComponent(tag!)}`, '/pressures', '/steps', '/act', `/act/${caseId}`, '/turn-back', '/back', '/note', '/sent', '/silence', '/plan', '/questioned', '/hands', '/voice', '/other-log', '/correct', '/questions', '/instruments', `/instruments/${instrumentId}`]) await look(page, `/outages/${dark.id}${path}`, true)
  const planned = items.find(item => item.phase === 'plan')!
  for (const path of ['', '/plan-edit', '/accept-margin', '/call-off', '/lost', '/checks', '/go-dark', '/return', '/proofs', '/exception', '/defrost', '/submit']) await look(page, `/outages/${planned.id}${path}`, true)
  await test.step('the PIN', async () => {
    await page.goto(`/outages/${dark.id}/note`)
    await page.getByLabel('Note').fill('Not signed')
    await page.getByRole('button', { name: 'Sign the note' }).click()
    // Looked at without a locator: those give the PIN by themselves.
    await page.waitForFunction(() => document.activeElement?.closest('dialog[open]'))
    await axe(page, { enhanced: true })
    await page.keyboard.press('Escape')
    await page.waitForFunction(() => document.body.innerText.includes('Nothing is signed: the PIN was not given.'))
  })
})

test('the screens of the supervisor and of whoever has no account', async ({ page }) => {
  test.setTimeout(300_000)
  for (const path of ['/verify', '/forgot', '/notice/none.such', '/welcome/none.such', '/new-password/none.such']) await look(page, path, false)
  await signInAs(page, people.supervisor)
  const { items } = await (await page.request.get('/api/outages')).json() as { items: Item[] }
  const submitted = items.find(item => item.phase === 'submitted')!
  const dark = items.find(item => item.phase === 'dark')!
  for (const path of ['/watch', `/watch/${dark.id}`]) await look(page, path, false)
  for (const path of ['/records', '/records?words=nobodywrotethis', '/insights', '/exports', `/records/${submitted.id}`, `/outages/${submitted.id}`, `/outages/${submitted.id}/review`]) await look(page, path, false)
})
