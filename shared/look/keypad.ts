/**
 * The number behind a keypad with a fixed decimal: digits come in from the right, 3 8 4 reads 38.4.
 * Kept as typed digits and a sign, because a sign pressed before the first digit has no number yet.
 */
export interface KeypadEntry {
  /** Digits as typed, without sign or point; '' when nothing was typed. */
  digits: string
  negative: boolean
}

export const emptyEntry: KeypadEntry = { digits: '', negative: false }

/** Adds one digit ('0' to '9') at the right; further digits than `longest` are ignored. Leading zeros fall away. */
export function pressDigit(entry: KeypadEntry, digit: string, longest = 5): KeypadEntry {
  if (!/^\d$/.test(digit)) return entry
  const digits = (entry.digits + digit).replace(/^0+(?=\d)/, '')
  return digits.length > longest ? entry : { ...entry, digits }
}

/** Turns plus into minus and back. */
export function pressSign(entry: KeypadEntry): KeypadEntry {
  return { ...entry, negative: !entry.negative }
}

/** Takes back the last digit, and the sign when no digit is left. */
export function pressErase(entry: KeypadEntry): KeypadEntry {
  return entry.digits === '' ? emptyEntry : { ...entry, digits: entry.digits.slice(0, -1) }
}

/** The number typed, or null when there is none. */
export function entryValue(entry: KeypadEntry, decimals: number): number | null {
  if (entry.digits === '') return null
  const size = Number(entry.digits) / 10 ** decimals
  return entry.negative && size !== 0 ? -size : size
}

/** What is shown: '38.4', '−0.5', or '−' before the first digit; '' when nothing was typed. */
export function entryText(entry: KeypadEntry, decimals: number): string {
  const sign = entry.negative ? '−' : ''
  if (entry.digits === '') return sign
  const padded = entry.digits.padStart(decimals + 1, '0')
  const whole = padded.slice(0, padded.length - decimals)
  return decimals === 0 ? sign + whole : `${sign}${whole}.${padded.slice(-decimals)}`
}

/** The entry that shows a number, rounded to the decimals of the keypad. */
export function entryOf(value: number | null | undefined, decimals: number): KeypadEntry {
  if (value === null || value === undefined || !Number.isFinite(value)) return emptyEntry
  const digits = String(Math.round(Math.abs(value) * 10 ** decimals))
  return { digits, negative: value < 0 && digits !== '0' }
}

/**
 * Reads a pasted or dictated text. With a decimal point or comma it is taken as it stands ('38.4' → 38.4, '38' with a
 * point elsewhere is not); digits alone come in from the right as on the keys ('384' → 38.4).
 */
export function entryFromText(text: string, decimals: number, longest = 5): KeypadEntry {
  const clean = text.trim().replace(/[−–]/g, '-').replace(',', '.')
  const negative = clean.startsWith('-')
  if (clean.includes('.')) {
    const value = Number.parseFloat(clean)
    return Number.isFinite(value) ? entryOf(value, decimals) : emptyEntry
  }
  const start: KeypadEntry = { digits: '', negative }
  return clean.replace(/\D/g, '').split('').reduce((entry, digit) => pressDigit(entry, digit, longest), start)
}
