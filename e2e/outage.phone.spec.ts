import { execFile } from 'node:child_process'
import { promisify } from 'node:util'
import { expect, hydrated, signInAs, test } from './support/fixtures'
import { enrol, putPointsInHand, readPressures, returnPoints, sign, signChecks, takeRound, typeSignature } from './support/run'

const run = promisify(execFile)

/** One outage whole: planned, approved, run, handed back, countersigned, read and exported. */
test('an outage from plan to the auditor\'s PDF', async ({ page, open, advance }, info) => {
  test.setTimeout(600_000)
  const desk = await open('desk')

  await test.step('technician and supervisor enrol their browsers', async () => {
    await signInAs(page, 'technician@quillfeather.example')
    await enrol(page)
    await signInAs(desk, 'supervisor@quillfeather.example')
    await enrol(desk)
  })

  const id = await test.step('the technician plans', async () => {
    await page.goto('/outages/new')
    await hydrated(page)
    const controllers = page.getByLabel('Controller')
    await controllers.selectOption({ index: await optionOf(page, 'Controller', /Quarry Street/) })
    await page.getByLabel('Kind of work').selectOption({ label: 'Software update' })
    await sign(page, 'Sign: open the plan')
    await expect(page.getByRole('heading', { level: 1, name: 'Plan' })).toBeVisible()
    await sign(page, 'Sign: send for approval')
    await expect(page.getByRole('heading', { level: 1, name: 'Plan waiting for approval' })).toBeVisible()
    return page.url().split('/').at(-1)!
  })

  await test.step('the supervisor approves', async () => {
    await desk.goto(`/outages/${id}`)
    await sign(desk, 'Sign: approved')
    await expect(desk.getByRole('heading', { level: 1, name: 'Approved' })).toBeVisible()
  })

  await test.step('checks, round 0, points in hand', async () => {
    await page.goto(`/outages/${id}`)
    await sign(page, 'Sign: begin to put points in hand')
    await page.getByRole('link', { name: /^Sign the checks/ }).click()
    await signChecks(page, 7)
    await page.getByRole('link', { name: 'Go on' }).click()
    await page.getByRole('link', { name: /^Take round 0/ }).click()
    await takeRound(page, name => /freez|ice cream|frozen/i.test(name) ? -5.2 : 36.4)
    await page.getByRole('link', { name: 'Go on' }).click()
    await page.getByRole('link', { name: /^Put points in hand:/ }).click()
    await putPointsInHand(page)
    await page.getByRole('link', { name: 'All are in hand or excused: go on' }).click()
  })

  await test.step('the gate stays shut until suction is steady for ten minutes', async () => {
    await page.goto(`/outages/${id}/go-dark`)
    await expect(page.getByText('The gate is shut:')).toBeVisible()
    await expect(page.getByRole('button', { name: 'Sign: control is taken away now' })).toHaveCount(0)
    await page.goto(`/outages/${id}/pressures`)
    const suction = await targets(page)
    await readPressures(page, suction)
    await advance(11)
    await readPressures(page, suction.map(value => value + 1))
    await page.goto(`/outages/${id}/go-dark`)
    await sign(page, 'Sign: control is taken away now')
    await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
  })

  await test.step('dark: rounds, steps, a note, control back', async () => {
    await advance(9)
    await page.getByRole('link', { name: /^Take round/ }).click()
    await takeRound(page, name => /freez|ice cream|frozen/i.test(name) ? -3.1 : 37.9)
    await page.goto(`/outages/${id}/note`)
    await page.getByLabel('Note').fill('Night covers drawn')
    await sign(page, 'Sign the note')
    await expect(page.getByRole('heading', { level: 1, name: 'Without control' })).toBeVisible()
    await page.goto(`/outages/${id}/steps`)
    await sign(page, /^Sign: begun.*Load the program/)
    await advance(14)
    await page.goto(`/outages/${id}`)
    await page.getByRole('link', { name: 'Control is back…' }).click()
    await sign(page, 'Sign: control is back')
    await expect(page.getByRole('heading', { level: 1, name: 'Hand back' })).toBeVisible()
  })

  await test.step('hand back', async () => {
    await page.getByRole('link', { name: /^Check the controller:/ }).click()
    await signChecks(page, 8)
    await page.getByRole('link', { name: 'Go on' }).click()
    await page.getByRole('link', { name: /^Put points back in auto:/ }).click()
    await returnPoints(page, ['CF-1'])
    await page.getByRole('link', { name: 'Go on' }).click()
    const prove = page.getByRole('link', { name: /^Prove points/ })
    if (await prove.isVisible()) {
      await prove.click()
      await sign(page, /^Sign: .+ seen to answer$/)
      await page.getByRole('link', { name: 'Go on' }).click()
    }
    await sign(page, 'Sign: hand back closed')
    await expect(page.getByRole('heading', { level: 1, name: 'Settle' })).toBeVisible()
  })

  await test.step('settle and submit', async () => {
    for (const fall of [0.2, 0.8]) {
      await page.goto(`/outages/${id}/round`)
      await takeRound(page, name => /freez|ice cream|frozen/i.test(name) ? -3.4 - fall : 37.8 - fall)
      await advance(10)
    }
    await page.goto(`/outages/${id}/submit`)
    await page.getByLabel('I have read the record through').check({ force: true })
    await typeSignature(page, 'Tess Marlow')
    await sign(page, 'Sign: submit the record')
    await expect(page.getByRole('heading', { level: 1, name: 'Submitted' })).toBeVisible({ timeout: 30_000 })
    await expect(page.getByText('All in the record')).toBeVisible()
  })

  await test.step('the supervisor returns it with a question, the technician answers, and it is sealed', async () => {
    await desk.goto(`/outages/${id}/review`)
    await desk.getByRole('button', { name: 'Return it…' }).click()
    await desk.getByLabel('What is missing').fill('Say who was told at the shop')
    await desk.getByLabel('A question to be answered').fill('Who was told at the shop?')
    await sign(desk, 'Sign: returned')
    await expect(desk.getByRole('heading', { level: 1, name: 'Settle' })).toBeVisible()
    await page.goto(`/outages/${id}/questions`)
    await page.getByLabel('Answer').fill('The night manager, by telephone')
    await sign(page, 'Sign the answer')
    await expect(page.getByText('The night manager, by telephone')).toBeVisible()
    await page.goto(`/outages/${id}/submit`)
    await page.getByLabel('I have read the record through').check({ force: true })
    await typeSignature(page, 'Tess Marlow')
    await sign(page, 'Sign: submit the record')
    await expect(page.getByRole('heading', { level: 1, name: 'Submitted' })).toBeVisible({ timeout: 30_000 })
    await expect(page.getByText('All in the record')).toBeVisible()
    await desk.goto(`/outages/${id}/review`)
    // What is pointed out leads to its entry, and there it is asked about.
    await desk.getByRole('region', { name: 'What to look at' }).getByRole('link', { name: /^No\. \d+$/ }).first().click()
    await desk.getByRole('textbox', { name: /^Ask about No\. \d+$/ }).fill('Was this seen from the aisle?')
    await sign(desk, /^Sign: question about No\. \d+$/)
    await expect(desk.getByText('No answer yet')).toBeVisible()
    await expect(desk.getByText('All in the record')).toBeVisible()
    await page.goto(`/outages/${id}/questions`)
    await page.getByLabel('Answer').fill('From the machine room')
    await sign(page, 'Sign the answer')
    await expect(page.getByText('All in the record')).toBeVisible()
    await desk.goto(`/outages/${id}/review`)
    await expect(desk.getByText('From the machine room').first()).toBeVisible({ timeout: 30_000 })
    await desk.getByLabel('I have reviewed the record').check({ force: true })
    await typeSignature(desk, 'Sam Ridley')
    await sign(desk, 'Sign: countersign and seal')
    await expect(desk.getByRole('heading', { level: 1, name: 'Sealed' })).toBeVisible({ timeout: 30_000 })
  })

  await test.step('the auditor reads it and takes the PDF', async () => {
    const auditor = await open('desk')
    await signInAs(auditor, 'auditor@quillfeather.example')
    await auditor.goto(`/records/${id}`)
    await hydrated(auditor)
    await auditor.getByRole('button', { name: /^Show \d+ more$/ }).click()
    await expect(auditor.getByText('Night covers drawn').first()).toBeVisible()
    const pdf = await auditor.request.get(`/api/outages/${id}/record.pdf`)
    expect(pdf.headers()['content-type']).toContain('application/pdf')
    const path = info.outputPath('record.pdf')
    await (await import('node:fs/promises')).writeFile(path, await pdf.body())
    const { stdout } = await run('pdftotext', ['-layout', path, '-'])
    const text = stdout.replace(/\s+/g, ' ')
    for (const words of ['Night covers drawn', 'The night manager, by telephone', 'Who was told at the shop?', 'Record submitted', 'countersigned', '12.4 A']) expect(text).toContain(words)
    expect((await (await auditor.request.get(`/api/outages/${id}/record.json`)).json()).entries.length).toBeGreaterThan(80)
    expect(await (await auditor.request.get(`/api/outages/${id}/record.csv`)).text()).toContain('36.4')
  })
})

/** Index of the option whose words match. */
async function optionOf(page: import('@playwright/test').Page, label: string, words: RegExp): Promise<number> {
  const select = page.getByLabel(label)
  await expect(select.locator('option')).not.toHaveCount(1)
  return (await select.locator('option').allTextContents()).findIndex(text => words.test(text))
}

/** Target suction of each group as the page of pressures says it. */
async function targets(page: import('@playwright/test').Page): Promise<number[]> {
  const lines = page.getByText(/^\s*target -?\d/)
  await expect(lines.first()).toBeVisible()
  return (await lines.allTextContents()).map(text => Number(/target\s+(-?\d+)/.exec(text)![1]))
}
