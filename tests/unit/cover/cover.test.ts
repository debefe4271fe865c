import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { ahri540, capacityKw, parseCoverInput, planCover, psigOf, saturation } from '~~/server/utils/cover'
import type { CoverInput } from '~~/shared/schemas/cover'

type Body = Record<string, unknown>

/** A right body with some of it changed. */
function body(changes: Body = {}): Body {
  return {
    refrigerant: 'R-448A', targetSstC: -7, load: { kw: 118 }, lowCutOutPsig: 10,
    compressors: machines([20, 30, 30, 45, 60]), ...changes,
  }
}

function machines(kws: readonly number[]): Body[] {
  return kws.map((kw, index) => ({ tag: `C${index + 1}`, kw, running: true }))
}

function input(changes: Body = {}): CoverInput {
  const parsed = parseCoverInput(body(changes))
  if (!parsed.ok) {
    throw new Error(parsed.reason)
  }
  return parsed.input
}

const plan = (changes: Body = {}) => planCover(input(changes))

/** Ten coefficients of a medium-temperature compressor from the openstudio-standards data. */
const OPENSTUDIO = [
  61412.17466, 1570.851906, -500.1952361, 13.53344913, -3.689538504,
  8.16391243, 0.054485574, 0.006381584, -0.037503058, -0.088096805,
]

describe('checks', () => {
  it('20, 30, 30, 45, 60 kW on 118 kW: 110 picked, 120 over (by hand)', () => {
    const cover = plan()
    expect(cover).toMatchObject({ pick: ['C1', 'C2', 'C5'], kw: 110, none: null, why: [] })
    // 110·(1 + 0.03·(S + 7)) = 118
    expect(cover.sstC).toBeCloseTo(-7 + 8 / 110 / 0.03, 9)
    expect(cover.over).toMatchObject({ tags: ['C2', 'C3', 'C5'], kw: 120 })
    expect(cover.over!.sstC).toBeCloseTo(-7 - 2 / 120 / 0.03, 9)
  })

  it('AHRI 540 coefficients of the openstudio-standards data at S -6.7, D 40: 40 297 W', () => {
    expect(ahri540(OPENSTUDIO, -6.7, 40)).toBeCloseTo(40297, 0)
  })

  it('two of these at D 40 on 70 kW, target -11.5 °C: SST -11.40 °C (computed from the openstudio-standards data)', () => {
    const compressors = ['A', 'B'].map(tag => ({ tag, ahri540: OPENSTUDIO, sctC: 40, running: true }))
    const cover = plan({ targetSstC: -11.5, load: { kw: 70 }, compressors })
    expect(cover.pick).toEqual(['A', 'B'])
    expect(cover.sstC).toBeCloseTo(-11.40, 2)
  })

  it('suction in psig is dew at the settled temperature less the air of the site', () => {
    const { sstC, suctionPsig } = plan({ altitudeM: 1600 })
    const { dewKpa } = saturation('R-448A', { celsius: sstC! }) as { dewKpa: number }
    expect(suctionPsig).toBeCloseTo(psigOf(dewKpa, 1600), 9)
  })
})

