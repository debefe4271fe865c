/** What finished outages say together. Pure; every list is in an order that depends on nothing but the facts. */
import type { CountedOutage, DiscardInsight, HoldInsight, Insights, LateInsight, Peak, PointInsight, StepInsight, WorkInsight } from '../../../shared/schemas/insights'

/** @param outages the newest first: a name or time that has changed is told as the newest has it */
export function insightsOf(outages: readonly CountedOutage[]): Insights {
  return { outages: outages.length, work: workInsights(outages), holds: holdInsights(outages), points: pointInsights(outages), late: lateInsights(outages), discards: discardInsights(outages) }
}

/** Middle value; of two middle ones their mean. @param values at least one */
export function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  return tenth(sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2)
}

/** Kinds of work by name, as records are searched for them; those furthest over their time first. */
function workInsights(outages: readonly CountedOutage[]): WorkInsight[] {
  const kinds = grouped(outages, ({ facts: { work } }) => work.name)
  return kinds.map((items): WorkInsight => {
    const { name } = items[0]!.facts.work
    const kindId = items.find(({ facts: { work } }) => work.kindId !== null)?.facts.work.kindId ?? null
    const planned = items.filter(({ facts: { work } }) => work.within !== null)
    const overruns = planned.map(item => peak(item, item.facts.work.took - item.facts.work.within!)).filter(({ minutes }) => minutes > 0)
    return {
      kindId, name, outages: items.length, planned: planned.length,
      took: medianOf(items.map(item => item.facts.work.took)),
      likely: planned.length === 0 ? null : medianOf(planned.map(item => item.facts.work.likely!)),
      within: planned.length === 0 ? null : medianOf(planned.map(item => item.facts.work.within!)),
      over: overruns.length, worst: highest(overruns), steps: stepInsights(items),
    }
  }).sort((a, b) => (b.worst?.minutes ?? 0) - (a.worst?.minutes ?? 0) || b.outages - a.outages || byText(a.name, b.name))
}

/** Steps in the order in which they are first met. */
function stepInsights(outages: readonly CountedOutage[]): StepInsight[] {
  return grouped(outages.flatMap(outage => outage.facts.steps.map(fact => ({ outage, fact }))), ({ fact }) => `${fact.back} ${fact.step}`).map((items): StepInsight => {
    const { step, name, back, planned } = items[0]!.fact
    return {
      step, name, back, planned,
      took: items.map(({ outage, fact }) => peak(outage, fact.minutes)),
      median: medianOf(items.map(({ fact }) => fact.minutes)),
      over: items.filter(({ fact }) => fact.minutes > fact.planned.longest).length,
      under: items.filter(({ fact }) => fact.minutes < fact.planned.shortest).length,
    }
  })
}

/** Cases, the shortest hold first; those whose limit was never near last. */
function holdInsights(outages: readonly CountedOutage[]): HoldInsight[] {
  return grouped(outages.flatMap(outage => outage.facts.holds.map(fact => ({ outage, fact }))), ({ fact }) => fact.caseId).map((items): HoldInsight => {
    const { caseId, name } = items[0]!.fact
    const reached = items.flatMap(({ outage, fact }) => fact.minutes === null ? [] : [peak(outage, fact.minutes)])
    const shortest = lowest(reached)
    const told = shortest ? items.find(({ outage }) => outage.id === shortest.id)! : items[0]!
    return { caseId, name, site: items[0]!.outage.site, outages: items.length, shortest, longest: highest(reached), never: items.length - reached.length, reckoned: told.fact.reckoned }
  }).sort((a, b) => (a.shortest?.minutes ?? Infinity) - (b.shortest?.minutes ?? Infinity) || byText(a.name, b.name) || byText(a.caseId, b.caseId))
}

/** Points that were excused or left unproven, those most often so first. A tag is one controller's own. */
function pointInsights(outages: readonly CountedOutage[]): PointInsight[] {
  const troubled = outages.flatMap(outage => [...outage.facts.excused.map(fact => ({ outage, fact, excused: true })), ...outage.facts.notProven.map(fact => ({ outage, fact, excused: false }))])
  return grouped(troubled, ({ outage, fact }) => `${outage.controller.id} ${fact.tag}`).map((items): PointInsight => {
    const { outage, fact } = items[0]!
    return {
      tag: fact.tag, name: fact.name, site: outage.site, controller: outage.controller,
      outages: outages.filter(other => other.controller.id === outage.controller.id && other.facts.touched.includes(fact.tag)).length,
      excused: items.filter(item => item.excused).length,
      notProven: items.filter(item => !item.excused).length,
      reasons: [...new Set(items.map(item => item.fact.reason))],
    }
  }).sort((a, b) => (b.excused + b.notProven) - (a.excused + a.notProven) || byText(a.site.name, b.site.name) || byText(a.tag, b.tag) || byText(a.controller.id, b.controller.id))
}

/** Sites, the largest share of late rounds first. */
function lateInsights(outages: readonly CountedOutage[]): LateInsight[] {
  return grouped(outages, outage => outage.site.id).map((items): LateInsight => {
    const rounds = sum(items.map(item => item.facts.rounds.taken))
    const late = sum(items.map(item => item.facts.rounds.late))
    return {
      site: items[0]!.site, outages: items.length, rounds, late, share: rounds === 0 ? null : tenth(100 * late / rounds),
      worst: highest(items.map(item => peak(item, item.facts.rounds.worst)).filter(({ minutes }) => minutes > 0)),
    }
  }).sort((a, b) => (b.share ?? -1) - (a.share ?? -1) || b.late - a.late || byText(a.site.name, b.site.name) || byText(a.site.id, b.site.id))
}

/** Each discard, the newest first. */
function discardInsights(outages: readonly CountedOutage[]): DiscardInsight[] {
  return outages.flatMap(({ id, code, site, facts }) => facts.discards.map((fact): DiscardInsight => ({ ...fact, outage: { id, code }, site })))
    .sort((a, b) => b.at - a.at || byText(a.outage.id, b.outage.id) || b.seq - a.seq)
}

/** Groups in the order in which their first item stands. */
function grouped<T>(items: readonly T[], keyOf: (item: T) => string): T[][] {
  const groups = new Map<string, T[]>()
  for (const item of items) {
    const known = groups.get(keyOf(item))
    if (known) known.push(item)
    else groups.set(keyOf(item), [item])
  }
  return [...groups.values()]
}

const peak = ({ id, code }: CountedOutage, minutes: number): Peak => ({ id, code, minutes: tenth(minutes) })
const lowest = (peaks: readonly Peak[]) => [...peaks].sort((a, b) => a.minutes - b.minutes || byText(a.id, b.id))[0] ?? null
const highest = (peaks: readonly Peak[]) => [...peaks].sort((a, b) => b.minutes - a.minutes || byText(a.id, b.id))[0] ?? null
const sum = (values: readonly number[]) => values.reduce((so, value) => so + value, 0)
const tenth = (value: number) => Math.round(value * 10) / 10
const byText = (a: string, b: string) => a < b ? -1 : a > b ? 1 : 0
