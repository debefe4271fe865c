/** Why a point stands where it stands, in words for the person who goes there. */
import type { PlanOrderInput } from '~~/shared/schemas/plan-order'
import { assumptions, circuitsOf, countsAsFed, feeding, isLiquidValve, type Circuit } from './feed'
import type { Placed } from './layout'
import { stageOf, type Stage } from './stages'

/** The record keeps a reason of at most so many characters. */
export const LONGEST_BECAUSE = 400

const IN_HAND: Record<Stage, string> = {
  'stopped-machine': 'Machines asked off stop before the heat rejection is touched.',
  'defrost': 'Heat and hot gas come off before anything else is held.',
  'evaporator-fan': 'Evaporator fans follow once the defrosts are off.',
  'heat-rejection': 'Heat rejection is in hand before any machine is held on.',
  'comfort': 'Anti-sweat heaters, lights, ventilation and the like follow the fans.',
  'liquid-valve': 'Liquid valves follow the fans and come before the machines they feed.',
  'machine': 'Machines come last, one at a time.',
  'alarm': 'Alarms stand with the lights and ventilation.',
}

const HAND_BACK: Record<Stage, string> = {
  'stopped-machine': 'Machines are handed back first, one at a time.',
  'machine': 'Machines are handed back first, one at a time.',
  'liquid-valve': 'Liquid valves follow the machines: no compressor they feed is in hand on.',
  'evaporator-fan': 'Evaporator fans follow the liquid valves.',
  'heat-rejection': 'Heat rejection follows the evaporator fans.',
  'comfort': 'Anti-sweat heaters, lights, ventilation and the like follow the fans.',
  'defrost': 'Defrosts come last, and one circuit is watched through.',
  'alarm': 'Alarms go back in service last, when nothing else is in hand.',
}

/** The reasons of all points, asked one at a time. */
export function reasons(input: PlanOrderInput, placed: readonly Placed[], isRefused: (tag: string) => boolean): (place: Placed) => string {
  const circuits = circuitsOf(placed)
  const isOpen = (valve: Placed) => valve.active && !isRefused(valve.point.tag)
  return (place) => {
    const said = [whyHere(place, input), ...machineWords(place, input)]
    if (input.direction === 'in-hand' && place.active) {
      if (place.point.kind === 'compressor') said.push(...fedWords(place, circuits, isOpen, input.externalHeatRejection === true))
      if (place.point.kind === 'evaporator-fan' || isLiquidValve(place.point.kind)) {
        said.push(...circuits.filter(({ name }) => name !== null && name === place.point.circuit).flatMap(assumptions))
      }
    }
    if (place.point.after?.length) said.push(`By its links it follows ${place.point.after.join(', ')}.`)
    return shorten(said)
  }
}

function whyHere(place: Placed, { direction }: PlanOrderInput): string {
  const stage = stageOf(place, direction)
  if (!place.active && !place.atRest && stage !== 'alarm') return 'Left as found: it may come anywhere.'
  if (direction === 'hand-back') return HAND_BACK[stage]
  if (stage === 'liquid-valve' && place.atRest) return 'A closed valve follows the machines asked off of its group.'
  return IN_HAND[stage]
}

function machineWords(place: Placed, { direction }: PlanOrderInput): string[] {
  const { point, machine, depth, driven } = place
  const inHand = direction === 'in-hand'
  if (depth > 0) {
    return [inHand ? `Its speed is set immediately before ${machine.tag}.` : `It follows ${machine.tag}, which it drives.`]
  }
  if (point.kind !== 'compressor' || !place.active) return []
  const said: string[] = []
  if (driven) said.push(inHand ? 'It comes immediately after its drive, ahead of fixed-speed machines.' : 'Its drive follows it.')
  else if (inHand) said.push(point.running ? 'It runs now, so it comes before those that do not.' : 'Those running now come before it.')
  if (point.stage === 'low') {
    said.push(inHand ? 'A medium-stage machine is on before it.' : 'It comes before the last medium-stage machine.')
  }
  return said
}

function fedWords(
  compressor: Placed,
  circuits: readonly Circuit[],
  isOpen: (valve: Placed) => boolean,
  externalHeatRejection: boolean,
): string[] {
  const said: string[] = []
  if (externalHeatRejection) said.push('Heat rejection elsewhere stands for the condenser fans.')
  if (countsAsFed(compressor, circuits)) said.push('Its rack has no circuit points here: it counts as fed.')
  else said.push(...feeding(compressor, circuits, isOpen).flatMap(assumptions))
  return said
}

/** As many whole sentences as the record keeps. */
function shorten(sentences: readonly string[]): string {
  let text = ''
  for (const sentence of sentences) {
    const longer = text === '' ? sentence : `${text} ${sentence}`
    if (longer.length > LONGEST_BECAUSE) break
    text = longer
  }
  return text
}
