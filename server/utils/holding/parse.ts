/**
 * Reads what a caller sent as a log to be judged, or names the one field that is wrong and why.
 */
import { assessSchema, COLDEST_READING_C, MOST_READINGS, WARMEST_READING_C } from '~~/shared/schemas/assess'
import type { AssessInput } from '~~/shared/schemas/assess'
import { siteFault } from './resolve'
import { classById, rulebookById, rulebooks } from './rulebooks'
import { convertTemperature, isBelow, isOver } from './units'

export interface InputFault {
  field: string
  reason: string
}

export type ParsedAssessInput = { ok: true, input: AssessInput } | { ok: false } & InputFault

/** A path such as `readings[1].at`; the body itself when the path is empty. */
function fieldOf(path: (string | number)[]): string {
  const field = path.reduce<string>((name, part) => typeof part === 'number' ? `${name}[${part}]` : name ? `${name}.${part}` : part, '')
  return field || 'body'
}

/** A list that is too long is refused before its members are looked at. */
function lengthFault(body: unknown): InputFault | null {
  const readings = typeof body === 'object' && body !== null && 'readings' in body ? body.readings : null
  return Array.isArray(readings) && readings.length > MOST_READINGS
    ? { field: 'readings', reason: `must hold at most ${MOST_READINGS} readings` }
    : null
}

function rulebookFault(input: AssessInput): InputFault | null {
  const rulebook = rulebookById(input.rulebook, input.version)
  if (!rulebook) {
    return rulebookById(input.rulebook)
      ? { field: 'version', reason: `is not a version of ${input.rulebook}` }
      : { field: 'rulebook', reason: `is unknown; known are ${[...new Set(rulebooks.map(({ id }) => id))].join(', ')}` }
  }
  const foodClass = classById(rulebook, input.foodClass)
  if (!foodClass)
    return { field: 'foodClass', reason: `is not a class of ${rulebook.id}; known are ${rulebook.classes.map(({ id }) => id).join(', ')}` }
  return input.site ? siteFault(foodClass, input.site) : null
}

function timeFault(input: AssessInput): InputFault | null {
  const now = Date.parse(input.now)
  if (Date.parse(input.darkAt) > now) return { field: 'darkAt', reason: 'must not be later than now' }
  let previous = -Infinity
  for (const [index, reading] of input.readings.entries()) {
    const at = Date.parse(reading.at)
    if (at <= previous) return { field: `readings[${index}].at`, reason: 'must be later than the reading before it' }
    if (at > now) return { field: `readings[${index}].at`, reason: 'must not be later than now' }
    previous = at
  }
  return null
}

function valueFault(input: AssessInput): InputFault | null {
  const index = input.readings.findIndex(({ value }) => {
    const celsius = convertTemperature(value, input.unit, 'C')
    return isBelow(celsius, COLDEST_READING_C) || isOver(celsius, WARMEST_READING_C)
  })
  return index === -1
    ? null
    : { field: `readings[${index}].value`, reason: 'must be from −60 to 80 °C (−76 to 176 °F)' }
}

/** Parses a body for `assess`. The first fault found is the one that is named. */
export function parseAssessInput(body: unknown): ParsedAssessInput {
  const tooLong = lengthFault(body)
  if (tooLong) return { ok: false, ...tooLong }
  const parsed = assessSchema.safeParse(body)
  if (!parsed.success) {
    const issue = parsed.error.issues[0]!
    return { ok: false, field: fieldOf(issue.path), reason: issue.message }
  }
  const input = parsed.data
  const fault = rulebookFault(input) ?? timeFault(input) ?? valueFault(input)
  return fault ? { ok: false, ...fault } : { ok: true, input }
}
