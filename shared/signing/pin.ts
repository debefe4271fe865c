/** Rules of the signing PIN: which may be chosen, how long it unlocks, how long a wrong one makes wait. Pure; times in Unix ms. */

export const PIN_LENGTH = 6
const PIN_PATTERN = /^\d{6}$/

/** Chosen by many though they have no row in them (common practice, no source): pairs, mirrors and lines of the keypad. */
const WELL_KNOWN = new Set(['112233', '332211', '123321', '321123', '159753', '159357', '147258', '147369', '258369', '789456', '456123', '456789', '102030', '010203', '123654'])

/** Why a PIN may not be chosen, in words; null when it may. */
export function pinFault(pin: string): string | null {
  if (!PIN_PATTERN.test(pin)) return `A PIN has ${PIN_LENGTH} digits.`
  if (new Set(pin).size < 3) return 'Too easy to guess: fewer than three different digits.'
  if (isRow(pin)) return 'Too easy to guess: digits in a row.'
  if (pin.slice(0, 3) === pin.slice(3)) return 'Too easy to guess: the same three digits twice.'
  return WELL_KNOWN.has(pin) ? 'Too easy to guess: many people choose this one.' : null
}

/** Whether each digit is one more, or one less, than the one before, 0 after 9. */
function isRow(pin: string): boolean {
  const steps = new Set([...pin].slice(1).map((digit, index) => (Number(digit) - Number(pin[index]) + 10) % 10))
  return steps.size === 1 && (steps.has(1) || steps.has(9))
}

const MINUTE = 60_000
/** Quiet minutes after which signing locks while an outage is in hand or dark, and at any other time. */
export const IDLE_MINUTES = { live: 30, quiet: 10 } as const
/** How far a clock may be set back before it counts as tampered with, ms. */
const STEP_BACK_MS = MINUTE

/**
 * Whether signing has locked by itself.
 * @param lastActive when the person last touched the screen or signed
 * @param live an outage of theirs is in hand or dark
 */
export function isIdle(lastActive: number, now: number, live: boolean): boolean {
  const quiet = now - lastActive
  return quiet >= (live ? IDLE_MINUTES.live : IDLE_MINUTES.quiet) * MINUTE || quiet < -STEP_BACK_MS
}

/** So many wrong PINs cost nothing: cold hands slip. */
const FREE_TRIES = 2
const FIRST_WAIT_MS = 15_000
export const LONGEST_WAIT_MS = 60 * MINUTE

/** How long to wait after so many wrong PINs in a row, ms: none for two, then 15 s, twice as long each time, an hour at most. */
export function waitAfterWrong(wrong: number): number {
  return wrong <= FREE_TRIES ? 0 : Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** (wrong - FREE_TRIES - 1))
}

/** Wrong PINs in a row, and when the last was tried; kept beside the key, so that a reload forgives nothing. */
export interface PinTries { wrong: number, lastAt: number }
export const NO_TRIES: PinTries = { wrong: 0, lastAt: 0 }

/** What is left of the wait, ms. A clock set back never makes it longer than the wait itself. */
export function waitLeft({ wrong, lastAt }: PinTries, now: number): number {
  const wait = waitAfterWrong(wrong)
  return Math.max(0, Math.min(wait, lastAt + wait - now))
}
