import type { HandPosition } from '../schemas/point-kinds'
import { BACK_CHECKS, BEFORE_CHECKS } from './checks'
import type { AnyEntry, Entry, StoredEntry } from './entry'
import { happenedAt } from './entry'
import type { EntryKind } from './kinds'
import type { Verdict } from './kinds/server'
import { asNewest } from './newest'
import { caseName, expectedSeen, judgedReadings, nameOf, pointName, roundsTaken, SEEN_WORDS } from './select'
import type { Mark, OutageState } from './state'
import { told } from './words'

/** An act in a line of the record: when it happened (Unix ms), who signed it, where it stands in the log. */
export interface Line { seq: number, at: number, by: string }

/** The accepted entries of some kinds, in the order of the log. */
export function acceptedOf<K extends EntryKind>(entries: readonly StoredEntry[], ...kinds: K[]): { stored: StoredEntry, entry: Extract<AnyEntry, { kind: K }> }[] {
  const wanted: readonly string[] = kinds
  return entries
    .filter(stored => stored.standing === 'accepted' && wanted.includes(stored.entry.kind))
    .map(stored => ({ stored, entry: asNewest(stored.entry) as Extract<AnyEntry, { kind: K }> }))
}

export function lineOf(state: OutageState, stored: StoredEntry): Line {
  return { seq: stored.seq, at: happenedAt(stored.entry), by: nameOf(state, stored.entry.by) }
}

export function lineOfMark(state: OutageState, mark: Mark): Line {
  return { seq: mark.seq, at: mark.at, by: nameOf(state, mark.by) }
}

/** One time that a point was taken in hand, and how it came back. */
export interface PointLine {
  tag: string
  name: string
  hand: HandPosition | null
  /** what was seen, with its value, in words */
  seen: string
  inHand: Line | null
  back: Line | null
  backSeen: Entry<'point-in-auto'>['body']['seen'] | null
  proven: Line | null
  excused: (Line & { reason: string, measure: string }) | null
  exception: ExceptionLine | null
}

/** A point left in hand or unproven by a supervisor's exception. */
export interface ExceptionLine extends Line {
  owner: string
  until: number
  reason: string
  /** who gave it by voice, by name; null where they signed it themselves */
  voice: string | null
  /** that supervisor, or another, said afterwards that it was not so: then it never stood */
  denied: (Line & { reason: string }) | null
}

/**
 * Every point of the plan and every one that was touched beside it: a line for each time that it
 * went in hand, in the order in which that happened; those never touched come last, by tag.
 */
export function pointLines(state: OutageState, entries: readonly StoredEntry[]): PointLine[] {
  const lines: PointLine[] = []
  const open = new Map<string, PointLine>()
  const begin = (tag: string): PointLine => {
    const line: PointLine = { tag, name: pointName(state, tag), hand: null, seen: '', inHand: null, back: null, backSeen: null, proven: null, excused: null, exception: null }
    lines.push(line)
    open.set(tag, line)
    return line
  }
  for (const { stored, entry } of acceptedOf(entries, 'point-in-hand', 'point-excused', 'point-in-auto', 'point-proven', 'left-in-exception', 'voice-decision')) {
    const line = lineOf(state, stored)
    if (entry.kind === 'left-in-exception' || entry.kind === 'voice-decision') {
      for (const { tag, exception } of exceptionsOf(state, entry, line)) (open.get(tag) ?? begin(tag)).exception = exception
      continue
    }
    const { tag } = entry.body
    if (entry.kind === 'point-in-hand') {
      const point = state.points[tag]
      // A try that did not come out as asked is no point in hand; the entry itself stands in the list of all entries.
      if (!point || entry.body.seen !== expectedSeen(point.kind, entry.body.hand)) continue
      const known = open.get(tag)
      const into = known && known.back === null && known.excused === null ? known : begin(tag)
      const { hand, seen, value } = entry.body
      Object.assign(into, { hand, seen: [SEEN_WORDS[seen].toLowerCase(), value ? `${value.number} ${value.unit}` : ''].filter(Boolean).join(', '), inHand: line })
    } else if (entry.kind === 'point-excused') {
      begin(tag).excused = { ...line, reason: entry.body.reason, measure: entry.body.measure }
    } else if (entry.kind === 'point-in-auto') {
      const into = open.get(tag) ?? begin(tag)
      Object.assign(into, { back: line, backSeen: entry.body.seen, proven: entry.body.seen === 'answers' && state.darks.length > 0 ? line : into.proven })
    } else {
      (open.get(tag) ?? begin(tag)).proven = line
    }
  }
  const untouched = state.plan.points.map(planned => planned.tag).filter(tag => !open.has(tag)).sort()
  for (const tag of untouched) begin(tag)
  return lines
}

/** The exceptions that an entry gives, also one that a supervisor gave by voice. */
function exceptionsOf(state: OutageState, entry: Entry<'left-in-exception'> | Entry<'voice-decision'>, line: Line): { tag: string, exception: ExceptionLine }[] {
  const spoken = entry.kind === 'voice-decision' ? entry.body : null
  const body = entry.kind === 'left-in-exception' ? entry.body : entry.body.decision.kind === 'left-in-exception' ? entry.body.decision.body : null
  const answer = spoken ? state.voices.find(voice => voice.entry === entry.id)?.answer ?? null : null
  const denied = answer?.what === 'denied' ? { ...lineOfMark(state, answer.mark), reason: answer.words } : null
  return (body?.points ?? []).map(left => ({ tag: left.tag, exception: { ...line, owner: left.owner, until: Date.parse(left.by) - entry.skew, reason: left.reason, voice: spoken?.supervisorName ?? null, denied } }))
}

