import { typedNumber } from '~~/shared/import/readings'
import { numberWords } from '~~/shared/charts/words'
import type { SiteLimits, StricterClass } from '~~/shared/schemas/equipment'
import { siteLimitsSchema } from '~~/shared/schemas/equipment'
import { settingFaults } from '~~/server/utils/holding'
import type { Rulebook } from '~~/server/utils/holding'

/** The form of a site's limits: what is typed for each class of its rulebook, and the rest. */
export interface LimitsForm {
  classes: { foodClass: string, limit: string, minutes: string }[]
  addAccuracy: boolean
  allowsMinus12: boolean
  instrumentCheckDays: string
}

/** A number as it is put into a field: without decimals that say nothing. */
const typed = (value: number | null) => value === null ? '' : numberWords(value, 2).replace(/\.?0+$/, '')

export function limitsFormOf(book: Rulebook, { holding, instrumentCheckDays }: SiteLimits): LimitsForm {
  return {
    classes: book.classes.map(({ id }) => {
      const set = holding.classes.find(item => item.foodClass === id)
      return { foodClass: id, limit: typed(set?.limit ?? null), minutes: typed(set?.minutes ?? null) }
    }),
    addAccuracy: holding.addAccuracy,
    allowsMinus12: holding.allowsMinus12,
    instrumentCheckDays: String(instrumentCheckDays),
  }
}

/** The settings that a form means, or its faults by field: `tcs.limit`, `tcs.minutes`, `allowsMinus12`, `instrumentCheckDays`. */
export function readLimitsForm(book: Rulebook, form: LimitsForm): { value: SiteLimits | null, faults: Record<string, string> } {
  const faults: Record<string, string> = {}
  const number = (text: string, field: string, empty: number | null): number | null => {
    if (text.trim() === '') return empty
    const value = typedNumber(text)
    if (value === null) faults[field] = `${text.trim()} is not a number`
    return value
  }
  const classes: StricterClass[] = form.classes
    .map(({ foodClass, limit, minutes }) => ({ foodClass, limit: number(limit, `${foodClass}.limit`, null), minutes: number(minutes, `${foodClass}.minutes`, null) }))
    .filter(item => item.limit !== null || item.minutes !== null)
  const holding = { addAccuracy: form.addAccuracy, allowsMinus12: form.allowsMinus12, classes }
  const days = number(form.instrumentCheckDays, 'instrumentCheckDays', null)
  if (days === null) faults.instrumentCheckDays ??= 'Enter days'
  const name = (field: string) => field.replace(/^holding\./, '').replace(/^classes[.[](\d+)\]?\./, (_, index: string) => `${classes[Number(index)]!.foodClass}.`)
  const parsed = siteLimitsSchema.safeParse({ holding, instrumentCheckDays: days ?? 1 })
  for (const issue of parsed.success ? [] : parsed.error.issues) faults[name(issue.path.join('.'))] ??= issue.message
  for (const { field, reason } of settingFaults(book, holding)) faults[name(field)] ??= reason
  return { value: parsed.success && Object.keys(faults).length === 0 ? parsed.data : null, faults }
}
