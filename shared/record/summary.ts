import type { Role } from '../schemas/people'
import { CAUSE_WORDS, endsBy, measureWords } from './act-words'
import type { StoredEntry } from './entry'
import { instrumentLines } from './instruments'
import type { InstrumentLine } from './instruments'
import { SEAL_STATEMENT, SUBMIT_STATEMENT } from './kinds/review'
import type { CheckLine, CorrectionLine, ForecastLine, LateReading, Line, PointLine, RoundLine, VerdictLine } from './record-lines'
import type { ForecastSummary } from './forecast-summary'
import { forecastSummary } from './forecast-summary'
import { acceptedOf, checkLines, correctionLines, lineOf, lineOfMark, overLimit, pointLines, roundLines, verdictLines } from './record-lines'
import { handsLines } from './hands'
import { caseName, darkMs, nameOf, pointsInHand, productReadings, proofsDue, watchedCases } from './select'
import type { OutageState } from './state'
import { voiceLine } from './voice'
import { told } from './words'

/** A clock that differs by more than this from the server's is pointed out, ms. */
export const CLOCK_DIFFERENCE_MS = 5 * 60_000

/** What only the engines know about a record; worked out by the caller, since this room computes none of it. */
export interface RecordFacts {
  /** readings that came later than they were due by the forecast */
  late: readonly LateReading[]
  /** every reading without control beside what was foretold for its time */
  forecasts: readonly ForecastLine[]
  /** where the limits of this record are written, each once */
  limits: readonly string[]
}

export interface SignatureLine extends Line { what: 'submitted' | 'sealed', role: Role | 'server', meaning: string, drawing: string, words: string, /** false once the record was returned for answers */ stands: boolean }
export interface PlantLine extends Line { words: string, act: string, over: boolean }
export interface ActLine extends Line { caseId: string, name: string, act: string, discarded: boolean, product: string, quantity: number | null, unit: string, place: string, takenBy: string, left: boolean, words: string }
/** An act that was asked for; `ended` null while it is open, and then `ends` says what would end it. */
export interface OpeningLine { seq: number, at: number, caseId: string, name: string, cause: string, ended: (Line & { how: string }) | null, ends: string }
export interface QuestionedLine { seq: number, entry: string, why: string[], settled: (Line & { words: string }) | null }
export interface ClockLine { device: string, deviceName: string, name: string, /** largest difference, ms; positive: the device is ahead */ ms: number, /** the entry with it */ seq: number, entries: number }
export interface QuestionLine extends Line { words: string, /** the entry that it is about; null: the record as a whole */ about: { seq: number, did: string } | null, answer: (Line & { words: string }) | null }

/** The figures of a record's front page and of its sections; page, PDF and CSV take them from here. */
export interface RecordSummary {
  heading: { code: string | null, site: string, controller: string, work: string, planned: boolean, from: number, to: number | null, timeZone: string }
  /** ms without control in all; minutes that were planned, null for an unplanned outage */
  dark: { ms: number, plannedMinutes: number | null, running: boolean, times: number }
  points: { set: number, back: number, proven: number, excused: number, inHand: number, proofsDue: number }
  rounds: { taken: number, late: number, never: number, lines: RoundLine[] }
  highest: { caseId: string, name: string, value: number, unit: 'F' | 'C', at: number } | null
  above: { watched: number, cases: string[] }
  limits: readonly string[]
  signatures: SignatureLine[]
  checks: { before: CheckLine[], back: CheckLine[] }
  pointLines: PointLine[]
  plantWarnings: PlantLine[]
  forecasts: ForecastSummary
  verdicts: VerdictLine[]
  acts: ActLine[]
  openings: OpeningLine[]
  instruments: InstrumentLine[]
  decidedOtherwise: (Line & { name: string, reason: string, clause: string })[]
  questioned: QuestionedLine[]
  questions: QuestionLine[]
  /** decisions by voice, and changes of hands, each told in a line */
  voices: { seq: number, words: string, /** not signed yet */ open: boolean }[]
  hands: { seq: number, words: string }[]
  clocks: ClockLine[]
  corrections: CorrectionLine[]
  refusals: { seq: number, reason: string }[]
}

/**
 * The summary of a record.
 * @param state the fold of these entries
 * @param now until when time without control still counts, Unix ms
 */
