import type { Snapshot } from '~~/shared/record/snapshot'
import { openKept } from './database'
import { keepFact, keptFact } from './facts'

/** Equipment that is younger than this is not asked for again, ms. */
const FRESH_MS = 15 * 60_000

/** Asks for all equipment; null where it is as `tag` says. */
export type FetchEquipment = (tag: string | null) => Promise<{ items: Snapshot[], tag: string } | null>

/** Keeps the equipment of all the person's controllers on this device, so that an outage can begin without a network. */
export async function refreshEquipment(person: string, now: number, fetchAll: FetchEquipment): Promise<void> {
  const known = await keptFact('equipmentTag')
  const mine = known?.person === person ? known : null
  if (mine && now - mine.keptAt < FRESH_MS && now >= mine.keptAt) return
  const answer = await fetchAll(mine?.tag ?? null)
  if (answer) {
    const tx = (await openKept()).transaction('equipment', 'readwrite')
    await tx.store.clear()
    for (const snapshot of answer.items) await tx.store.put({ controller: snapshot.controller.id, person, snapshot, keptAt: now })
    await tx.done
  }
  await keepFact('equipmentTag', { person, tag: answer?.tag ?? mine?.tag ?? '', keptAt: now })
}

/** Equipment of a person's controllers that is kept here, by site and name. */
export async function keptEquipment(person: string): Promise<{ snapshot: Snapshot, keptAt: number }[]> {
  const all = (await (await openKept()).getAll('equipment')).filter(held => held.person === person)
  const nameOf = ({ snapshot }: { snapshot: Snapshot }) => `${snapshot.site.name} ${snapshot.controller.name} ${snapshot.controller.id}`
  return all.sort((one, other) => nameOf(one).localeCompare(nameOf(other)))
}
