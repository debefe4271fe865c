/** Reads temperatures that somebody typed or pasted, a line each: "14:05 4.8", "2026-03-03T14:05Z,40.2,air". */

export const TYPED_METHODS = ['product', 'air', 'infrared'] as const
export type TypedMethod = (typeof TYPED_METHODS)[number]

/** A reading as it was typed; its texts are understood by `settleReadings`. */
export interface TypedReading { time: string, value: string, method: TypedMethod }
/** A line that is no reading: where it stood, itself, and why. */
export interface LineFault { line: number, text: string, reason: string }

const DATE = '\\d{4}-\\d{2}-\\d{2}'
const CLOCK = '\\d{1,2}:\\d{2}(?::\\d{2}(?:\\.\\d{1,3})?)?'
const TIME = new RegExp(`^(${DATE}[T ]${CLOCK}\\s?(?:Z|[+-]\\d{2}:?\\d{2})?|${CLOCK}(?:\\s?[ap]\\.?m\\.?)?)(?=[\\s,;]|$)`, 'i')
const VALUE = /^([-−+]?\d+(?:[.,]\d+)?)\s*(?:°?\s*([CF]))?(?=[\s,;]|$)/i
const GAP = /^[\s,;]+/

/**
 * The readings in a text, and each line that is none. A heading of words in the first line is passed over.
 * @param unit degrees that the numbers are in; a line that says the other unit is a fault
 */
export function readReadingLines(text: string, unit: 'F' | 'C'): { readings: TypedReading[], faults: LineFault[] } {
  const readings: TypedReading[] = []
  const faults: LineFault[] = []
  text.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/).forEach((raw, index) => {
    const line = raw.trim().replace(/"/g, '')
    if (line === '' || (index === 0 && !/\d/.test(line))) return
    const read = readLine(line, unit)
    if (typeof read === 'string') faults.push({ line: index + 1, text: raw.trim(), reason: read })
    else readings.push(read)
  })
  return { readings, faults }
}

/** One line as a reading, or why it is none. */
function readLine(line: string, unit: 'F' | 'C'): TypedReading | string {
  const time = TIME.exec(line)?.[1]
  if (!time) return 'begins with no time; write it as 14:05 4.8'
  const afterTime = line.slice(time.length).replace(GAP, '')
  if (afterTime === '') return 'has no temperature'
  const value = VALUE.exec(afterTime)
  if (!value) return `has no temperature that can be read after ${time}`
  if (value[2] && value[2].toUpperCase() !== unit) return `is in °${value[2].toUpperCase()}, not in °${unit}`
  const word = afterTime.slice(value[0].length).replace(GAP, '').trim().toLowerCase()
  const method = word === '' ? 'product' : TYPED_METHODS.find(known => known === word)
  return method ? { time, value: value[1]!, method } : `ends in ${word}, which is none of ${TYPED_METHODS.join(', ')}`
}

/** A number as people type it: 4.8, 4,8, −0.5. Null: it is none. */
export function typedNumber(text: string): number | null {
  const plain = text.trim().replace('−', '-').replace(',', '.')
  return /^[-+]?\d+(\.\d+)?$/.test(plain) ? Number(plain) : null
}

/** A time as typed: of day, ms since midnight, or an instant, Unix ms (a date without an offset counts as UTC). Null: it is none. */
export function typedTime(text: string): { clock: number } | { instant: number } | null {
  const trimmed = text.trim()
  if (TIME.exec(trimmed)?.[1] !== trimmed) return null
  if (/^\d{4}-/.test(trimmed)) {
    const iso = trimmed.replace(/\s(?=[Z+-])/i, '').replace(' ', 'T').replace(/T(\d):/, 'T0$1:').replace(/([+-]\d{2})(\d{2})$/, '$1:$2')
    const instant = Date.parse(/[+-]\d{2}:\d{2}$|Z$/i.test(iso) ? iso : `${iso}Z`)
    // A day that the month does not have comes out as another, or as none.
    const written = Date.parse(`${iso.slice(0, 10)}T00:00:00Z`)
    const real = !Number.isNaN(written) && new Date(written).toISOString().slice(0, 10) === iso.slice(0, 10)
    return Number.isNaN(instant) || !real ? null : { instant }
  }
  const [, hours, minutes, seconds = '0', half] = /^(\d{1,2}):(\d{2})(?::(\d{2}(?:\.\d+)?))?\s?([ap])?/i.exec(trimmed)!
  const hour = half ? Number(hours) % 12 + (half.toLowerCase() === 'p' ? 12 : 0) : Number(hours)
  if (hour > 23 || Number(minutes) > 59 || Number(seconds) >= 60 || (half && (Number(hours) < 1 || Number(hours) > 12))) return null
  return { clock: hour * 3_600_000 + Number(minutes) * 60_000 + Math.round(Number(seconds) * 1000) }
}