describe('capacity and load', () => {
  it('slopes by group, 0.03 and 0.04 per K, or the machine\'s own (our own estimates)', () => {
    const settled = (changes: Body) => plan({ compressors: machines([100]), ...changes }).sstC
    expect(settled({})).toBeCloseTo(-7 + 0.18 / 0.03, 9)
    expect(settled({ group: 'low' })).toBeCloseTo(-7 + 0.18 / 0.04, 9)
    expect(settled({ compressors: [{ tag: 'C1', kw: 100, slopePerK: 0.06, running: true }] })).toBeCloseTo(-7 + 0.18 / 0.06, 9)
  })

  it('a load through the cases falls as suction rises (kW/K × air less suction)', () => {
    const cover = plan({ load: { uaKwPerK: 118 / 9, airC: 2 } })
    expect(cover.kw).toBe(110)
    // 110·(1 + 0.03·x) = 118/9·(9 − x)
    expect(cover.sstC).toBeCloseTo(-7 + 8 / (3.3 + 118 / 9), 9)
  })

  it('a machine on a drive counts by its speed, by coefficients too', () => {
    const target = { group: 'medium', targetSstC: -7 } as const
    const [linear, curved] = input({
      compressors: [
        { tag: 'A', kw: 40, driveHz: 45 },
        { tag: 'B', ahri540: OPENSTUDIO, sctC: 40, driveHz: 40, baseHz: 50 },
      ],
    }).compressors
    expect(capacityKw(linear!, -7, target)).toBeCloseTo(30, 9)
    expect(capacityKw(curved!, -6.7, target)).toBeCloseTo(0.8 * ahri540(OPENSTUDIO, -6.7, 40) / 1000, 9)
  })

  it('capacity never falls below 0, however deep the suction', () => {
    const [machine] = input().compressors
    expect(capacityKw(machine!, -90, { group: 'medium', targetSstC: -7 })).toBe(0)
  })

  it('a set equal to the load within a billionth is within it and settles at the target', () => {
    const cover = plan({ load: { kw: 110 - 5e-10 } })
    expect(cover.kw).toBe(110)
    expect(cover.sstC).toBe(-7)
    expect(plan({ load: { kw: 110 - 2e-9 } }).kw).toBeLessThan(110)
  })
})

describe('ties of equal capacity', () => {
  const tied = (compressors: Body[], kw = 60) => plan({ load: { kw }, compressors }).pick

  it('fewest machines first', () => {
    expect(tied([{ tag: 'A', kw: 30, running: true }, { tag: 'B', kw: 30, running: true }, { tag: 'C', kw: 60 }])).toEqual(['C'])
  })

  it('then fewest to start', () => {
    expect(tied([{ tag: 'A', kw: 60 }, { tag: 'B', kw: 60, running: true, runHours: 900 }])).toEqual(['B'])
  })

  it('then least run hours, none counting as 0', () => {
    expect(tied([{ tag: 'A', kw: 60, runHours: 10 }, { tag: 'B', kw: 60, runHours: 9 }])).toEqual(['B'])
    expect(tied([{ tag: 'A', kw: 60, runHours: 10 }, { tag: 'B', kw: 60 }])).toEqual(['B'])
  })

  it('then by tag, whatever the order in which they are sent', () => {
    expect(tied([{ tag: 'C', kw: 30 }, { tag: 'B', kw: 30 }, { tag: 'A', kw: 30 }])).toEqual(['A', 'B'])
    expect(tied([{ tag: 'D', kw: 30 }, { tag: 'B', kw: 30 }, { tag: 'C', kw: 30 }], 30)).toEqual(['B'])
  })
})

describe('machines left out', () => {
  it('one that stopped and may not start yet is left out of the pick and of what lies over', () => {
    const compressors = [...machines([20, 30]), { tag: 'C9', kw: 60, running: false, restartAllowedInMin: 4 }]
    const cover = plan({ load: { kw: 100 }, compressors })
    expect(cover).toMatchObject({
      pick: ['C1', 'C2'], over: null,
      why: ['C9 is left out: it stopped and may not start for another 4 min.', expect.stringContaining('above the target')],
    })
  })

  it('a running one is not, nor one that may start now', () => {
    const compressors = [
      { tag: 'A', kw: 60, running: true, restartAllowedInMin: 4 }, { tag: 'B', kw: 50, restartAllowedInMin: 0 },
    ]
    expect(plan({ compressors }).pick).toEqual(['A', 'B'])
  })

  it('none left: nothing is picked and none says why', () => {
    const cover = plan({ compressors: [{ tag: 'A', kw: 60, restartAllowedInMin: 2.5 }] })
    expect(cover).toMatchObject({ pick: [], kw: 0, sstC: null, suctionPsig: null, over: null, none: 'No compressor can be held on now.' })
    expect(cover.why).toEqual(['A is left out: it stopped and may not start for another 2.5 min.'])
  })

  it('one whose coefficients give nothing at the target is left out', () => {
    const compressors = [...machines([60]), { tag: 'X', ahri540: [-1, 0, 0, 0, 0, 0, 0, 0, 0, 0], sctC: 40, running: true }]
    expect(plan({ compressors }).why[0]).toBe('X is left out: its coefficients give no capacity at the target suction.')
  })
})

