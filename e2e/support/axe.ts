import AxeBuilder from '@axe-core/playwright'
import { expect } from '@playwright/test'
import type { Page } from '@playwright/test'

const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']

/**
 * Fails the test when the page, as it stands, breaks an accessibility rule.
 * @param options enhanced: with the contrast of level AAA, as the technician's screens keep it
 */
export async function axe(page: Page, { enhanced = false }: { enhanced?: boolean } = {}) {
  const { violations } = await new AxeBuilder({ page })
    .options({ runOnly: { type: 'tag', values: TAGS }, rules: { 'color-contrast-enhanced': { enabled: enhanced } } })
    .analyze()
  const list = violations.map(({ id, help, nodes }) => [
    `${id}: ${help}`,
    ...nodes.slice(0, 8).map(node => `    ${node.target.join(' ')}\n      ${(node.failureSummary ?? '').replaceAll('\n', '\n      ')}`),
  ].join('\n'))
  expect.soft(list, `accessibility of ${page.url()}:\n${list.join('\n')}`).toEqual([])
}
