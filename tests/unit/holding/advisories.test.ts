/** What is said beside the rulebooks. The growth of Listeria: the square-root model of the FDA and FSIS risk assessment of 2003, lowest temperature −1.18 °C. */
import { describe, expect, it } from 'vitest'
import { ADVISORIES } from '../../../server/utils/holding'

/** How many times as fast as at 5 °C it grows. */
const timesAsFast = (celsius: number) => ((celsius + 1.18) / (5 + 1.18)) ** 2

describe('the advisories', () => {
  it('give the growth at 8 °C and 12 °C as the square-root model does', () => {
    const { words } = ADVISORIES[0]!
    expect(words).toContain(`at 8 °C about ${timesAsFast(8).toFixed(1)} times as fast as at 5 °C`)
    expect(words).toContain(`at 12 °C about ${timesAsFast(12).toFixed(1)} times`)
  })

  it('give milk the doubling times of the abstract of Rosenow and Marth 1987, the colder the longer', () => {
    const { words, source } = ADVISORIES.find(({ title }) => title === 'Milk')!
    expect(source).toContain('Rosenow and Marth 1987')
    const spans = [...words.matchAll(/([\d.]+) to ([\d.]+) hours at \d+ °C/g)].map(([, low, high]) => [Number(low), Number(high)])
    expect(spans).toEqual([[29.7, 45.6], [8.7, 14.6], [4.5, 6.9], [1.7, 1.9]])
  })

  it('each have a title of its own, words, a source and a mark', () => {
    expect(new Set(ADVISORIES.map(({ title }) => title)).size).toBe(3)
    for (const { title, words, source, mark } of ADVISORIES) {
      expect(title).not.toBe('')
      expect(words).toMatch(/\d.*\.$/)
      expect(source).toMatch(/FDA and FSIS|Rosenow/)
      expect(['V', 'M']).toContain(mark)
    }
  })
})