describe('nothing to pick', () => {
  it('every machine above the load', () => {
    expect(plan({ load: { kw: 19 } })).toMatchObject({
      pick: [], kw: 0, sstC: null, suctionPsig: null,
      none: 'Even the smallest machine is above the load of 19.0 kW.', over: { tags: ['C1'], kw: 20 },
    })
  })

  it('no load', () => {
    expect(plan({ load: { kw: 0 } }).none).toBe('There is no load at the target suction.')
    expect(plan({ load: { uaKwPerK: 3, airC: -8 } }).none).toBe('There is no load at the target suction.')
  })
})

describe('low suction (cut-out + 3 psi, never a vacuum: common practice, no source)', () => {
  const targetPsig = (changes: Body = {}) => {
    const { refrigerant, targetSstC, altitudeM } = input(changes)
    return psigOf((saturation(refrigerant, { celsius: targetSstC }) as { dewKpa: number }).dewKpa, altitudeM)
  }

  it('a target above the floor refuses nothing', () => {
    expect(plan({ lowCutOutPsig: targetPsig() - 3 - 1e-6 }).kw).toBe(110)
  })

  it('a target below it: sets that settle below are passed over for the next smaller', () => {
    const cover = plan({ lowCutOutPsig: targetPsig() + 3 })
    expect(cover.kw).toBeLessThan(110)
    expect(cover.suctionPsig).toBeGreaterThanOrEqual(targetPsig() + 6)
    expect(cover.why[0]).toMatch(/^C1 \+ C2 \+ C5 is passed over: it would settle below \d+\.\d psig\. So are \d+ smaller sets\.$/)
    expect(cover.over!.kw).toBe(120)
  })

  it('a target in a vacuum is lifted to 0 psig', () => {
    const changes = { targetSstC: -48, lowCutOutPsig: -10 }
    expect(targetPsig(changes)).toBeLessThan(0)
    const { suctionPsig, kw } = plan(changes)
    expect(suctionPsig).toBeGreaterThanOrEqual(0)
    expect(kw).toBeLessThan(110)
  })

  it('a single set that settles too low: nothing is picked', () => {
    const cover = plan({ lowCutOutPsig: targetPsig() + 3, load: { kw: 20 }, compressors: machines([20]) })
    expect(cover.none).toBe(`Every set within the load would settle below ${(targetPsig() + 6).toFixed(1)} psig.`)
    expect(cover.why[0]).toMatch(/^C1 is passed over: it would settle below \d+\.\d psig\.$/)
  })

  it('a cut-out beyond the refrigerant refuses all, one below its curve none', () => {
    expect(plan({ lowCutOutPsig: 5000 }).none).toContain('Every set within the load')
    expect(plan({ refrigerant: 'R-744', targetSstC: -30, lowCutOutPsig: -100 }).kw).toBe(110)
  })
})

describe('what else is said', () => {
  it('a suction more than 10 psi above the target', () => {
    expect(plan({ load: { kw: 58 }, compressors: machines([45]) }).why)
      .toEqual([expect.stringMatching(/^Suction settles \d+\.\d psi above the target: more than the 10 psi/)])
  })

  it('a capacity that meets the load nowhere has no suction', () => {
    const cover = plan({ load: { kw: 500 }, compressors: machines([20]) })
    expect(cover).toMatchObject({ pick: ['C1'], kw: 20, sstC: null, suctionPsig: null, over: null, none: null })
    expect(cover.why).toEqual(['Capacity stays below the load at any suction of this refrigerant: the cases will warm.'])
  })

  it('R-744 comes with its standstill pressures', () => {
    expect(plan({ refrigerant: 'R-744' }).why.at(-1)).toContain('57.3 bar absolute at 20 °C, 64.3 at 25 °C, 72.1 at 30 °C')
  })
})

