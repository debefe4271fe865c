/** When the rulebook's verdict on a case with nothing running becomes one that demands an act. */
import type { Snapshot, SnapshotCase } from '~~/shared/record/snapshot'
import type { OutageState, ReadingState } from '~~/shared/record/state'
import { emptyState } from '~~/shared/record/state'
import { assessCase } from '../holding/for-outage'
import type { CurvePoint } from './hold-time'

/** As far apart as rounds usually are. */
const STEP_MINUTES = 10
const LONGEST_MINUTES = 600
const MINUTE = 60_000
const NO_ID = '00000000-0000-0000-0000-000000000000'
/** Any moment serves: only what lies between counts. */
const LOST_AT = Date.UTC(2026, 0, 1)

/**
 * The last minute after control is lost, in steps of ten, at which a product that follows the curve may
 * still be kept by the site's rulebook: from then on it must be used, moved or discarded. Null: not within ten hours.
 * @param curve °C by minutes from the loss of control
 */
export function deadlineMinutes(snapshot: Snapshot, known: SnapshotCase, curve: readonly CurvePoint[]): number | null {
  const readings = Array.from({ length: LONGEST_MINUTES / STEP_MINUTES + 1 }, (_, index) => readingAt(curve, index))
  const isOver = (count: number) => {
    const verdict = assessCase(madeState(snapshot, known, readings.slice(0, count + 1)), known.id, LOST_AT + count * STEP_MINUTES * MINUTE)?.verdict
    return verdict === 'act' || verdict === 'discard'
  }
  let [low, high] = [0, readings.length - 1]
  if (isOver(0)) return 0
  if (!isOver(high)) return null
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (isOver(middle)) high = middle
    else low = middle
  }
  return low * STEP_MINUTES
}

function readingAt(curve: readonly CurvePoint[], index: number): ReadingState {
  const minute = index * STEP_MINUTES
  return {
    entry: NO_ID, seq: index, round: index, at: LOST_AT + minute * MINUTE, value: Math.min(80, Math.max(-60, courseAt(curve, minute))), unit: 'C',
    method: 'product', instrumentId: null, by: NO_ID, questioned: false, correctedBy: null, struck: false, words: '',
  }
}

/** Between two points of a curve a straight line; beyond its end the last two go on. */
function courseAt(curve: readonly CurvePoint[], minute: number): number {
  const next = Math.max(1, curve.findIndex(point => point.minute >= minute))
  const index = curve.at(-1)!.minute < minute ? curve.length - 1 : next
  const [before, after] = [curve[index - 1]!, curve[index]!]
  return before.c + (after.c - before.c) * (minute - before.minute) / (after.minute - before.minute)
}

function madeState(snapshot: Snapshot, known: SnapshotCase, readings: ReadingState[]): OutageState {
  const state = emptyState(NO_ID)
  const mark = { by: NO_ID, at: LOST_AT, seq: 0, entry: NO_ID }
  state.snapshot = snapshot
  state.darks = [{ from: LOST_AT, to: null, how: 'fact', words: '', breach: [], mark }]
  state.cases = { [known.id]: { id: known.id, touched: true, readings, verdict: null, openAct: null, openings: [], acts: [], decidedOtherwise: null, acceptedWarm: false, empty: false } }
  return state
}
