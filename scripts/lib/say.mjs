/**
 * Something that a person can mend: shown as its sentence, without a stack.
 */
export class Refusal extends Error {
  name = 'Refusal'
}

/**
 * One line to the person at the terminal.
 * @param {string} line
 */
export function say(line) {
  process.stdout.write(`holdover  ${line}\n`)
}

/**
 * A span of time for reading.
 * @param {number} milliseconds
 * @returns {string} such as `0.4 s`, `12 s` or `3 min 05 s`
 */
export function spell(milliseconds) {
  const seconds = milliseconds / 1000
  if (seconds < 10) return `${seconds.toFixed(1)} s`
  if (seconds < 60) return `${Math.round(seconds)} s`
  const whole = Math.round(seconds)
  return `${Math.floor(whole / 60)} min ${String(whole % 60).padStart(2, '0')} s`
}
