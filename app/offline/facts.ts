import type { Role } from '~~/shared/schemas/people'
import type { WorkKindItem } from '~~/shared/schemas/site-view'
import type { KeptPerson } from './database'
import { openKept } from './database'

/** Single facts that are kept on this device, by name. */
interface Facts {
  /** who is signed in here, as the server last said */
  person: KeptPerson
  /** this device's clock less the server's when it was last measured, ms */
  skew: number
  /** technicians and supervisors of the site of each outage, by the outage's id */
  colleagues: Record<string, { id: string, name: string, role: Role }[]>
  /** the tag of the kept equipment, and whose it is */
  equipmentTag: { person: string, tag: string, keptAt: number }
  /** the kinds of work, and who was signed in when they were read */
  workKinds: { person: string, keptAt: number, items: WorkKindItem[] }
}

export async function keptFact<K extends keyof Facts>(name: K): Promise<Facts[K] | null> {
  const value = await (await openKept()).get('facts', name)
  return (value as Facts[K] | undefined) ?? null
}

export async function keepFact<K extends keyof Facts>(name: K, value: Facts[K]): Promise<void> {
  await (await openKept()).put('facts', value, name)
}

export async function forgetFact(name: keyof Facts): Promise<void> {
  await (await openKept()).delete('facts', name)
}