describe('against brute force', () => {
  const machine = fc.record({
    kw: fc.constantFrom(10, 15, 20, 22.5, 30, 0.1, 0.2, 0.3),
    running: fc.boolean(),
    runHours: fc.constantFrom(0, 100, 250),
    slopePerK: fc.constantFrom(0.02, 0.03, 0.05),
  })
  const rack = fc.array(machine, { minLength: 1, maxLength: 7 })
    .map(list => list.map((each, index) => ({ tag: `C${index + 1}`, ...each })))

  it('picks and names over what trying every set in plain loops gives', () => {
    fc.assert(fc.property(rack, fc.double({ min: 0.05, max: 120, noNaN: true }), fc.constantFrom(0, 30, 60), (compressors, kw, lowCutOutPsig) => {
      const cover = plan({ compressors, load: { kw }, lowCutOutPsig })
      const sets = allSets(compressors).map(set => ({ ...describeSet(set), settlesLow: settlesLow(set, kw, lowCutOutPsig) }))
      const better = (a: SetFigures, b: SetFigures) => a.count - b.count || a.toStart - b.toStart || a.hours - b.hours || (a.tags < b.tags ? -1 : 1)
      const within = sets.filter(set => set.kw <= kw + 1e-9 && !set.settlesLow)
      const most = Math.max(...within.map(set => set.kw))
      const best = within.filter(set => set.kw >= most - 1e-9).sort(better)[0]
      expect(cover.pick.join('+')).toBe(best?.tags ?? '')
      const above = sets.filter(set => set.kw > kw + 1e-9)
      const least = Math.min(...above.map(set => set.kw))
      const over = above.filter(set => set.kw <= least + 1e-9).sort(better)[0]
      expect(cover.over?.tags.join('+') ?? '').toBe(over?.tags ?? '')
      if (cover.sstC !== null) {
        const picked = compressors.filter(each => cover.pick.includes(each.tag))
        const capacity = picked.reduce((sum, each) => sum + each.kw * (1 + each.slopePerK * (cover.sstC! + 7)), 0)
        expect(capacity).toBeCloseTo(kw, 6)
        expect(cover.sstC).toBeGreaterThanOrEqual(-7)
        expect(cover.suctionPsig).toBeGreaterThanOrEqual(Math.max(0, lowCutOutPsig + 3) - 1e-9)
      }
    }), { numRuns: 300 })
  })

  it('sixteen machines with every set refused come to an answer within ten seconds', () => {
    const compressors = Array.from({ length: 16 }, (_, index) => ({ tag: `C${index}`, kw: 10 + index / 7, running: true }))
    expect(plan({ compressors, load: { kw: 1000 }, lowCutOutPsig: 5000 }).pick).toEqual([])
  }, 10_000)

  type Machine = { tag: string, kw: number, running: boolean, runHours: number, slopePerK: number }
  interface SetFigures { tags: string, kw: number, count: number, toStart: number, hours: number }

  function allSets(list: Machine[]): Machine[][] {
    return list.reduce<Machine[][]>((sets, each) => [...sets, ...sets.map(set => [...set, each])], [[]]).slice(1)
  }

  function describeSet(set: Machine[]): SetFigures {
    return {
      tags: set.map(each => each.tag).join('+'),
      kw: set.reduce((sum, each) => sum + each.kw, 0),
      count: set.length,
      toStart: set.filter(each => !each.running).length,
      hours: set.reduce((sum, each) => sum + each.runHours, 0),
    }
  }

  /** Settled suction of linear machines on a constant load, solved by hand. */
  function settlesLow(set: Machine[], kw: number, lowCutOutPsig: number): boolean {
    const capacity = set.reduce((sum, each) => sum + each.kw, 0)
    const slope = set.reduce((sum, each) => sum + each.kw * each.slopePerK, 0)
    const answer = saturation('R-448A', { celsius: -7 + (kw - capacity) / slope })
    return !('reason' in answer) && psigOf(answer.dewKpa, 0) < Math.max(0, lowCutOutPsig + 3)
  }
})

