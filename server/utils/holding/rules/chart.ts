/**
 * Judging by a chart of temperature by time since control was lost. The chart is looked up at each reading,
 * at the end of each interval with its warmer end, and at now when the last reading is above the limit.
 */
import type { ChartCell, ChartRow, ChartRule } from '../types'
import { MINUTE } from '../log'
import type { LogReading } from '../log'
import { isAtOrOver, isOver } from '../units'
import { allowedWords, instantWords, minutesWords, temperatureWords } from '../words'
import type { Case, Finding, Outcome } from './finding'
import { isWorse } from './finding'

interface LookUp {
  at: number
  value: number
  clock: number
  cell: ChartCell<number>
  /** The last instant at which what an `act` cell asks may be met; past it the product is lost. */
  due: number | null
}

function cellOf(row: ChartRow<number>, value: number): ChartCell<number> {
  const cell = row.cells.find(({ to, included }) => to === null || (included ? !isOver(value, to) : !isAtOrOver(value, to)))
  if (!cell) throw new RangeError('A chart row must end with a cell that has no upper end')
  return cell
}

/** The row for a time since control was lost (ms), and when that row begins (ms). */
function rowAt(rows: ChartRow<number>[], clock: number): { row: ChartRow<number>, begins: number, index: number } {
  const index = rows.findIndex(({ until }) => until === null || clock <= until * MINUTE)
  const row = rows[index]
  if (!row) throw new RangeError('A chart must end with a row that has no end')
  return { row, begins: index === 0 ? 0 : rows[index - 1]!.until! * MINUTE, index }
}

/** For each reading, when the unbroken run of readings over a temperature began that reaches up to it, or its own instant. */
function runStarts(readings: LogReading[], over: number): number[] {
  let start = 0
  return readings.map((_, index) => {
    if (index > 0 && !isOver(readings[index - 1]!.value, over)) start = index
    return readings[start]!.at
  })
}

/** Run starts for every temperature that a chart asks for, worked out once. */
function runsOf(rule: ChartRule<number>, readings: LogReading[]): Map<number, number[]> {
  const asked = rule.rows.flatMap(({ cells }) => cells.flatMap(({ ask }) => ask ? [ask.to] : []))
  return new Map(asked.map(to => [to, runStarts(readings, to)]))
}

/** Looks the chart up; `index` is the reading that the product was last seen at. */
function lookUp(rule: ChartRule<number>, runs: Map<number, number[]>, clockStart: number, index: number, at: number, value: number): LookUp {
  const clock = Math.max(0, at - clockStart)
  const { row, begins } = rowAt(rule.rows, clock)
  const cell = cellOf(row, value)
  const due = cell.verdict === 'act' && cell.ask
    ? Math.max(runs.get(cell.ask.to)![index]!, clockStart + begins) + cell.ask.minutes * MINUTE
    : null
  return { at, value, clock, cell, due }
}

/** Every look-up of a log in order, only of temperatures above the limit. */
function lookUps(rule: ChartRule<number>, of: Case, clockStart: number): LookUp[] {
  const { readings } = of.log
  const runs = runsOf(rule, readings)
  const found: LookUp[] = []
  readings.forEach((reading, index) => {
    const warmer = Math.max(reading.value, readings[index - 1]?.value ?? reading.value)
    for (const value of warmer > reading.value ? [warmer, reading.value] : [reading.value])
      if (isOver(value, of.foodClass.limit)) found.push(lookUp(rule, runs, clockStart, index, reading.at, value))
  })
  if (of.lastAbove) found.push(lookUp(rule, runs, clockStart, readings.length - 1, of.log.now, of.last.value))
  return found
}

/** What the chart asks next of product that stays at its last value. */
function comingVerdicts(rule: ChartRule<number>, here: LookUp, clockStart: number): Finding['next'] {
  const { index } = rowAt(rule.rows, here.clock)
  const rows = rule.rows.slice(index + 1).map((row, after) => ({
    verdict: cellOf(row, here.value).verdict,
    at: clockStart + rule.rows[index + after]!.until! * MINUTE,
    minutes: rule.rows[index + after]!.until!,
  }))
  return here.due === null ? rows : [{ verdict: 'discard', at: here.due, minutes: here.cell.ask!.minutes }, ...rows]
}

function outcomeOf(found: LookUp, rule: ChartRule<number>, of: Case): Outcome {
  const missed = found.due !== null && found.at > found.due
  const seen = `${temperatureWords(found.value, of.unit)} at ${minutesWords(found.clock)} without control`
  const ask = found.cell.ask && `${temperatureWords(found.cell.ask.to, of.unit)} or below within ${allowedWords(found.cell.ask.minutes)}`
  const asked = ask ? `, to be brought to ${ask}` : ''
  return {
    verdict: missed ? 'discard' : found.cell.verdict,
    act: missed ? 'Discard it: it was not cooled in the time that the chart gives.' : ask ? `Bring it to ${ask}. ${found.cell.act}` : found.cell.act,
    reason: missed
      ? `${seen}${asked}, by ${instantWords(found.due!)}; it was not, which means discard`
      : `${seen} reads ${found.cell.verdict}${asked}`,
    authority: rule.authority,
  }
}

/** Judges a log by a chart. Only `discard` stays: an `act` of the chart ends with the reading that meets what was asked. */
export function findByChart(rule: ChartRule<number>, of: Case): Finding {
  const clockStart = of.startedWarm ? Math.min(of.log.darkAt, of.first.at) : of.log.darkAt
  const found = lookUps(rule, of, clockStart)
  const outcomes = found.map(each => outcomeOf(each, rule, of))
  const stays = outcomes.find(({ verdict }) => verdict === 'discard') ?? null
  const here = of.lastAbove ? found.at(-1) : undefined
  if (!here) return { stays, now: null, next: [], remarks: [] }
  const now = outcomes.at(-1)!
  const next = comingVerdicts(rule, here, clockStart).filter(({ verdict }) => isWorse(verdict, now.verdict))
  return { stays, now, next, remarks: [] }
}
