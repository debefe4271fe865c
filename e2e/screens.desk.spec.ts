import { signInAs, test } from './support/fixtures'
import { look } from './support/look'

// Who sits at a desk.
const people = {
  technician: 'technician@quillfeather.example',
  auditor: 'auditor@quillfeather.example',
  administrator: 'admin@quillfeather.example',
}

interface Item { id: string, phase: string }

test('the auditor\'s screens', async ({ page }) => {
  test.setTimeout(300_000)
  await signInAs(page, people.auditor)
  const { items } = await (await page.request.get('/api/outages')).json() as { items: Item[] }
  const submitted = items.find(item => item.phase === 'submitted')!
  const sealed = items.find(item => item.phase === 'sealed')!
  for (const path of ['/watch', `/watch/${submitted.id}`]) await look(page, path, false)
  for (const path of ['/', '/records', '/records?tag=C-1&sort=shortest-hold&from=2026-01-01', '/insights', '/exports', `/records/${sealed.id}`, '/retention/deleted']) await look(page, path, false)
})

test('the administrator\'s screens', async ({ page }) => {
  test.setTimeout(300_000)
  await signInAs(page, people.administrator)
  const { items } = await (await page.request.get('/api/outages')).json() as { items: Item[] }
  const sealed = items.find(item => item.phase === 'sealed')!
  const sites = await (await page.request.get('/api/sites')).json() as { id: string }[]
  const technician = (await (await page.request.get('/api/people')).json() as { items: { id: string, email: string }[] }).items.find(person => person.email === people.technician)!
  for (const path of ['/', '/people', '/people/new', `/people/${technician.id}`, '/sites', `/sites/${sites[0]!.id}`, `/sites/${sites[0]!.id}/limits`, `/sites/${sites[0]!.id}/alerts`, `/sites/${sites[0]!.id}/history`, '/people/history', '/admin/mail', '/admin/mailbox', '/retention', '/retention/due', '/retention/history', `/retention/records/${sealed.id}`, '/account/device', '/work-kinds/history', '/exports/history', '/rulebooks/eu-853-2004', '/work-kinds', '/account']) await look(page, path, false)
})
