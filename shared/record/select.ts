import { isHandActive } from '../schemas/point-kinds'
import type { HandPosition, PointKind } from '../schemas/point-kinds'
import type { SeenInHand } from './kinds/hand'
import type { CaseState, OutageState, PointState, ReadingState } from './state'

/** Points that are in a person's hands, or may be: what hand back must bring to nothing. */
export function pointsInHand(state: OutageState): PointState[] {
  return Object.values(state.points).filter(point => point.status === 'hand' || point.tried !== null || point.questionedHand !== null)
}

/** Points of the plan that are neither in hand nor excused, in the order of the plan; those without a place in it come last. */
export function pointsWaiting(state: OutageState): PointState[] {
  const tags = new Set([...state.plan.order, ...state.plan.points].map(line => line.tag))
  return [...tags].map(tag => state.points[tag]).filter((point): point is PointState => point !== undefined && point.status === 'auto')
}

/** Points back in auto that nobody has yet seen to answer the controller. */
export function proofsDue(state: OutageState): PointState[] {
  return Object.values(state.points).filter(point => point.status === 'returned')
}

/** The machine kinds that run or stand still; the others are open or closed, on or off. */
const MACHINES: ReadonlySet<PointKind> = new Set(['compressor', 'condenser-fan', 'evaporator-fan', 'pump', 'ventilation', 'machinery-room-ventilation', 'drive'])

/** What should be seen of a point held in a position. */
export function expectedSeen(kind: PointKind, hand: HandPosition): SeenInHand {
  if (hand === 'as-found') return 'as-found'
  if (hand === 'open' || hand === 'closed') return hand
  if (typeof hand === 'object') return 'at-position'
  if (MACHINES.has(kind)) return isHandActive(hand) ? 'running' : 'not-running'
  if (kind.endsWith('-valve') || kind === 'suction-regulator') return isHandActive(hand) ? 'open' : 'closed'
  return isHandActive(hand) ? 'on' : 'off'
}

/** What a person may answer to "what do you see now?", the answer as asked first. */
export function seenChoices(kind: PointKind, hand: HandPosition): SeenInHand[] {
  const expected = expectedSeen(kind, hand)
  const others: Partial<Record<SeenInHand, SeenInHand[]>> = {
    'running': kind === 'compressor' ? ['not-running', 'cycling'] : ['not-running'],
    'not-running': ['running'],
    'open': ['closed'],
    'closed': ['open'],
    'on': ['off'],
    'off': ['on'],
    'at-position': ['not-at-position'],
  }
  return [expected, ...(others[expected] ?? [])]
}

/** Sightings in words. */
export const SEEN_WORDS: Record<SeenInHand, string> = {
  'running': 'Running',
  'not-running': 'Not running',
  'cycling': 'Starting and stopping on a cut-out',
  'open': 'Open',
  'closed': 'Closed',
  'on': 'On',
  'off': 'Off',
  'at-position': 'At its fixed position',
  'not-at-position': 'Not at its position',
  'as-found': 'Left as found',
}

/** Cases of the plan whose product must be watched: touched, not kept going by a controller of their own. */
export function watchedCases(state: OutageState): CaseState[] {
  return state.snapshot.cases.filter(item => !item.runsAlone).map(item => state.cases[item.id]).filter((item): item is CaseState => item !== undefined && item.touched)
}

/** Readings that are judged: not struck; in the order in which they were taken. */
export function judgedReadings(item: CaseState): ReadingState[] {
  return item.readings.filter(reading => !reading.struck).sort((a, b) => a.at - b.at || a.seq - b.seq)
}

export function productReadings(item: CaseState): ReadingState[] {
  return judgedReadings(item).filter(reading => reading.method === 'product')
}

/** Product readings on which a gate may rest: a questioned one is judged, but opens nothing. */
export function firmReadings(item: CaseState): ReadingState[] {
  return productReadings(item).filter(reading => !reading.questioned)
}

export function celsius(value: number, unit: 'F' | 'C'): number {
  return unit === 'C' ? value : (value - 32) * 5 / 9
}

export function inUnit(c: number, unit: 'F' | 'C'): number {
  return unit === 'C' ? c : c * 9 / 5 + 32
}

