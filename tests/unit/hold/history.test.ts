import { describe, expect, it } from 'vitest'
import { historyOf } from '~~/server/utils/hold/history'
import { forecastCase, forecastCases } from '~~/server/utils/hold/for-outage'
import { chilledAt } from '~~/server/utils/hold/chilled'
import { technician } from '../../support/record'
import { DAIRY, FISH, inHand, pressure, reading, storyTo } from '../record/store'
import { inUnit } from '~~/shared/record/select'

const dairy = (writer: ReturnType<typeof storyTo>) => writer.state.snapshot.cases.find(item => item.id === DAIRY)!
const warmed = (minutes: number, tauHours = 4) => Math.round(10 * inUnit(chilledAt(2.78, 24, tauHours, minutes), 'F')) / 10

/** Control is lost by a fact, with nothing held on by hand; both cases are read at these minutes. */
function lostWith(minutes: readonly number[], tauHours = 4) {
  const writer = storyTo('dark')
  for (const point of Object.values(writer.state.points)) point.status = 'auto'
  let last = 0
  for (const minute of minutes) {
    writer.pass(minute - last)
    last = minute
    for (const id of [DAIRY, FISH]) writer.sign(technician, 'reading-taken', reading(id, warmed(minute, tauHours), { round: minute }))
  }
  return writer
}

describe('forecasts of a real outage', () => {
  it('the readings carry the hold, the due time and the curve with them', () => {
    const writer = lostWith([8, 16, 24], 9)
    const forecast = forecastCase(writer.state, dairy(writer), writer.now)
    expect(forecast).toMatchObject({ toward: 'limit', readings: 3, held: null })
    expect(forecast.holdMinutes!).toBeLessThan(forecast.likelyMinutes!)
    expect(forecast.holdMinutes!).toBeGreaterThan(0.3 * forecast.likelyMinutes!)
    expect(forecast.dueAt).toBeGreaterThanOrEqual(writer.now + 5 * 60_000)
    expect(forecast.dueAt).toBeLessThanOrEqual(writer.now + 10 * 60_000)
    expect(forecast.curve[0]!.at).toBe(writer.now)
    expect(forecast.curve.at(-1)!.c).toBeCloseTo(5, 1)
  })

  it('round 0 replaces the usual temperature that was assumed', () => {
    const writer = storyTo('dark')
    for (const point of Object.values(writer.state.points)) point.status = 'auto'
    const known = { ...dairy(writer), usualC: -4 }
    const warmStart = forecastCase(writer.state, known, writer.now).likelyMinutes!
    for (const item of Object.values(writer.state.cases)) item.readings = []
    expect(warmStart).toBeLessThan(0.5 * forecastCase(writer.state, known, writer.now).likelyMinutes!)
  })

  it('night covers begin a new course: what was read before them no longer sets its speed', () => {
    const writer = lostWith([8, 16, 24])
    const before = forecastCase(writer.state, dairy(writer), writer.now).likelyMinutes!
    writer.pass(1).sign(technician, 'act-signed', { caseId: DAIRY, act: 'night-covers', product: '', quantity: null, place: '', words: '', photos: [] })
    expect(forecastCase(writer.state, dairy(writer), writer.now)).toMatchObject({ readings: 0 })
    expect(forecastCase(writer.state, dairy(writer), writer.now).likelyMinutes!).toBeGreaterThan(before)
  })

  it('a case held on by hand is forecast to its low mark, until it warms all the same', () => {
    const writer = storyTo('dark')
    expect(forecastCase(writer.state, dairy(writer), writer.now)).toMatchObject({ toward: 'low-mark', holdMinutes: null }) // at 48 psig no colder than the mark
    writer.sign(technician, 'pressure-read', pressure(38))
    const held = forecastCase(writer.state, dairy(writer), writer.now)
    expect(held.toward).toBe('low-mark')
    expect(held.held!.supplyC).toBeLessThan(0)
    expect(held.held!.minutesToLowMark).toBeGreaterThan(30)
    expect(held.curve.at(-1)!.c).toBeCloseTo(-1, 1)
    expect(held.dueAt).toBeLessThanOrEqual(writer.now + 10 * 60_000)
    for (const value of [39, 39.8]) writer.pass(8).sign(technician, 'reading-taken', reading(DAIRY, value, { round: 1 }))
    expect(forecastCase(writer.state, dairy(writer), writer.now)).toMatchObject({ toward: 'limit' })
    expect(forecastCases(writer.state, writer.now)[0]!.caseId).toBe(DAIRY)
  })

  it('a machine that stopped holds nothing on', () => {
    const writer = storyTo('dark')
    writer.sign(technician, 'point-in-hand', inHand('C-1', { hand: 'off', seen: 'not-running', reason: 'low suction' }))
    expect(forecastCase(writer.state, dairy(writer), writer.now).toward).toBe('limit')
  })
})

describe('forecast against what came', () => {
  it('foretells each reading from those before it alone', () => {
    const minutes = [8, 16, 24, 32]
    const whole = historyOf(lostWith(minutes).state, Date.now()).forecasts.filter(line => line.caseId === DAIRY)
    const part = historyOf(lostWith(minutes.slice(0, 3)).state, Date.now()).forecasts.filter(line => line.caseId === DAIRY)
    expect(whole.map(line => line.readings)).toEqual([0, 1, 2, 3])
    expect(whole.slice(0, 3).map(line => line.foretold)).toEqual(part.map(line => line.foretold))
    expect(Math.abs(whole[3]!.errorK)).toBeLessThan(0.3)
    expect(whole[3]!.came).toBe(warmed(32))
    expect(whole[3]!.errorK).toBeCloseTo((whole[3]!.came - whole[3]!.foretold) / 1.8, 9)
  })

  it('names a case that met its limit before the careful forecast had it there', () => {
    const writer = lostWith([8, 16])
    writer.pass(2).sign(technician, 'reading-taken', reading(DAIRY, 43, { round: 3 }))
    const lines = historyOf(writer.state, writer.now).forecasts
    expect(lines.filter(line => line.early).map(line => line.caseId)).toEqual([DAIRY])
  })

  it('counts as late what came more than two minutes after it was due', () => {
    const writer = lostWith([6, 23])
    const { late } = historyOf(writer.state, writer.now)
    expect(late.filter(item => item.caseId === DAIRY)).toHaveLength(1)
    expect(late[0]!.minutes).toBeGreaterThan(4)
  })

  it('goes through 180 rounds of 11 cases in little time', () => {
    const writer = lostWith([8])
    const [known, item] = [dairy(writer), writer.state.cases[DAIRY]!]
    const from = writer.state.darks[0]!.from
    writer.state.snapshot.cases = Array.from({ length: 11 }, (_, index) => ({ ...known, id: `case-${index}` }))
    writer.state.cases = Object.fromEntries(writer.state.snapshot.cases.map(({ id }, index) => [id, { ...item, id, readings: Array.from({ length: 180 }, (_, round) => ({ ...item.readings[0]!, seq: round * 11 + index, round, at: from + (round + 1) * 300_000, value: warmed((round + 1) * 2, 12) })) }]))
    const began = performance.now()
    expect(historyOf(writer.state, from + 181 * 300_000).forecasts).toHaveLength(1980)
    expect(performance.now() - began).toBeLessThan(3000)
  })
})
