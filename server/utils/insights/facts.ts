/** What a finished record adds to the insights, from its log alone. Pure. */
import { CAUSE_WORDS, discards } from '../../../shared/record/act-words'
import type { Discard } from '../../../shared/record/act-words'
import type { StoredEntry } from '../../../shared/record/entry'
import { acceptedOf, pointLines } from '../../../shared/record/record-lines'
import { darkMs } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import type { SnapshotCase } from '../../../shared/record/snapshot'
import type { DiscardFact, HoldFact, OutageFacts, PointFact, StepFact } from '../../../shared/schemas/insights'
import { LESSON_READINGS_MIN } from '../../../shared/schemas/lessons'
import { fitAt, MINUTE, takenOf } from '../hold/evidence'
import { bareHold, isWarming } from '../hold/for-outage'
import { isHeldOn } from '../hold/held-case'
import { historyOf } from '../hold/history'
import { endOf, stepsTaught, untilAct } from '../learn/from-record'

/** Raised when the same record would give other facts; rows of an older version are made anew. */
export const FACTS_VERSION = 1

const tenth = (value: number) => Math.round(value * 10) / 10

/** @param state the fold of these entries @param until Unix ms; where control never came back, until when that counts */
export function factsOf(state: OutageState, entries: readonly StoredEntry[], until: number): OutageFacts {
  const { workKind, duration } = state.plan
  return {
    work: {
      kindId: workKind.id, name: workKind.name, planned: state.planned, took: tenth(darkMs(state, until) / MINUTE),
      ...(state.planned ? { likely: tenth(duration.darkMean), within: tenth(duration.dark19in20) } : { likely: null, within: null }),
    },
    steps: stepFacts(state),
    holds: holdFacts(state, entries),
    ...pointFacts(state, entries),
    rounds: roundFacts(state, until),
    discards: discards(state).map(discard => discardFact(state, entries, discard)),
  }
}

function stepFacts(state: OutageState): StepFact[] {
  return stepsTaught(state).map(({ step, name, minutes }) => {
    const back = !state.plan.steps.some(item => item.id === step)
    const { shortest, likely, longest } = (back ? state.plan.rollBack : state.plan.steps).find(item => item.id === step)!
    return { step, name, back, minutes, planned: { shortest, likely, longest } }
  })
}

/**
 * Cases read often enough without control to say how long they held, by the time without control in which
 * they were read most. One that was held on by hand and did not warm says nothing of that.
 */
function holdFacts(state: OutageState, entries: readonly StoredEntry[]): HoldFact[] {
  const ends = state.darks.map(dark => endOf(state, entries, dark))
  return state.snapshot.cases.filter(known => !known.runsAlone && state.cases[known.id]?.touched).flatMap((known): HoldFact[] => {
    const taken = takenOf(state, known.id)
    const best = ends
      .map(({ dark, at, before }) => ({ dark, at, before, running: fitAt(state, known, taken, dark, untilAct(state, known.id, dark, at)) }))
      .sort((a, b) => b.running.since - a.running.since || a.at - b.at)[0]
    if (!best || best.running.since < LESSON_READINGS_MIN) return []
    if (isHeldOn(best.before, known) && !isWarming(known, taken, best.dark, best.at)) return []
    const minutes = best.running.fit.minutesFrom(0)?.likely ?? null
    return [{ caseId: known.id, name: known.name, minutes: minutes === null ? null : tenth(minutes), reckoned: reckonedHold(state, known, best.dark.from), readings: best.running.since }]
  })
}

function reckonedHold(state: OutageState, known: SnapshotCase, from: number): number | null {
  const minutes = bareHold(known, takenOf(state, known.id).findLast(reading => reading.at <= from)?.c ?? known.usualC)
  return minutes === null ? null : tenth(minutes)
}

function pointFacts(state: OutageState, entries: readonly StoredEntry[]): Pick<OutageFacts, 'touched' | 'excused' | 'notProven'> {
  const lines = pointLines(state, entries)
  const touched = [...new Set(lines.map(line => line.tag))].sort()
  const once = (facts: PointFact[]) => facts.filter((fact, index) => facts.findIndex(other => other.tag === fact.tag) === index)
  const last = touched.map(tag => lines.findLast(line => line.tag === tag)!)
  return {
    touched,
    excused: once(lines.flatMap(({ tag, name, excused }) => excused ? [{ tag, name, reason: excused.reason }] : [])),
    notProven: last.flatMap(({ tag, name, exception, proven }) => exception && !proven ? [{ tag, name, reason: exception.reason }] : []),
  }
}

function roundFacts(state: OutageState, until: number): OutageFacts['rounds'] {
  const { late, forecasts } = historyOf(state, until)
  const roundOf = new Map(Object.values(state.cases).flatMap(item => item.readings.map(reading => [reading.seq, reading.round] as const)))
  const lateRounds = new Set(late.map(({ seq, caseId }) => seq === null ? `never: ${caseId}` : roundOf.get(seq)))
  return {
    taken: new Set(forecasts.map(({ seq }) => roundOf.get(seq))).size,
    late: lateRounds.size,
    worst: tenth(Math.max(0, ...late.map(({ minutes }) => minutes))),
  }
}

/** The act that the discard ended says why; where none was open, people discarded it of their own accord. */
function discardFact(state: OutageState, entries: readonly StoredEntry[], discard: Discard): DiscardFact {
  const { caseId, name, product, quantity, unit, at, seq, entry } = discard
  const opening = state.cases[caseId]!.openings.find(({ closed }) => closed?.mark.entry === entry)
  const verdict = acceptedOf(entries, 'verdict-changed').findLast(({ stored, entry: { body } }) => body.caseId === caseId && stored.seq < seq)?.entry.body
  const clause = opening && verdict && (opening.cause === 'act' || opening.cause === 'discard') ? `, ${verdict.clause}` : ''
  return { caseId, name, product, quantity, unit, at, seq, cause: opening ? `${CAUSE_WORDS[opening.cause]}${clause}` : 'no rule asked for it' }
}
