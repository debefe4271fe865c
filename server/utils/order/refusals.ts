/**
 * Which points may not be put in hand, or handed back, as asked: rules I1, I2, I3, I7, I9 and I12.
 * One refusal a point, by the first rule that it breaks.
 */
import type { PlanOrderInput } from '~~/shared/schemas/plan-order'
import { isAlarm } from '~~/shared/schemas/point-kinds'
import { circuitsOf, countsAsFed, feeding, isLiquidValve, type Circuit } from './feed'
import { sharesScope, type Placed } from './layout'
import { lastMediumFirst } from './stages'

/** The rule that refuses a point; `ring` where the points wait for each other. */
export type OrderRule = 'I1' | 'I2' | 'I3' | 'I7' | 'I9' | 'I12' | 'ring'

export interface Refusal {
  tag: string
  rule: OrderRule
  because: string
}

export type Refusals = Map<string, Refusal>

export function findRefusals(input: PlanOrderInput, placed: readonly Placed[]): Refusals {
  const refusals = input.direction === 'in-hand'
    ? refuseGoingInHand(placed, input.externalHeatRejection === true)
    : refuseHandBack(placed)
  return refuseDrives(placed, refusals, input.direction === 'hand-back')
}

function refuseGoingInHand(placed: readonly Placed[], externalHeatRejection: boolean): Refusals {
  const refusals: Refusals = new Map()
  const add = (place: Placed, rule: OrderRule, because: string) => {
    refusals.set(place.point.tag, { tag: place.point.tag, rule, because })
  }
  const circuits = circuitsOf(placed)
  for (const place of placed) {
    const broken = ruleOfItsOwn(place)
    if (broken) add(place, broken.rule, broken.because)
  }
  for (const circuit of circuits) {
    for (const valve of valvesShuttingLiquidIn(circuit)) {
      add(valve, 'I12', `With it and the expansion valve of circuit ${circuit.name} both closed, liquid is shut in between them.`)
    }
  }

  // A refusal can take the ground from under another point, so look again until nothing changes.
  const standing = (place: Placed) => place.active && !refusals.has(place.point.tag)
  const compressors = placed.filter(({ point }) => point.kind === 'compressor')
  const condenserFans = placed.filter(({ point }) => point.kind === 'condenser-fan')
  const liquidValves = placed.filter(({ point }) => isLiquidValve(point.kind))
  let before = -1
  while (before !== refusals.size) {
    before = refusals.size
    for (const compressor of compressors.filter(standing)) {
      const fans = condenserFans.filter(({ rack }) => rack === compressor.rack)
      if (!externalHeatRejection && !fans.some(fan => fan.active)) {
        add(compressor, 'I1', fans.length === 0
          ? `${rackWords(compressor)} has no condenser fan point, so nothing is known to reject its heat.`
          : `No condenser fan of ${rackWords(compressor, true)} will be on.`)
      } else if (!countsAsFed(compressor, circuits) && feeding(compressor, circuits, standing).length === 0) {
        add(compressor, 'I1', `No circuit of ${groupWords(compressor)} will have its liquid valves open and its evaporator fans on.`)
      }
    }
    for (const compressor of compressors.filter(standing)) {
      if (compressor.point.stage === 'low' && !mediumStage(compressors, compressor.rack).some(standing)) {
        add(compressor, 'I12', 'A low-stage compressor is on only while a medium-stage one is, and none will be.')
      }
    }
    for (const valve of liquidValves.filter(standing)) {
      if (!compressors.some(compressor => standing(compressor) && sharesScope(valve, compressor))) {
        add(valve, 'I1', `No compressor of ${groupWords(valve)} will be on, so its liquid valves stay closed.`)
      }
    }
  }
  return refusals
}

function refuseHandBack(placed: readonly Placed[]): Refusals {
  const refusals: Refusals = new Map()
  const compressors = placed.filter(({ point }) => point.kind === 'compressor')
  const heldOn = (place: Placed) => place.active && (place.point.stays === true || refusals.has(place.point.tag))
  for (const low of compressors) {
    if (low.point.stage !== 'low' || !heldOn(low)) continue
    const medium = mediumStage(compressors, low.rack).filter(place => place.active)
    const last = lastMediumFirst(medium)[0]
    if (last && !medium.some(heldOn)) {
      refusals.set(last.point.tag, {
        tag: last.point.tag,
        rule: 'I12',
        because: `${low.point.tag} stays in hand on, and a low-stage compressor is on only while a medium-stage one is.`,
      })
    }
  }
  for (const valve of placed) {
    if (!isLiquidValve(valve.point.kind) || valve.point.stays) continue
    const fed = compressors.find(compressor => heldOn(compressor) && sharesScope(valve, compressor))
    if (fed) {
      refusals.set(valve.point.tag, {
        tag: valve.point.tag,
        rule: 'I7',
        because: `${fed.point.tag}, which it feeds, stays in hand on.`,
      })
    }
  }
  return refusals
}

/** I2, I9 and I3 look at nothing but the point itself. */
function ruleOfItsOwn({ point, active, atRest }: Placed): { rule: OrderRule, because: string } | null {
  const { kind, guardInSeries } = point
  if (active && (kind === 'defrost-heater' || kind === 'hot-gas-valve')) {
    return { rule: 'I2', because: 'A defrost heater or hot-gas valve is never in hand on.' }
  }
  if (active && guardInSeries === false && (kind === 'compressor' || kind === 'anti-sweat-heater')) {
    return { rule: 'I9', because: 'Its guards are not in series in hand, so nothing would stop it.' }
  }
  if (atRest && (isAlarm(kind) || kind === 'machinery-room-ventilation' || kind === 'egress-light')) {
    return { rule: 'I3', because: 'It keeps people safe and is never off.' }
  }
  return null
}

function valvesShuttingLiquidIn(circuit: Circuit): Placed[] {
  if (circuit.name === null) return []
  const closed = circuit.valves.filter(valve => valve.atRest)
  if (!closed.some(({ point }) => point.kind === 'expansion-valve')) return []
  return closed.filter(({ point }) => point.kind === 'liquid-line-valve')
}

/** A drive goes with the machine that it drives. */
function refuseDrives(placed: readonly Placed[], refusals: Refusals, handBack: boolean): Refusals {
  for (const { point, machine, depth } of placed) {
    const refused = refusals.get(machine.tag)
    if (depth === 0 || !refused || refusals.has(point.tag) || (handBack && point.stays)) continue
    refusals.set(point.tag, { tag: point.tag, rule: refused.rule, because: `It drives ${machine.tag}, which is refused. ${refused.because}` })
  }
  return refusals
}

function mediumStage(compressors: readonly Placed[], rack: string): Placed[] {
  return compressors.filter(place => place.point.stage === 'medium' && place.rack === rack)
}

function rackWords({ rack }: Placed, inSentence = false): string {
  if (rack !== '') return inSentence ? `rack ${rack}` : `Rack ${rack}`
  return inSentence ? 'its rack' : 'Its rack'
}

function groupWords(place: Placed): string {
  if (place.groups !== null) return `suction group ${[...place.groups].join(', ')}`
  return rackWords(place, true)
}
