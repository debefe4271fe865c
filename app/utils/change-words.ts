import { minuteWords, temperatureWords } from '~~/shared/charts/words'
import type { ChangeItem } from '~~/shared/schemas/changes'
import { classById } from '~~/server/utils/holding'
import type { Rulebook } from '~~/server/utils/holding'

/** What a change of limits says, a line a setting. @param book the rulebook in whose unit they are */
export function limitChangeLines({ fields }: Pick<ChangeItem, 'fields'>, book: Rulebook | undefined): string[] {
  return fields.map(({ field, before, after }) => {
    if (field === 'instrumentCheckDays') return `Checks of thermometers overdue after ${after} days, before after ${before}`
    if (field === 'addAccuracy') return after ? 'Accuracy of thermometers added to each reading' : 'Accuracy of thermometers no longer added'
    if (field === 'allowsMinus12') return after ? '−12 °C for quick-frozen food chosen' : '−12 °C for quick-frozen food no longer chosen'
    const id = field.replace(/^class:/, '')
    const words = (value: unknown) => classSettingWords(value, book?.unit ?? 'C')
    return `${(book && classById(book, id)?.name) ?? id}: ${words(after)}, before ${words(before)}`
  })
}

function classSettingWords(value: unknown, unit: 'F' | 'C'): string {
  const { limit = null, minutes = null } = (value ?? {}) as { limit?: number | null, minutes?: number | null }
  const parts = [limit === null ? '' : `within ${temperatureWords(limit, unit)}`, minutes === null ? '' : `at most ${minuteWords(minutes)}`].filter(Boolean)
  return parts.length > 0 ? parts.join(' and ') : 'as the rulebook'
}