describe('bodies refused', () => {
  const with1 = (changes: Body) => body({ compressors: [{ tag: 'A', kw: 20, ...changes }] })

  it.each([
    ['no object', [], 'body', 'body must be an object'],
    ['an unknown refrigerant', body({ refrigerant: 'R-12' }), 'refrigerant', 'refrigerant must be one of R-134a, R-22, R-744, R-290, R-404A, R-507A, R-448A, R-449A, R-407A'],
    ['a target beyond the refrigerant', body({ targetSstC: -55 }), 'targetSstC', 'R-448A is known only from -50 to 60 °C'],
    ['no target', body({ targetSstC: undefined }), 'targetSstC', 'targetSstC is needed'],
    ['an unknown group', body({ group: 'high' }), 'group', 'group must be one of medium, low'],
    ['no machines', body({ compressors: [] }), 'compressors', 'compressors must hold at least one machine'],
    ['seventeen machines', body({ compressors: machines(Array(17).fill(10)) }), 'compressors', 'compressors must hold at most 16 machines'],
    ['a tag twice', body({ compressors: [{ tag: 'A', kw: 1 }, { tag: 'A', kw: 2 }] }), 'compressors[1].tag', 'compressors[1].tag A stands here twice'],
    ['both loads', body({ load: { kw: 10, uaKwPerK: 1, airC: 2 } }), 'load', 'load must be either kw, or uaKwPerK with airC'],
    ['neither load', body({ load: {} }), 'load', 'load must be either kw, or uaKwPerK with airC'],
    ['half a load', body({ load: { uaKwPerK: 1 } }), 'load', 'load must be either kw, or uaKwPerK with airC'],
    ['no load at all', body({ load: undefined }), 'load', 'load is needed'],
    ['a negative load', body({ load: { kw: -1 } }), 'load.kw', 'load.kw must be at least 0'],
    ['no cut-out', body({ lowCutOutPsig: undefined }), 'lowCutOutPsig', 'lowCutOutPsig is needed'],
    ['an altitude off the earth', body({ altitudeM: 20000 }), 'altitudeM', 'altitudeM must be at most 9000 m'],
    ['no capacity', with1({ kw: undefined }), 'compressors[0].kw', 'compressors[0].kw is needed without ahri540'],
    ['a capacity of 0', with1({ kw: 0 }), 'compressors[0].kw', 'compressors[0].kw must be above 0'],
    ['an empty tag', with1({ tag: ' ' }), 'compressors[0].tag', 'compressors[0].tag must not be empty'],
    ['nine coefficients', with1({ ahri540: Array(9).fill(1), sctC: 40 }), 'compressors[0].ahri540', 'compressors[0].ahri540 must hold ten coefficients'],
    ['coefficients without condensing', with1({ ahri540: OPENSTUDIO }), 'compressors[0].sctC', 'compressors[0].sctC is needed with ahri540'],
    ['a drive at 0 Hz', with1({ driveHz: 0 }), 'compressors[0].driveHz', 'compressors[0].driveHz must be above 0'],
    ['negative run hours', with1({ runHours: -1 }), 'compressors[0].runHours', 'compressors[0].runHours must be at least 0'],
    ['running in words', with1({ running: 'yes' }), 'compressors[0].running', 'compressors[0].running must be true or false'],
    ['a machine that is none', body({ compressors: [null] }), 'compressors[0]', 'compressors[0] must be an object'],
  ])('%s', (_, value, field, reason) => {
    expect(parseCoverInput(value)).toEqual({ ok: false, field, reason })
  })

  it('kw is ignored beside coefficients, whatever it is; absent fields have their defaults', () => {
    const parsed = parseCoverInput(with1({ kw: 'many', ahri540: OPENSTUDIO, sctC: 40 }))
    expect(parsed.ok && parsed.input).toMatchObject({ altitudeM: 0, group: 'medium', compressors: [{ baseHz: 60, ahri540: OPENSTUDIO }] })
    expect(parsed.ok && parsed.input.compressors[0]!.kw).toBeUndefined()
  })
})
