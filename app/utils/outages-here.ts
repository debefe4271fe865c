import { foldLog } from '~~/shared/record/fold'
import type { OutageState } from '~~/shared/record/state'
import type { Role } from '~~/shared/schemas/people'
import { SURROUNDINGS } from '~/composables/useOutage'
import type { KeptOutage } from '~/offline/database'
import { keptLog, keptOutages } from '~/offline/logs'
import type { OutboxEntry } from '~/offline/outbox-ports'
import { stateHere } from '~/utils/state-here'

/** An outage that this phone holds: its log, or entries that are not in it yet, or both. */
export interface OutageHere { id: string, code: string | null, phase: OutageState['phase'], site: string, controller: string, timeZone: string, heardAt: number | null, own: OutboxEntry[], state: OutageState | null }

/** What a phone can say of its outages by itself: those with entries that are under way first. */
export async function outagesHere(person: { id: string, role: Role }, own: readonly OutboxEntry[]): Promise<OutageHere[]> {
  const held = await keptOutages(person.id)
  const ids = [...new Set([...own.map(kept => kept.outage), ...held.map(about => about.id)])]
  return Promise.all(ids.map(async id => outageHere(id, person, own.filter(kept => kept.outage === id), held.find(about => about.id === id) ?? null)))
}

async function outageHere(id: string, person: { id: string, role: Role }, own: OutboxEntry[], about: KeptOutage | null): Promise<OutageHere> {
  // Only where something is told of entries is the log folded: a list alone needs no more than what is kept beside it.
  if (own.length === 0 && about) return { id, code: about.code, phase: about.phase, site: about.site, controller: about.controller, timeZone: about.timeZone, heardAt: about.heardAt, own, state: null }
  const log = await keptLog(id, person.id)
  const { state } = stateHere(foldLog(id, log?.entries ?? []), own.filter(kept => kept.refusal === null), person, SURROUNDINGS, null)
  const { snapshot, code, phase } = state
  return { id, code, phase, site: snapshot.site.name || about?.site || 'An outage whose log is not on this phone', controller: snapshot.controller.name || about?.controller || '', timeZone: snapshot.site.timeZone, heardAt: about?.heardAt ?? null, own, state }
}
