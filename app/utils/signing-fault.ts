/** Why something could not be signed or kept on this device, in words. What was typed stays on the screen. */
export function signingFault(error: unknown): string {
  const name = error instanceof Error || error instanceof DOMException ? error.name : ''
  if (name === 'QuotaExceededError') return 'The storage of this device is full. Nothing was signed, and what you typed is still here: make room on the device, then sign again.'
  if (['AbortError', 'InvalidStateError', 'UnknownError', 'SecurityError', 'NotFoundError', 'VersionError'].includes(name)) return 'This browser did not let Holdover keep the entry, as in a private window or after its storage was cleared. Nothing was signed, and what you typed is still here.'
  return `This could not be signed: ${error instanceof Error ? error.message : String(error)}`
}