/** A reading is over a limit by more than the conversion's rounding, 1e-6 degree. */
export function isOver(reading: { value: number, unit: 'F' | 'C' }, limit: { value: number, unit: 'F' | 'C' }): boolean {
  return inUnit(celsius(reading.value, reading.unit), limit.unit) > limit.value + 1e-6
}

/** The dark interval that runs now, or null. */
export function openDark(state: OutageState) {
  const last = state.darks.at(-1)
  return last && last.to === null ? last : null
}

/** The first loss of control, Unix ms, or null while there was none. */
export function firstDarkAt(state: OutageState): number | null {
  return state.darks[0]?.from ?? null
}

/** The way back that was begun in the dark interval that runs now, or null. */
export function turningBack(state: OutageState): OutageState['turnedBack'] {
  const dark = openDark(state)
  return dark && state.turnedBack && state.turnedBack.mark.seq > dark.mark.seq ? state.turnedBack : null
}

/** A supervisor's order to turn back in the dark interval that runs now, while nobody has begun the way back; or null. */
export function turnBackOrder(state: OutageState): OutageState['turnBackOrdered'] {
  const dark = openDark(state)
  const order = state.turnBackOrdered
  return dark && order && order.mark.seq > dark.mark.seq && !turningBack(state) ? order : null
}

/** Time without control until now over all intervals, ms; where signed times overlap, the time counts once. */
export function darkMs(state: OutageState, now: number): number {
  const intervals = state.darks.map(dark => ({ from: dark.from, to: dark.to ?? now })).sort((a, b) => a.from - b.from)
  let sum = 0
  let counted = -Infinity
  for (const { from, to } of intervals) {
    sum += Math.max(0, to - Math.max(from, counted))
    counted = Math.max(counted, to)
  }
  return sum
}

/** The number that the next round takes: the highest so far and one, 0 before any. */
export function nextRound(state: OutageState): number {
  const rounds = [...Object.values(state.cases).flatMap(item => item.readings.map(reading => reading.round)), ...state.pressures.map(pressure => pressure.round)]
  return rounds.length === 0 ? 0 : Math.max(...rounds) + 1
}

export interface RoundSummary { round: number, from: number, to: number, cases: number, racks: number }

/** Every round that was taken, with its first and last moment. */
export function roundsTaken(state: OutageState): RoundSummary[] {
  const byRound = new Map<number, RoundSummary>()
  const add = (round: number, at: number, what: 'cases' | 'racks') => {
    const summary = byRound.get(round) ?? { round, from: at, to: at, cases: 0, racks: 0 }
    summary.from = Math.min(summary.from, at)
    summary.to = Math.max(summary.to, at)
    summary[what]++
    byRound.set(round, summary)
  }
  for (const item of Object.values(state.cases)) for (const reading of item.readings) if (!reading.struck) add(reading.round, reading.at, 'cases')
  for (const pressure of state.pressures) add(pressure.round, pressure.at, 'racks')
  return [...byRound.values()].sort((a, b) => a.round - b.round)
}

/** Printed name of a person in this record. */
export function nameOf(state: OutageState, person: string): string {
  if (person === 'server') return 'Holdover'
  return Object.values(state.signers).find(signer => signer.person === person)?.name ?? state.named[person] ?? 'Unknown signer'
}

export function pointName(state: OutageState, tag: string): string {
  return state.snapshot.points.find(point => point.tag === tag)?.name ?? ''
}

export function caseName(state: OutageState, id: string): string {
  return state.snapshot.cases.find(item => item.id === id)?.name ?? 'Unknown case'
}

export function instrumentName(state: OutageState, id: string): string {
  return state.snapshot.instruments.find(item => item.id === id)?.name ?? 'Unknown instrument'
}

export function groupName(state: Pick<OutageState, 'snapshot'>, id: string): string {
  const group = state.snapshot.suctionGroups.find(item => item.id === id)
  const rack = state.snapshot.racks.find(item => item.id === group?.rackId)
  if (!group || !rack) return group?.name ?? 'Unknown suction group'
  const alone = state.snapshot.suctionGroups.filter(item => item.rackId === rack.id).length === 1
  return alone ? rack.name : `${rack.name}, ${group.name}`
}
