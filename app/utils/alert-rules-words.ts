import { listWords, minuteWords } from '~~/shared/charts/words'
import type { AlertRules } from '~~/shared/schemas/alert-rules'
import type { AlertPerson } from '~~/shared/schemas/alerts'

/** A site's rules of alerts in sentences, one a level that has somebody. */
export function alertRulesLines({ levels, passOnAfter }: AlertRules, people: readonly AlertPerson[]): string[] {
  const lines = levels.map(({ answerable, supervisors, people: ids }, index) => {
    const names = [
      ...answerable ? ['whoever has the outage or points of it in hand'] : [],
      ...supervisors ? ['every supervisor of the site'] : [],
      ...people.filter(person => ids.includes(person.id)).map(person => person.name),
    ]
    if (names.length === 0) return ''
    return index === 0 ? `At once: ${listWords(names)}.` : `After ${minuteWords(passOnAfter[index - 1]!)} without an answer: ${listWords(names)}.`
  })
  return lines.filter(line => line !== '')
}
