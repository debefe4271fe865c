import type { StoredEntry } from '~~/shared/record/entry'
import type { KeptOutage } from './database'
import { openKept } from './database'

const allOf = (outage: string) => IDBKeyRange.bound([outage, 0], [outage, Number.MAX_SAFE_INTEGER])

/** The log of an outage as it is kept here for a person: the first entries without gaps; empty where there is none. */
export async function keptLog(outage: string, person: string): Promise<{ about: KeptOutage, entries: StoredEntry[] } | null> {
  const tx = (await openKept()).transaction(['outages', 'log'])
  const [about, entries] = await Promise.all([tx.objectStore('outages').get(outage), tx.objectStore('log').getAll(allOf(outage)), tx.done])
  if (!about || about.person !== person) return null
  const whole = entries.findIndex((stored, index) => stored.seq !== index + 1)
  return { about, entries: whole < 0 ? entries : entries.slice(0, whole) }
}

/** Adds entries to a kept log. @param about as it stands with them */
export async function keepLog(about: KeptOutage, fresh: readonly StoredEntry[]): Promise<void> {
  const tx = (await openKept()).transaction(['outages', 'log'], 'readwrite')
  const log = tx.objectStore('log')
  await Promise.all([tx.objectStore('outages').put(about), ...fresh.map(stored => log.put(stored, [about.id, stored.seq])), tx.done])
}

/** Outages whose logs are kept here for a person, the last heard first. */
export async function keptOutages(person: string): Promise<KeptOutage[]> {
  const all = await (await openKept()).getAll('outages')
  return all.filter(about => about.person === person).sort((one, other) => other.heardAt - one.heardAt || one.id.localeCompare(other.id))
}

/** Takes the log of an outage away from this device, as when it is no longer the person's to see. */
export async function forgetLog(outage: string): Promise<void> {
  const tx = (await openKept()).transaction(['outages', 'log'], 'readwrite')
  await Promise.all([tx.objectStore('outages').delete(outage), tx.objectStore('log').delete(allOf(outage)), tx.done])
}
