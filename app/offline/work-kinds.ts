import type { WorkKindItem } from '~~/shared/schemas/site-view'
import { keepFact, keptFact } from './facts'

/** Kinds of work that are younger than this are not asked for again, ms. */
const FRESH_MS = 15 * 60_000

/** Keeps the kinds of work on this device, so that an outage can be planned without a network. */
export async function refreshWorkKinds(person: string, now: number, fetchAll: () => Promise<WorkKindItem[]>): Promise<void> {
  const known = await keptFact('workKinds')
  if (known?.person === person && now >= known.keptAt && now - known.keptAt < FRESH_MS) return
  await keepFact('workKinds', { person, keptAt: now, items: await fetchAll() })
}

/** The kinds of work as they were last read for a person; null where they never were. */
export async function keptWorkKinds(person: string): Promise<{ items: WorkKindItem[], keptAt: number } | null> {
  const known = await keptFact('workKinds')
  return known?.person === person ? known : null
}
