import { isHandActive } from '../schemas/point-kinds'
import { pressureDifferenceWords, pressureWords } from '../utils/pressure'
import { openActFaults } from './act-words'
import { BACK_CHECKS, BEFORE_CHECKS } from './checks'
import { acceptanceWanted, measuresWanted } from './margin'
import type { MarginFigure } from './margin'
import { caseName, firmReadings, groupName, isOver, openDark, pointsInHand, pointsWaiting, productReadings, proofsDue, watchedCases } from './select'
import type { OutageState, PressureState } from './state'
import { deniedFaults, openVoices } from './voice'

/** Suction must stay within this of itself, psi, for this long, ms, before dark. Common practice, no source. */
export const STEADY_PSI = 3
export const STEADY_MS = 10 * 60_000
/** Suction stands at least this far above the low cut-out, and at most so far above its target, psi. */
export const ABOVE_CUT_OUT_PSI = 3
export const ABOVE_TARGET_PSI = 10
/** The last pressure reading before dark may be this old, ms. */
const FRESH_MS = 15 * 60_000
/** A rise that a thermometer's last digit can make up, in kelvin. */
const LAST_DIGIT_K = 0.11

/**
 * What the rule engine, the order and the plan say, worked out by the caller: this room
 * computes none of it.
 */
export interface GateResults {
  /** rules that the plan's points break, in words */
  planRefusals: string[]
  /** whether product outlasts the work; null where nobody worked it out */
  margin: MarginFigure | null
}

export const NO_RESULTS: GateResults = { planRefusals: [], margin: null }

const list = (names: string[], most = 6) => names.length <= most ? names.join(', ') : `${names.slice(0, most).join(', ')} and ${names.length - most} more`

/** What stands in the way of asking for approval. Empty: nothing. */
export function planGate(state: OutageState, results: GateResults): string[] {
  const missing: string[] = []
  const { plan } = state
  if (plan.startsAt === null) missing.push('the start is not set')
  if (plan.steps.length === 0) missing.push('the work has no steps')
  if (plan.points.length === 0 && plan.cases.every(item => !item.touched)) missing.push('no point and no case is touched')
  const ordered = new Set(plan.order.map(line => line.tag))
  const unordered = plan.points.filter(point => !ordered.has(point.tag)).map(point => point.tag)
  if (unordered.length > 0) missing.push(`no place in the order for ${list(unordered)}`)
  const unknown = plan.points.filter(point => !state.points[point.tag]).map(point => point.tag)
  if (unknown.length > 0) missing.push(`this controller has no point ${list(unknown)}`)
  return [...missing, ...results.planRefusals, ...results.margin ? measuresWanted(plan, results.margin) : []]
}

/** Whether a suction group held on by hand has been steady for ten minutes; a sentence when not. */
export function steadyFault(state: OutageState, groupId: string, at: number): string | null {
  const group = state.snapshot.suctionGroups.find(item => item.id === groupId)!
  const name = groupName(state, groupId)
  const unit = state.snapshot.site.pressureUnit
  const since = Math.max(...state.snapshot.points
    .filter(point => point.suctionGroupId === groupId && point.kind === 'compressor')
    .map(point => state.points[point.tag]?.mark?.at ?? 0), 0)
  const readings = state.pressures.filter(reading => reading.suctionGroupId === groupId && !reading.questioned && reading.at >= since && reading.at <= at).sort((a, b) => a.at - b.at)
  const last = readings.at(-1)
  if (!last) return `${name}: suction not read since its compressors were put in hand`
  if (at - last.at > FRESH_MS) return `${name}: suction last read more than ${FRESH_MS / 60_000} minutes ago`
  if (group.lowCutOutPsig !== null && last.suctionPsig < group.lowCutOutPsig + ABOVE_CUT_OUT_PSI) return `${name}: suction ${pressureWords(last.suctionPsig, unit)} is within ${pressureDifferenceWords(ABOVE_CUT_OUT_PSI, unit)} of the low cut-out`
  if (group.targetSuctionPsig !== null && last.suctionPsig > group.targetSuctionPsig + ABOVE_TARGET_PSI) return `${name}: suction ${pressureWords(last.suctionPsig, unit)} is more than ${pressureDifferenceWords(ABOVE_TARGET_PSI, unit)} above its target`
  const steadySince = steadyStart(readings)
  if (last.at - steadySince < STEADY_MS) return `${name}: suction steady for ${Math.floor((last.at - steadySince) / 60_000)} of ${STEADY_MS / 60_000} minutes`
  return null
}