export function summaryOf(state: OutageState, entries: readonly StoredEntry[], facts: RecordFacts, now: number): RecordSummary {
  const verdicts = verdictLines(state, entries)
  const points = pointLines(state, entries)
  const lines = roundLines(state, facts.late)
  return {
    heading: headingOf(state),
    dark: { ms: darkMs(state, now), plannedMinutes: state.planned ? Math.round(state.plan.duration.darkMean) : null, running: state.darks.at(-1)?.to === null, times: state.darks.length },
    points: pointCounts(state, points),
    rounds: { taken: lines.length, late: lines.filter(line => line.late > 0).length, never: facts.late.filter(item => item.seq === null).length, lines },
    highest: highestProduct(state),
    above: { watched: watchedCases(state).length, cases: casesAbove(state, verdicts) },
    limits: facts.limits.length > 0 ? facts.limits : [state.snapshot.rulebook.name].filter(Boolean),
    signatures: signatureLines(state, entries),
    checks: checkLines(state),
    pointLines: points,
    plantWarnings: acceptedOf(entries, 'plant-warned').map(({ stored, entry: { body } }) => ({ ...lineOf(state, stored), words: body.words, act: body.act, over: body.over })),
    forecasts: forecastSummary(state, facts.forecasts),
    verdicts,
    acts: actLines(state),
    openings: openingLines(state),
    instruments: instrumentLines(state),
    decidedOtherwise: acceptedOf(entries, 'decided-otherwise').map(({ stored, entry }) => ({ ...lineOf(state, stored), name: caseName(state, entry.body.caseId), reason: entry.body.reason, clause: entry.body.clause })),
    questioned: state.questioned.map(item => ({ seq: item.seq, entry: item.entry, why: item.why, settled: item.settled ? { ...lineOfMark(state, item.settled.mark), words: item.settled.words } : null })),
    questions: state.questions.map(item => ({ ...lineOfMark(state, item.mark), words: item.words, about: aboutOf(state, entries, item.about), answer: item.answer ? { ...lineOfMark(state, item.answer.mark), words: item.answer.words } : null })),
    voices: state.voices.map(voice => ({ seq: voice.mark.seq, words: voiceLine(state, voice, now), open: voice.answer === null })),
    hands: handsLines(state),
    clocks: clockLines(state, entries),
    corrections: correctionLines(state, entries),
    refusals: state.refusals.map(({ seq, reason }) => ({ seq, reason })),
  }
}

/** The entry that a question names, where this record has it. */
function aboutOf(state: OutageState, entries: readonly StoredEntry[], about: string | null): QuestionLine['about'] {
  const stored = about === null ? undefined : entries.find(({ entry }) => entry.id === about)
  return stored ? { seq: stored.seq, did: told(state, stored.entry).did } : null
}

function headingOf(state: OutageState): RecordSummary['heading'] {
  const { site, controller } = state.snapshot
  const ended = state.phase === 'submitted' || state.phase === 'sealed' ? state.submitted : state.calledOff
  const begun = Math.min(state.inHandBegun?.at ?? Infinity, state.darks[0]?.from ?? Infinity)
  return {
    code: state.code, site: site.name, controller: controller.name, work: state.plan.workKind.name, planned: state.planned,
    from: Number.isFinite(begun) ? begun : state.opened?.at ?? 0, to: ended?.mark.at ?? null, timeZone: site.timeZone,
  }
}

function pointCounts(state: OutageState, lines: readonly PointLine[]): RecordSummary['points'] {
  const held = new Set(pointsInHand(state).map(point => point.tag))
  const set = new Set(lines.filter(line => line.inHand).map(line => line.tag))
  const statuses = Object.values(state.points)
  return {
    set: set.size,
    back: [...set].filter(tag => !held.has(tag)).length,
    proven: [...set].filter(tag => state.points[tag]?.status === 'proven').length,
    excused: statuses.filter(point => point.status === 'excused').length,
    inHand: held.size,
    proofsDue: proofsDue(state).length,
  }
}

