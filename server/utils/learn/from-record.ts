/** What a record teaches: time constants of its cases, durations of its steps. Pure. */
import type { StoredEntry } from '../../../shared/record/entry'
import { foldLog } from '../../../shared/record/fold'
import type { DarkInterval, OutageState } from '../../../shared/record/state'
import type { SnapshotCase } from '../../../shared/record/snapshot'
import { isFrozenKind } from '../../../shared/schemas/case-kinds'
import { LESSON_READINGS_MIN, tauOrigin } from '../../../shared/schemas/lessons'
import type { CaseLesson, StepTimes } from '../../../shared/schemas/lessons'
import { fitAt, takenOf } from '../hold/evidence'
import { isWarming } from '../hold/for-outage'
import { isHeldOn } from '../hold/held-case'

const MINUTE = 60_000
const HELD_CAUTION = 'It was held on by hand and warmed all the same: with nothing running it may warm faster.'

type Taught = Omit<CaseLesson, 'accepted'>

/** The fitted time constant of every watched case, from the time without control in which it was read most often. */
export function casesTaught(state: OutageState, entries: readonly StoredEntry[]): Taught[] {
  const ends = state.darks.map(dark => endOf(state, entries, dark))
  return state.snapshot.cases.filter(known => !known.runsAlone && state.cases[known.id]?.touched).map((known) => {
    const fits = ends.map(({ dark, at, before }) => ({ dark, at, before, running: fitAt(state, known, takenOf(state, known.id), dark, untilAct(state, known.id, dark, at)) }))
    const best = fits.sort((a, b) => b.running.since - a.running.since || a.at - b.at)[0]
    const lesson = { caseId: known.id, name: known.name, readings: best?.running.since ?? 0, rmseK: best?.running.fit.rmseK ?? 0, was: { tauHours: known.tauHours, words: tauOrigin(known.tauIsOwn, known.tauFrom) } }
    const held = best !== undefined && isHeldOn(best.before, known)
    const warmed = best !== undefined && isWarming(known, takenOf(state, known.id), best.dark, best.at)
    const not = reasonAgainst(known, lesson.readings, held && !warmed)
    return { ...lesson, tauHours: not === null ? best!.running.fit.tauHours : null, not, caution: not === null && held ? HELD_CAUTION : null }
  })
}

function reasonAgainst(known: SnapshotCase, readings: number, held: boolean): string | null {
  if (isFrozenKind(known.kind)) return 'frozen product has no time constant'
  if (readings < LESSON_READINGS_MIN) return readings === 0 ? 'not read without control' : `only ${readings === 1 ? '1 reading' : `${readings} readings`} without control`
  if (held) return 'it was held on by hand and did not warm'
  return null
}

/** A time without control, its end, and the state just before control came back: who was held on is seen there alone. */
export function endOf(state: OutageState, entries: readonly StoredEntry[], dark: DarkInterval): { dark: DarkInterval, at: number, before: OutageState } {
  const back = entries.find(stored => stored.seq > dark.mark.seq && stored.standing === 'accepted' && stored.entry.kind === 'control-back')
  return { dark, at: dark.to ?? dark.from, before: foldLog(state.id, back ? entries.filter(stored => stored.seq < back.seq) : entries) }
}

/** The first act after which the case warmed otherwise than with nothing running ends what can be learned. */
export function untilAct(state: OutageState, caseId: string, dark: DarkInterval, end: number): number {
  return Math.min(end, ...state.cases[caseId]!.acts.filter(({ mark }) => mark.at > dark.from).map(({ mark }) => mark.at - 1))
}

/** Mean of time constants, hours: of their logarithms, as they are proportions. @param taus at least one */
export function combinedTau(taus: readonly number[]): number {
  return Math.exp(taus.reduce((sum, tau) => sum + Math.log(tau), 0) / taus.length)
}

/** Steps that were begun and done, with the minutes that they took. */
export function stepsTaught(state: OutageState): { step: string, name: string, minutes: number }[] {
  return [...state.plan.steps, ...state.plan.rollBack].flatMap(({ id, name }) => {
    const { begun, done } = state.steps[id] ?? { begun: null, done: null }
    return begun && done && done.at > begun.at ? [{ step: id, name, minutes: tenth((done.at - begun.at) / MINUTE) }] : []
  })
}

/**
 * The three times of a step after one more outage: the shortest and longest reach out to what it took,
 * the likely one becomes the mean of what was estimated first and of all that was seen.
 * @param seen how many outages its times come from already
 */
export function correctedTimes(was: StepTimes, minutes: number, seen: number): StepTimes {
  const shortest = Math.min(was.shortest, minutes)
  const longest = Math.max(was.longest, minutes)
  const likely = was.likely + (minutes - was.likely) / (seen + 2)
  return { shortest, likely: tenth(Math.min(longest, Math.max(shortest, likely))), longest }
}

const tenth = (value: number) => Math.round(value * 10) / 10
