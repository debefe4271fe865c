import { parseWith, type Parsed } from '~~/shared/schemas/parsed'
import { planOrderSchema, type OrderPoint, type PlanOrderInput } from '~~/shared/schemas/plan-order'
import { Graph } from './graph'
import { circuitOnTwoRacks } from './layout'
import { findRing, ringWords } from './plan'

type Fault = Extract<Parsed<PlanOrderInput>, { ok: false }>

/**
 * The input of `planOrder` from a request's body. Refused, with the field and the reason in words:
 * what the schema refuses, a tag twice, `after` or `drives` naming no point, a circuit on two
 * racks, and points that wait for each other.
 */
export function parseOrderInput(body: unknown): Parsed<PlanOrderInput> {
  const parsed = parseWith(planOrderSchema, body)
  if (!parsed.ok) return parsed
  const { points } = parsed.input
  const fault = tagTwice(points) ?? linkToNowhere(points) ?? circuitTwice(points) ?? ringOfLinks(parsed.input)
  if (fault) return fault
  const ring = findRing(parsed.input)
  return ring ? refuse('points', ringWords(ring)) : parsed
}

function tagTwice(points: readonly OrderPoint[]): Fault | null {
  const seen = new Set<string>()
  for (const [index, { tag }] of points.entries()) {
    if (seen.has(tag)) return refuse(`points[${index}].tag`, `names ${tag}, which stands twice`)
    seen.add(tag)
  }
  return null
}

function linkToNowhere(points: readonly OrderPoint[]): Fault | null {
  const tags = new Set(points.map(({ tag }) => tag))
  for (const [index, { after, drives }] of points.entries()) {
    if (drives !== undefined && !tags.has(drives)) return refuse(`points[${index}].drives`, `names ${drives}, and no point has that tag`)
    for (const [at, earlier] of (after ?? []).entries()) {
      if (!tags.has(earlier)) return refuse(`points[${index}].after[${at}]`, `names ${earlier}, and no point has that tag`)
    }
  }
  return null
}

function circuitTwice(points: readonly OrderPoint[]): Fault | null {
  const twice = circuitOnTwoRacks(points)
  return twice && refuse(`points[${twice.index}].rack`, `puts circuit ${twice.circuit} on rack ${twice.racks[1]}, and another point on rack ${twice.racks[0]}`)
}

/** Rings of the equipment's own links, whether or not their points are refused. */
function ringOfLinks({ points, direction }: PlanOrderInput): Fault | null {
  const at = new Map(points.map(({ tag }, index) => [tag, index]))
  const links = new Graph(points.length)
  for (const [index, { after, drives }] of points.entries()) {
    for (const earlier of after ?? []) links.add(at.get(earlier)!, index)
    if (drives === undefined) continue
    const machine = at.get(drives)!
    if (direction === 'in-hand') links.add(index, machine)
    else links.add(machine, index)
  }
  const sorted = links.sort(points.map((_, index) => index))
  return 'cycle' in sorted ? refuse('points', ringWords(sorted.cycle.map(index => points[index]!.tag))) : null
}

function refuse(field: string, words: string): Fault {
  return { ok: false, field, reason: `${field} ${words}` }
}
