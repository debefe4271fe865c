import type { KeptPerson } from './database'
import { openKept } from './database'
import { keepFact } from './facts'

/** Keeps who is signed in on this device. */
export function keepPerson(person: KeptPerson): Promise<void> {
  return keepFact('person', person)
}

/**
 * Takes away what is kept for others to read: logs and equipment. What they signed, their photos and
 * their keys stay, for them alone to send.
 * @param person who stays; null: nobody
 */
export async function forgetOthers(person: string | null): Promise<void> {
  const tx = (await openKept()).transaction(['outages', 'log', 'equipment', 'facts'], 'readwrite')
  for (const about of await tx.objectStore('outages').getAll()) {
    if (about.person === person) continue
    await tx.objectStore('log').delete(IDBKeyRange.bound([about.id, 0], [about.id, Number.MAX_SAFE_INTEGER]))
    await tx.objectStore('outages').delete(about.id)
  }
  for (const held of await tx.objectStore('equipment').getAll()) if (held.person !== person) await tx.objectStore('equipment').delete(held.controller)
  if (person === null) await tx.objectStore('facts').delete('person')
  await tx.done
}
