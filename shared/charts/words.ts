/** Times, offsets and temperatures in words, said the same way everywhere. A time of day has a colon, a duration never. */

const minus = '−'
const twoDigits = (count: number) => String(count).padStart(2, '0')

/**
 * A duration in seconds in words: '40 s', '12 min 40 s', '17 min', '1 h 12'. From an hour on the seconds are dropped.
 * Fractions are cut, not rounded, so that time left is never overstated. Negative durations carry a minus sign.
 */
export function durationWords(seconds: number): string {
  if (!Number.isFinite(seconds)) return 'unknown'
  const whole = Math.floor(Math.abs(seconds))
  const sign = seconds < 0 && whole > 0 ? minus : ''
  if (whole < 60) return `${sign}${whole} s`
  const minutes = Math.floor(whole / 60)
  if (minutes < 60) return whole % 60 === 0 ? `${sign}${minutes} min` : `${sign}${minutes} min ${whole % 60} s`
  return `${sign}${Math.floor(minutes / 60)} h ${twoDigits(minutes % 60)}`
}

/** A duration in minutes without its seconds: '0 min', '47 min', '3 h 05'. Cut towards zero like `durationWords`. */
export function minuteWords(minutes: number): string {
  if (!Number.isFinite(minutes)) return 'unknown'
  const whole = Math.trunc(minutes)
  return whole === 0 ? '0 min' : durationWords(whole * 60)
}

/** Making a formatter costs a hundred times what using it does, and a long record asks thousands of times. */
const formats = new Map<string, Intl.DateTimeFormat>()

function formatOf(timeZone: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${timeZone} ${JSON.stringify(options)}`
  const known = formats.get(key)
  if (known) return known
  const format = new Intl.DateTimeFormat('en-GB', { timeZone, ...options })
  formats.set(key, format)
  return format
}

function parts(iso: string, timeZone: string, options: Intl.DateTimeFormatOptions): Record<string, string> {
  const format = formatOf(timeZone, options)
  return Object.fromEntries(format.formatToParts(new Date(iso)).map(part => [part.type, part.value]))
}

/** The time of day at a site: '02:24', or '02:24:10' with seconds. `timeZone` is an IANA name; a bad `iso` throws RangeError. */
export function clockWords(iso: string, timeZone: string, withSeconds = false): string {
  const { hour, minute, second } = parts(iso, timeZone, { hour: '2-digit', minute: '2-digit', second: '2-digit', hourCycle: 'h23' })
  return withSeconds ? `${hour}:${minute}:${second}` : `${hour}:${minute}`
}

/** The date at a site: 'Tue 3 Mar 2026'. */
export function dateWords(iso: string, timeZone: string): string {
  const { weekday, day, month, year } = parts(iso, timeZone, { weekday: 'short', day: 'numeric', month: 'short', year: 'numeric' })
  return `${weekday} ${day} ${month} ${year}`
}

/** Weekday and time of day at a site: 'Wed 03:00'. */
export function dayClockWords(iso: string, timeZone: string): string {
  return `${parts(iso, timeZone, { weekday: 'short' }).weekday} ${clockWords(iso, timeZone)}`
}

/** The offset in force at that moment: 'UTC−6', 'UTC+5:30', 'UTC'. */
export function offsetWords(iso: string, timeZone: string): string {
  const { timeZoneName = 'GMT' } = parts(iso, timeZone, { timeZoneName: 'shortOffset', year: 'numeric' })
  return timeZoneName.replace('GMT', 'UTC').replace(/\+0$/, '').replace('-', minus)
}

/** A number with a true minus sign and a fixed count of decimals: '−0.4', '38.0'. Never '−0.0'. */
export function numberWords(value: number, decimals = 1): string {
  const text = Math.abs(value).toFixed(decimals)
  return value < 0 && Number(text) !== 0 ? minus + text : text
}

/** A temperature with its unit: '39.9 °F', '−18.0 °C'. */
export function temperatureWords(value: number, unit: 'F' | 'C'): string {
  return `${numberWords(value)} °${unit}`
}

/** 'a', 'a and b', 'a, b and c'. */
export function listWords(items: readonly string[]): string {
  if (items.length < 2) return items[0] ?? ''
  return `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`
}

/** '1 case', '2 cases'; `many` is given where adding an s will not do. */
export function countWords(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`
}
