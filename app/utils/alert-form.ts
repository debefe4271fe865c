import { typedNumber } from '~~/shared/import/readings'
import type { AlertRules } from '~~/shared/schemas/alert-rules'
import { alertRulesSchema } from '~~/shared/schemas/alert-rules'

/** The form of a site's alert rules: as the rules, with minutes as they are typed. */
export interface AlertForm {
  levels: AlertRules['levels']
  passOnAfter: string[]
}

/** What the levels are called. */
export const LEVEL_WORDS = ['Told first, at once', 'Told second', 'Told third'] as const

export function alertFormOf({ levels, passOnAfter }: AlertRules): AlertForm {
  return { levels: levels.map(level => ({ ...level, people: [...level.people] })), passOnAfter: passOnAfter.map(String) }
}

/** The rules that a form means, or its faults by field: `levels.0`, `passOnAfter.1`. */
export function readAlertForm({ levels, passOnAfter }: AlertForm): { value: AlertRules | null, faults: Record<string, string> } {
  const faults: Record<string, string> = {}
  const minutes = passOnAfter.map((text, index) => {
    const value = typedNumber(text)
    if (value === null) faults[`passOnAfter.${index}`] = text.trim() === '' ? 'Enter minutes' : `${text.trim()} is not a number`
    return value ?? 1
  })
  const parsed = alertRulesSchema.safeParse({ levels: levels.map(level => ({ ...level, people: [...level.people].sort() })), passOnAfter: minutes })
  for (const issue of parsed.success ? [] : parsed.error.issues) faults[issue.path.slice(0, 2).join('.')] ??= issue.message
  return { value: parsed.success && Object.keys(faults).length === 0 ? parsed.data : null, faults }
}
