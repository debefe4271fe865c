import { siteSchema } from '~~/shared/schemas/equipment'
import type { SiteView } from '~~/shared/schemas/site-view'
import { quarryStreet } from '~~/server/database/seed/quarry-street'
import { snapshotOfSeed } from '../seed/snapshot'

/** Quarry Street of the demo as its equipment pages see it, with or without its points. */
export function quarryStreetView({ withPoints }: { withPoints: boolean }): SiteView {
  const snapshot = snapshotOfSeed(quarryStreet)
  const controllerId = snapshot.controller.id
  return {
    ...siteSchema.parse(quarryStreet.site),
    id: snapshot.site.id,
    holding: snapshot.site.holding,
    instrumentCheckDays: snapshot.site.instrumentCheckDays,
    controllers: [{ ...snapshot.controller, notes: '' }],
    racks: snapshot.racks.map(rack => ({ ...rack, reliefValves: [], controllerId })),
    suctionGroups: snapshot.suctionGroups,
    circuits: snapshot.circuits,
    cases: snapshot.cases.map(({ id, name, kind, foodClass, usualC, runsAlone, circuitId }) => ({ id, name, kind, foodClass, usualC, runsAlone, circuitId, controllerId, tauHours: null, limitStricter: null })),
    points: withPoints ? snapshot.points.map((point, index) => ({ ...point, controllerId, id: `00000000-0000-4000-9000-${String(index).padStart(12, '0')}` })) : [],
    instruments: [],
  }
}