/** First of the last readings that all lie within ±3 psi of the last. Unix ms. */
function steadyStart(readings: PressureState[]): number {
  const last = readings.at(-1)!
  let start = last.at
  for (const reading of [...readings].reverse()) {
    if (Math.abs(reading.suctionPsig - last.suctionPsig) > STEADY_PSI) break
    start = reading.at
  }
  return start
}

/** Suction groups in which a compressor is held on. */
function groupsHeldOn(state: OutageState): string[] {
  const groups = state.snapshot.points
    .filter(point => point.kind === 'compressor' && point.suctionGroupId !== null)
    .filter((point) => { const held = state.points[point.tag]; return held?.status === 'hand' && held.hand !== null && isHandActive(held.hand) })
    .map(point => point.suctionGroupId!)
  return [...new Set(groups)].sort()
}

/** What stands in the way of going dark at a moment. @param at Unix ms */
export function goDarkGate(state: OutageState, at: number, results: GateResults): string[] {
  const missing: string[] = []
  const unsigned = BEFORE_CHECKS.filter(check => !state.checks[check.id]).map(check => check.ask.toLowerCase())
  if (unsigned.length > 0) missing.push(`checks not signed: ${list(unsigned, 3)}`)
  const unread = watchedCases(state).filter(item => !item.empty && firmReadings(item).length === 0).map(item => caseName(state, item.id))
  if (unread.length > 0) missing.push(`round 0 lacks ${list(unread)}`)
  const warm = watchedCases(state).filter(item => startedWarm(state, item.id) && !item.acceptedWarm && !item.empty).map(item => caseName(state, item.id))
  if (warm.length > 0) missing.push(`already warm, neither emptied nor accepted as started warm: ${list(warm)}`)
  const waiting = pointsWaiting(state).map(point => point.tag)
  if (waiting.length > 0) missing.push(`still in auto, not excused: ${list(waiting)}`)
  const tried = Object.values(state.points).filter(point => point.tried !== null && point.status !== 'excused').map(point => point.tag)
  if (tried.length > 0) missing.push(`not seen as asked: ${list(tried)}`)
  for (const group of groupsHeldOn(state)) {
    const fault = steadyFault(state, group, at)
    if (fault) missing.push(fault)
  }
  const open = state.questioned.filter(item => item.settled === null && item.tag !== null).map(item => item.tag!)
  if (open.length > 0) missing.push(`questioned entries not looked at: ${list([...new Set(open)])}`)
  return [...missing, ...results.margin ? acceptanceWanted(state, results.margin) : []]
}

/** The last product reading before dark was over the limit; a questioned one counts only against it. */
export function startedWarm(state: OutageState, caseId: string): boolean {
  const limit = state.snapshot.cases.find(item => item.id === caseId)?.limit
  const from = openDark(state)?.from ?? Infinity
  const before = productReadings(state.cases[caseId]!).filter(reading => reading.at <= from)
  const last = [before.at(-1), before.filter(reading => !reading.questioned).at(-1)]
  return limit !== undefined && last.some(reading => reading !== undefined && isOver(reading, limit))
}

/** What stands in the way of returning points: the controller is checked first. */
export function returnPointsGate(state: OutageState): string[] {
  const unsigned = BACK_CHECKS.filter(check => !state.checks[check.id]).map(check => check.ask.toLowerCase())
  return unsigned.length > 0 ? [`the controller is checked first; not signed: ${list(unsigned, 3)}`] : []
}

