import { INSTRUMENT_CHECK_DAYS, PLAIN_HOLDING } from '../schemas/equipment'
import type { AnyEntry } from './entry'
import { newestVersion } from './kinds'
import type { EntryKind } from './kinds'
import { otherMeasure } from './measures'

type Body = Record<string, unknown>
/** For each kind that has several versions: what a body of version n is in version n + 1. */
type Upgrades = { [K in EntryKind]?: Record<number, (body: Body) => Body> }

/**
 * How older bodies are read. A kind's schema never changes once it has landed; a further version
 * stands beside it, with its step here, so that every record stays readable.
 */
export const UPGRADES: Upgrades = {
  // Before version 2 no site judged otherwise than its rulebook, but for single cases, and a check lasted 90 days everywhere;
  // no time constant came from sealed outages, and no relief valve was known.
  'outage-opened': { 1: body => ({ ...body, snapshot: snapshotOfV1(body.snapshot as SnapshotV1), plan: withFacts(body.plan as { measures: string[] }) }) },
  'plan-changed': { 1: body => ({ ...body, plan: withFacts(body.plan as { measures: string[] }) }) },
  'act-signed': { 1: body => ({ ...body, coolBy: null, takenBy: '', left: false }) },
  'decided-otherwise': { 1: body => ({ ...body, clause: '' }) },
}

interface SnapshotV1 { site: object, racks: object[], cases: object[] }

function snapshotOfV1(snapshot: SnapshotV1): object {
  return {
    ...snapshot,
    site: { ...snapshot.site, holding: PLAIN_HOLDING, instrumentCheckDays: INSTRUMENT_CHECK_DAYS },
    racks: snapshot.racks.map(rack => ({ ...rack, warmestC: null, reliefValves: [] })),
    cases: snapshot.cases.map(item => ({ ...item, tauFrom: 0 })),
  }
}

/** In version 1 measures were words alone, and a plan assumed what the product did. */
function withFacts(plan: { measures: string[] }): object {
  return { ...plan, measures: plan.measures.map(otherMeasure), assumptions: [] }
}

/**
 * An entry as the newest version of its kind would say it, for reading only: what is hashed and
 * verified is the entry as it was signed. An entry of the newest version comes back as it is.
 */
export function asNewest(entry: AnyEntry): AnyEntry {
  const newest = newestVersion(entry.kind)
  if (entry.v >= newest) return entry
  let body = entry.body as Body
  for (let v = entry.v; v < newest; v++) body = UPGRADES[entry.kind]?.[v]?.(body) ?? body
  return { ...entry, v: newest, body } as AnyEntry
}
