/** The course of a verdict over time. Worked by hand from the rules named beside each; no other published source. */
import { describe, expect, it } from 'vitest'
import { assess, rulebooks, verdictCourse } from '../../../server/utils/holding'
import { at, log } from './log'

const MINUTE = 60_000
const START = Date.parse(at(0))
/** Verdicts with the minutes from the loss of control between which each held. */
const course = (input: ReturnType<typeof log>) => verdictCourse(input).map(({ verdict, from, to }) => [verdict, (from - START) / MINUTE, (to - START) / MINUTE])

describe('the course of a verdict', () => {
  it('changes at a reading over the limit and when the clock is up (outage practice of Iowa DIAL: more than 4 hours)', () => {
    // The whole interval from minute 10 counts, so the clock is up just after minute 250.
    const bands = course(log('us-food-code-2022/tcs', [[0, 40], [10, 40], [20, 44]], { now: 300 }))
    expect(bands.map(([verdict]) => verdict)).toEqual(['within', 'above', 'discard'])
    expect(bands[0]!.slice(1)).toEqual([0, 20])
    expect(bands[1]![2]).toBeCloseTo(250, 3)
    expect(bands[2]![2]).toBe(300)
  })

  it('passes through every degree (Standard 3.2.2: 2 hours, then 4)', () => {
    const bands = course(log('au-3-2-2/tcs', [[0, 6]], { now: 300 }))
    expect(bands).toEqual([['above', 0, 120], ['act', 120, 240], ['discard', 240, 300]])
  })

  it('says unknown before the first reading and when one is overdue', () => {
    const bands = course(log('us-food-code-2022/tcs', [[5, 40], [40, 39]], { now: 45 }))
    expect(bands.map(([verdict]) => verdict)).toEqual(['unknown', 'within', 'unknown', 'within'])
    expect(bands[1]![2]).toBeCloseTo(15, 3)
  })

  it('begins with a reading taken before control was lost', () => {
    expect(course(log('us-food-code-2022/tcs', [[-5, 40], [3, 40]], { now: 6 }))).toEqual([['within', -5, 6]])
  })

  it('ends in what the engine says now, also where that is news', () => {
    const input = log('us-food-code-2022/tcs', [[0, 40], [10, 44]], { now: 10 })
    expect(verdictCourse(input).at(-1)).toEqual({ verdict: assess(input).verdict, from: Date.parse(at(10)), to: Date.parse(at(10)) })
  })

  it('is a single moment where control was lost just now and nothing is read', () => {
    expect(course(log('us-food-code-2022/tcs', [], { now: 0 }))).toEqual([['unknown', 0, 0]])
  })

  it('counts from the loss of control where a rulebook does, in every row', () => {
    for (const { id, unit, classes } of rulebooks) {
      for (const foodClass of classes) {
        const input = log(`${id}/${foodClass.id}`, [[30, unit === 'F' ? 43 : 6.5]], { now: 270 })
        expect(verdictCourse(input).at(-1)!.verdict, `${id}/${foodClass.id}`).toBe(assess(input).verdict)
        expect(verdictCourse(input).at(-1)!.to).toBe(Date.parse(at(270)))
      }
    }
  })
})