/** What stands in the way of closing hand back (I8). An exception says nothing of what a questioned entry claims. */
export function handBackGate(state: OutageState): string[] {
  const missing = returnPointsGate(state)
  const inHand = pointsInHand(state).filter(point => point.exception === null || point.questionedHand !== null).map(point => point.tag)
  if (inHand.length > 0) missing.push(`still in hand: ${list(inHand)}`)
  const due = proofsDue(state).filter(point => point.exception === null).map(point => point.tag)
  if (due.length > 0) missing.push(`not yet proven: ${list(due)}`)
  return missing
}

/** What stands in the way of saying that the product has settled. */
export function settledFaults(state: OutageState): string[] {
  const faults: string[] = []
  const since = state.backAt ?? Infinity
  for (const item of watchedCases(state)) {
    if (item.empty) continue
    const name = caseName(state, item.id)
    const limit = state.snapshot.cases.find(known => known.id === item.id)!.limit
    const readings = firmReadings(item).filter(reading => reading.at >= since)
    const [before, last] = [readings.at(-2), readings.at(-1)]
    const newest = productReadings(item).at(-1)
    if (!last || !before) { faults.push(`${name}: ${2 - readings.length} more ${readings.length === 1 ? 'reading' : 'readings'} since control is back`); continue }
    const over = [last, newest!].find(reading => isOver(reading, limit))
    if (over) faults.push(`${name}: ${over.value} °${over.unit} is over its limit`)
    else if (kelvin(last) > kelvin(before) + LAST_DIGIT_K) faults.push(`${name}: still rising`)
  }
  if (state.plan.watchDefrosts) {
    const kinds = new Set(state.snapshot.circuits.filter(circuit => circuit.defrostKind !== 'none').map(circuit => circuit.defrostKind))
    for (const watched of state.defrostsWatched) kinds.delete(state.snapshot.circuits.find(circuit => circuit.id === watched.circuitId)?.defrostKind ?? 'none')
    if (kinds.size > 0) faults.push(`one defrost to be watched of each kind: ${[...kinds].sort().join(', ')}`)
  }
  return faults
}

const kelvin = (reading: { value: number, unit: 'F' | 'C' }) => reading.unit === 'C' ? reading.value : reading.value * 5 / 9

/** What stands in the way of submitting the record. */
export function submitGate(state: OutageState): string[] {
  const missing = [...handBackGate(state)]
  if (state.handBackClosed === null) missing.push('hand back is not closed')
  missing.push(...settledFaults(state))
  missing.push(...openActFaults(state))
  const open = state.questions.filter(question => question.answer === null).length
  if (open > 0) missing.push(`${open} ${open === 1 ? 'question' : 'questions'} to answer`)
  return missing
}

/** What stands in the way of the seal. */
export function sealGate(state: OutageState, filesAwaited: string[]): string[] {
  const missing: string[] = []
  const questioned = state.questioned.filter(item => item.settled === null).length
  if (questioned > 0) missing.push(`${questioned} questioned ${questioned === 1 ? 'entry' : 'entries'} not dealt with`)
  const open = state.questions.filter(question => question.answer === null).length
  if (open > 0) missing.push(`${open} ${open === 1 ? 'question' : 'questions'} without an answer`)
  const spoken = openVoices(state).map(voice => voice.supervisorName)
  if (spoken.length > 0) missing.push(`${spoken.length} ${spoken.length === 1 ? 'decision' : 'decisions'} by voice not signed by ${list([...new Set(spoken)])}`)
  missing.push(...deniedFaults(state))
  if (filesAwaited.length > 0) missing.push(`${filesAwaited.length} ${filesAwaited.length === 1 ? 'photo or drawing' : 'photos or drawings'} awaited`)
  return missing
}

/** What stands in the way of calling off: every point is back in auto first. */
export function callOffGate(state: OutageState): string[] {
  const inHand = pointsInHand(state).map(point => point.tag)
  return inHand.length > 0 ? [`still in hand: ${list(inHand)}`] : []
}
