/** Duration distributions beside jStat: its own beta and normal distribution functions. */
import jStat from 'jstat'
import { quantileSorted } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { normalWithin, planDuration } from '../../../server/utils/duration'
import { durationDrawer, uniformStream } from '../../../server/utils/duration/draw'
import { normalBelow, Z_19_IN_20 } from '../../../server/utils/duration/normal'

const DRAWS = 40_000
/** Kolmogorov and Smirnov: a sample of this size lies farther off its distribution only once in 1,000 times. */
const FARTHEST = 1.95 / Math.sqrt(DRAWS)

describe('the normal figures beside jStat', () => {
  it('agree over the whole range', () => {
    for (let z = -5; z <= 5; z += 0.25) expect(normalBelow(z)).toBeCloseTo(jStat.normal.cdf(z, 0, 1), 9)
    expect(Z_19_IN_20).toBeCloseTo(jStat.normal.inv(0.95, 0, 1), 9)
    expect(normalWithin(28, 24, Math.sqrt(5))).toBeCloseTo(jStat.normal.cdf(28, 24, Math.sqrt(5)), 9)
  })
})

describe('the beta durations beside jStat', () => {
  it.each([[5, 8, 17], [3, 5, 7], [20, 21, 40], [10, 10, 30], [10, 30, 30], [1, 1.2, 25]])('%d, %d, %d minutes are drawn from the distribution they name', (shortest, likely, longest) => {
    const [rise, fall] = [likely - shortest, longest - likely].map(part => 1 + 4 * part / (longest - shortest)) as [number, number]
    const uniform = uniformStream(7)
    const draw = durationDrawer(shortest, likely, longest)
    const drawn = Array.from({ length: DRAWS }, () => draw(uniform)).sort((a, b) => a - b)
    const farthest = Math.max(...drawn.filter((_, index) => index % 40 === 0).map((minutes, index) =>
      Math.abs(jStat.beta.cdf((minutes - shortest) / (longest - shortest), rise, fall) - index * 40 / DRAWS)))
    expect(farthest).toBeLessThan(FARTHEST)
  })

  it('give one step alone the 19-in-20 time of its own distribution', () => {
    const { simulated } = planDuration({ steps: [{ id: 'load', shortest: 20, likely: 22, longest: 40, after: [] }], within: 26 })
    const [rise, fall] = [1 + 4 * 2 / 20, 1 + 4 * 18 / 20] as const
    expect(jStat.beta.cdf((simulated.p95 - 20) / 20, rise, fall)).toBeCloseTo(0.95, 2)
    expect(simulated.pWithin).toBeCloseTo(jStat.beta.cdf(6 / 20, rise, fall), 2)
  })

  it('add along a chain as drawing each step by itself does', () => {
    const steps = [[5, 8, 17], [3, 5, 7], [4, 6, 8], [3, 4, 5]] as const
    const uniform = uniformStream(11)
    const drawers = steps.map(([shortest, likely, longest]) => durationDrawer(shortest, likely, longest))
    const sums = Array.from({ length: DRAWS }, () => drawers.reduce((sum, draw) => sum + draw(uniform), 0)).sort((a, b) => a - b)
    const { simulated } = planDuration({ steps: steps.map(([shortest, likely, longest], index) => ({ id: `${index}`, shortest, likely, longest, after: index === 0 ? [] : [`${index - 1}`] })) })
    expect(Math.abs(simulated.p95 - quantileSorted(sums, 0.95))).toBeLessThan(0.1)
  })
})