/** The warmest product reading; the earlier one, then the lower case id, where two are as warm. */
function highestProduct(state: OutageState): RecordSummary['highest'] {
  const kelvin = (reading: { value: number, unit: 'F' | 'C' }) => reading.unit === 'C' ? reading.value : (reading.value - 32) * 5 / 9
  const readings = Object.values(state.cases).flatMap(item => productReadings(item).map(reading => ({ caseId: item.id, value: reading.value, unit: reading.unit, at: reading.at })))
  const first = readings.sort((a, b) => kelvin(b) - kelvin(a) || a.at - b.at || a.caseId.localeCompare(b.caseId))[0]
  return first ? { ...first, name: caseName(state, first.caseId) } : null
}

/**
 * Names of cases that were above their limit, in the order of the equipment: by a product reading, or by
 * a verdict. Where a reading was corrected since, an earlier verdict may have come from the mistake, and
 * only what stands now counts.
 */
function casesAbove(state: OutageState, verdicts: readonly VerdictLine[]): string[] {
  const bad = (verdict: string) => verdict === 'above' || verdict === 'act' || verdict === 'discard'
  return state.snapshot.cases.filter(({ id }) => {
    const item = state.cases[id]
    if (!item) return false
    if (productReadings(item).some(reading => overLimit(state, id, reading) > 1e-6)) return true
    if (item.readings.some(reading => reading.correctedBy !== null)) return item.verdict !== null && bad(item.verdict.verdict)
    return verdicts.some(line => line.caseId === id && bad(line.verdict))
  }).map(item => item.name)
}

function signatureLines(state: OutageState, entries: readonly StoredEntry[]): SignatureLine[] {
  return acceptedOf(entries, 'submitted', 'sealed').map(({ stored, entry }) => ({
    ...lineOf(state, stored),
    what: entry.kind,
    role: state.signers[entry.device]?.role ?? 'technician',
    meaning: entry.kind === 'submitted' ? SUBMIT_STATEMENT : SEAL_STATEMENT,
    drawing: entry.body.drawing,
    words: entry.body.words,
    stands: entry.kind === 'sealed' || (state.submitted?.mark.seq === stored.seq && (state.phase === 'submitted' || state.phase === 'sealed')),
  }))
}

function actLines(state: OutageState): ActLine[] {
  return Object.values(state.cases).flatMap(item => item.acts.map(act => ({
    ...lineOfMark(state, act.mark), caseId: item.id, name: caseName(state, item.id), act: capital(measureWords(state, act)), discarded: act.act === 'discarded',
    product: act.product, quantity: act.quantity, unit: act.unit, place: act.place, takenBy: act.takenBy, left: act.left, words: act.words,
  }))).sort((a, b) => a.seq - b.seq)
}

const capital = (words: string) => `${words.charAt(0).toUpperCase()}${words.slice(1)}`
const ENDED_WORDS = { act: 'by what was signed', reading: 'by a reading at or under the limit', decision: 'decided otherwise', verdict: 'its verdict grew milder', hold: 'it holds long enough again', worse: 'a more pressing act took its place' }

/** Every act that was asked for, in the order of the log. */
function openingLines(state: OutageState): OpeningLine[] {
  return Object.values(state.cases).flatMap(item => item.openings.map((opening): OpeningLine => ({
    seq: opening.seq, at: opening.at, caseId: item.id, name: caseName(state, item.id), cause: CAUSE_WORDS[opening.cause],
    ended: opening.closed && { ...lineOfMark(state, opening.closed.mark), how: ENDED_WORDS[opening.closed.how] },
    ends: endsBy(state, item),
  }))).sort((a, b) => a.seq - b.seq)
}

/** Devices whose clock differed by more than five minutes, with the largest difference. */
function clockLines(state: OutageState, entries: readonly StoredEntry[]): ClockLine[] {
  const byDevice = new Map<string, ClockLine>()
  for (const { seq, entry } of entries) {
    if (Math.abs(entry.skew) <= CLOCK_DIFFERENCE_MS) continue
    const known = byDevice.get(entry.device) ?? { device: entry.device, deviceName: state.signers[entry.device]?.deviceName ?? 'Unknown device', name: nameOf(state, entry.by), ms: 0, seq, entries: 0 }
    known.entries++
    if (Math.abs(entry.skew) > Math.abs(known.ms)) Object.assign(known, { ms: entry.skew, seq })
    byDevice.set(entry.device, known)
  }
  return [...byDevice.values()].sort((a, b) => a.device.localeCompare(b.device))
}