export interface CheckLine { id: string, ask: string, outcome: 'done' | 'needless' | 'not signed', words: string, line: Line | null }

/** The checks before control is taken away, and those on the controller; each with what came of it. */
export function checkLines(state: OutageState): { before: CheckLine[], back: CheckLine[] } {
  const lineFor = ({ id, ask }: { id: (typeof BEFORE_CHECKS | typeof BACK_CHECKS)[number]['id'], ask: string }): CheckLine => {
    const signed = state.checks[id]
    return { id, ask, outcome: signed?.outcome ?? 'not signed', words: signed?.words ?? '', line: signed ? lineOfMark(state, signed.mark) : null }
  }
  return { before: BEFORE_CHECKS.map(lineFor), back: BACK_CHECKS.map(lineFor) }
}

export interface RoundLine {
  round: number
  from: number
  to: number
  cases: number
  racks: number
  /** warmest product relative to its limit */
  nearest: { name: string, value: number, unit: 'F' | 'C' } | null
  /** readings of it that were late, and by how much at most, minutes */
  late: number
  latestBy: number
  /** the entry of the reading that was latest; null where none was late */
  latestSeq: number | null
}

/** Every round with what it brought. @param late readings that came later than they were due */
export function roundLines(state: OutageState, late: readonly LateReading[]): RoundLine[] {
  const readings = Object.values(state.cases).flatMap(item => judgedReadings(item).map(reading => ({ ...reading, caseId: item.id })))
  return roundsTaken(state).map(({ round, from, to, cases, racks }) => {
    const own = readings.filter(reading => reading.round === round)
    const nearest = own.filter(reading => reading.method === 'product').map(reading => ({ ...reading, over: overLimit(state, reading.caseId, reading) })).sort((a, b) => b.over - a.over || a.caseId.localeCompare(b.caseId))[0]
    const lateOwn = late.filter(item => item.seq !== null && own.some(reading => reading.seq === item.seq))
    return { round, from, to, cases, racks, nearest: nearest ? { name: caseName(state, nearest.caseId), value: nearest.value, unit: nearest.unit } : null, late: lateOwn.length, latestBy: Math.max(0, ...lateOwn.map(item => item.minutes)), latestSeq: [...lateOwn].sort((a, b) => b.minutes - a.minutes || a.seq! - b.seq!)[0]?.seq ?? null }
  })
}

/** How far a reading lies over the case's limit, K; negative below it. */
export function overLimit(state: OutageState, caseId: string, reading: { value: number, unit: 'F' | 'C' }): number {
  const limit = state.snapshot.cases.find(item => item.id === caseId)?.limit
  const kelvin = (value: number, unit: 'F' | 'C') => unit === 'C' ? value : (value - 32) * 5 / 9
  return limit ? kelvin(reading.value, reading.unit) - kelvin(limit.value, limit.unit) : -Infinity
}

/** A reading that came late; `seq` null where it never came. */
export interface LateReading { caseId: string, seq: number | null, minutes: number }

/** What the fit to the readings before it foretold for the time of a reading without control, and what came. */
export interface ForecastLine {
  caseId: string
  seq: number
  /** Unix ms */
  at: number
  /** readings since control was lost to which the forecast was fitted */
  readings: number
  /** in the site's unit */
  foretold: number
  came: number
  /** came less foretold, K */
  errorK: number
  /** found over the limit before the careful forecast had it there */
  early: boolean
}

export interface VerdictLine extends Line { caseId: string, name: string, verdict: Verdict, deadline: number | null, clause: string, source: string, act: string | null, minutesAbove: number, why: string[] }

export function verdictLines(state: OutageState, entries: readonly StoredEntry[]): VerdictLine[] {
  return acceptedOf(entries, 'verdict-changed').map(({ stored, entry: { body } }) => ({
    ...lineOf(state, stored), caseId: body.caseId, name: caseName(state, body.caseId), verdict: body.verdict,
    deadline: body.deadline === null ? null : Date.parse(body.deadline), clause: body.clause, source: body.source, act: body.act, minutesAbove: body.minutesAbove, why: body.why,
  }))
}

/** An entry that puts another one right, and what that one said. */
export interface CorrectionLine extends Line { reason: string, now: string, of: { seq: number, did: string, seen: string } | null }

export function correctionLines(state: OutageState, entries: readonly StoredEntry[]): CorrectionLine[] {
  const byId = new Map(entries.map(stored => [stored.entry.id, stored]))
  return acceptedOf(entries, 'correction').map(({ stored, entry: { body } }) => {
    const of = byId.get(body.corrects)
    const reading = of?.entry.kind === 'reading-taken' ? of.entry.body : null
    const now = body.reading === 'struck' ? 'does not count' : body.reading ? `${body.reading.value.toFixed(1)}${reading ? ` °${reading.unit}` : ''}` : ''
    return { ...lineOf(state, stored), reason: body.reason, now, of: of ? { seq: of.seq, ...told(state, of.entry) } : null }
  })
}
