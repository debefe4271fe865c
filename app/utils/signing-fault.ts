/** What a browser calls it when it keeps nothing, as in a private window or after its storage was cleared. */
const KEEPS_NOTHING = ['AbortError', 'InvalidStateError', 'UnknownError', 'SecurityError', 'NotFoundError', 'VersionError']

const nameOf = (error: unknown) => error instanceof Error || error instanceof DOMException ? error.name : ''

/** Why a new key could not be kept on this device, in words; null where that is not what failed. */
export function enrolFault(error: unknown): string | null {
  if (nameOf(error) === 'QuotaExceededError') return 'The storage of this device is full: the key could not be kept, and this browser is not enrolled. Make room on the device, then try again.'
  return KEEPS_NOTHING.includes(nameOf(error)) ? 'This browser did not let Holdover keep the key, as in a private window. It is not enrolled.' : null
}

/** Why something could not be signed or kept on this device, in words. What was typed stays on the screen. */
export function signingFault(error: unknown): string {
  const name = nameOf(error)
  if (name === 'QuotaExceededError') return 'The storage of this device is full. Nothing was signed, and what you typed is still here: make room on the device, then sign again.'
  if (KEEPS_NOTHING.includes(name)) return 'This browser did not let Holdover keep the entry, as in a private window or after its storage was cleared. Nothing was signed, and what you typed is still here.'
  return `This could not be signed: ${error instanceof Error ? error.message : String(error)}`
}
