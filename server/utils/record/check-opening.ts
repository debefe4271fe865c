import type { BodyOf } from '../../../shared/record/kinds'
import { isTimeZone } from '../../../shared/schemas/equipment'
import { classById, rulebookById, settingFaults } from '../holding'

/**
 * What keeps an opening from carrying an outage, or null: everything after it is judged by the equipment
 * that it holds, so each name there must mean something to this program, and mean one thing.
 */
export function openingFault({ snapshot }: BodyOf<'outage-opened'>): { field: string, reason: string } | null {
  const { site, rulebook: { id, version }, cases, points } = snapshot
  if (!isTimeZone(site.timeZone)) return { field: 'snapshot.site.timeZone', reason: `There is no time zone ${site.timeZone}` }
  const rulebook = rulebookById(id, version)
  if (!rulebook) return { field: 'snapshot.rulebook', reason: `There is no rulebook ${id} in version ${version}` }
  const strange = cases.findIndex(item => !classById(rulebook, item.foodClass))
  if (strange >= 0) return { field: `snapshot.cases[${strange}].foodClass`, reason: `${rulebook.name} has no class ${cases[strange]!.foodClass}` }
  const [laxer] = settingFaults(rulebook, site.holding)
  if (laxer) return { field: `snapshot.site.holding.${laxer.field}`, reason: laxer.reason }
  const twice = repeated(points.map(point => point.tag))
  if (twice >= 0) return { field: `snapshot.points[${twice}].tag`, reason: `${points[twice]!.tag} stands twice` }
  const again = repeated(cases.map(item => item.id))
  return again >= 0 ? { field: `snapshot.cases[${again}].id`, reason: `${cases[again]!.name} stands twice` } : null
}

/** Where a name stands for the second time, or -1. */
function repeated(names: string[]): number {
  const first = new Map<string, number>()
  return names.findIndex((name, index) => first.has(name) || !first.set(name, index))
}
