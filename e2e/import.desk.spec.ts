import { axe, expect, hydrated, signInAs, test } from './support/fixtures'

interface Site { id: string, name: string }

const BAD = 'tag;kind;name;rack;rated_a\nX-1;compressor;Compressor X;No such rack;12\n;light;Nameless light;;\nX-1;light;Twice;;\nX-9;light;Lobby light;;many\n'
const GOOD = '\uFEFFtag;kind;name;place;hand;through_off\nLT-X1;light;Sign lights;Panel A, selector 9;on;no\nLT-1;light;Case lights, shop floor;;;\n'

test('a point list is imported only once it has no fault', async ({ page, faults }) => {
  test.setTimeout(120_000)
  // A list with faults is answered with 422 where it is imported all the same; the preview says them without.
  faults.allow(/422/)
  await signInAs(page, 'admin@quillfeather.example')
  const sites = await (await page.request.get('/api/sites')).json() as Site[]
  const quarry = sites.find(site => site.name === 'Quarry Street')!
  const { controllers } = await (await page.request.get(`/api/sites/${quarry.id}`)).json() as { controllers: { id: string }[] }
  await page.goto(`/sites/${quarry.id}/controllers/${controllers[0]!.id}/import`)
  await hydrated(page)

  await test.step('a bad list: each fault with its row and column, and nothing lands', async () => {
    await page.getByLabel('Or paste it').fill(BAD)
    await page.getByRole('button', { name: 'Preview the list' }).click()
    await expect(page.getByText(/Nothing can be imported yet/)).toBeVisible()
    for (const column of ['rack', 'tag', 'rated_a']) await expect(page.getByRole('cell', { name: column, exact: true }).or(page.getByText(column, { exact: true })).first()).toBeVisible()
    await expect(page.getByRole('button', { name: /^Import \d/ })).toHaveCount(0)
    await axe(page)
  })

  await test.step('a good list in UTF-8 with a byte order mark and semicolons', async () => {
    await page.getByLabel('Point list').setInputFiles({ name: 'points.csv', mimeType: 'text/csv', buffer: Buffer.from(GOOD, 'utf8') })
    await page.getByRole('button', { name: 'Preview the list' }).click()
    await expect(page.getByText('Sign lights').first()).toBeVisible()
    await page.getByRole('button', { name: /^Import \d/ }).click()
    await expect(page.getByText(/^\s*Imported: 1 new, 1 changed/)).toBeVisible()
  })

  await test.step('the same list again changes nothing', async () => {
    await page.reload()
    await hydrated(page)
    await page.getByLabel('Or paste it').fill(GOOD)
    await page.getByRole('button', { name: 'Preview the list' }).click()
    await expect(page.getByText('There is nothing to import.')).toBeVisible()
  })
})
