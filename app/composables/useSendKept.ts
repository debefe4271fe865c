import { keptOutbox } from '~/offline/kept'

/** Sends what a person has signed on this device, of every outage. Signed is signed: it needs neither key nor PIN. */
export function useSendKept(): { sendKept: (person: string) => Promise<void> } {
  async function sendKept(person: string): Promise<void> {
    // One outage's trouble keeps no other back; what stays kept is sent later, and marked by the server.
    await keptOutbox().drainAll(person)
  }
  return { sendKept }
}
