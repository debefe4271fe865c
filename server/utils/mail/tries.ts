/** Tries of one mail before it is given up: with these waits nearly three days. */
export const MAX_TRIES = 24
const LONGEST_WAIT_MINUTES = 240

/** Minutes until a mail is tried again that has failed so often: 1, 2, 4 … up to four hours. Common practice, no source. */
export function minutesUntilNextTry(attempts: number): number {
  return Math.min(LONGEST_WAIT_MINUTES, 2 ** Math.max(0, attempts - 1))
}

/** An error of handing in mail, as the library gives it. */
export interface SendFault { code?: string, responseCode?: number, message: string }

/** Whether the mail itself was refused for good: a reply of the 5yz class (RFC 5321, 4.2.1) to its sender, recipient or content. */
export function isRefusedForGood(fault: SendFault): boolean {
  return (fault.responseCode ?? 0) >= 500 && (fault.code === 'EENVELOPE' || fault.code === 'EMESSAGE')
}

/** Whether the fault lies with the way there and not with this mail, so that the next one would fail too. */
export function isWayShut(fault: SendFault): boolean {
  return fault.code !== 'EENVELOPE' && fault.code !== 'EMESSAGE'
}
