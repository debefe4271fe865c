import type { Role } from '~~/shared/schemas/people'
import { keepFact, keptFact } from '~/offline/facts'

export interface Colleague { id: string, name: string, role: Role }

/** Technicians and supervisors of an outage's site; as they were last read where the server is away, null where they never were. */
export async function fetchColleagues(outage: string): Promise<Colleague[] | null> {
  const kept = await keptFact('colleagues').catch(() => null)
  const fresh = await $fetch<Colleague[]>(`/api/outages/${outage}/people`, { retry: 0, timeout: 10_000 }).catch(() => null)
  if (fresh) await keepFact('colleagues', { ...kept, [outage]: fresh }).catch(() => undefined)
  return fresh ?? kept?.[outage] ?? null
}
