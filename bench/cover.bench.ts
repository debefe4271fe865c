// What choosing compressors by hand among sixteen costs beside plain loops over all sets; both must say the same.
import { planCover } from '~~/server/utils/cover'
import { parseCoverInput } from '~~/server/utils/cover/parse'
import { microseconds } from './measure'
import { seeded } from './random'

interface Machine { tag: string, kw: number, running: boolean, runHours: number }
interface PlainSet { tags: string[], kw: number, toStart: number, hours: number }

const SLOPE_PER_K = 0.03
const TARGET_C = -7

function rackOf(seed: number): Machine[] {
  const random = seeded(seed)
  return Array.from({ length: 16 }, (_, index) => ({
    tag: `C-${String(index + 1).padStart(2, '0')}`, kw: Math.round(80 + 400 * random()) / 10, running: random() < 0.5, runHours: Math.floor(20_000 * random()),
  }))
}

function allSets(machines: Machine[]): PlainSet[] {
  const sets: PlainSet[] = []
  for (let mask = 1; mask < 2 ** machines.length; mask += 1) {
    const set = machines.filter((_, bit) => (mask >> bit & 1) === 1)
    sets.push({
      tags: set.map(({ tag }) => tag),
      kw: set.reduce((sum, { kw }) => sum + kw, 0),
      toStart: set.filter(({ running }) => !running).length,
      hours: set.reduce((sum, { runHours }) => sum + runHours, 0),
    })
  }
  return sets
}

/** Fewest machines, fewest to start, least run hours, then by tag. */
function better(one: PlainSet, other: PlainSet): number {
  return one.tags.length - other.tags.length || one.toStart - other.toStart || one.hours - other.hours || (one.tags.join() < other.tags.join() ? -1 : 1)
}

/** The best set within the load, the smallest above it, and where a constant load meets machines that are linear about the target. */
function bruteForce(machines: Machine[], loadKw: number) {
  const sets = allSets(machines)
  const best = (found: PlainSet[], kw: number) => found.filter(set => Math.abs(set.kw - kw) <= 1e-9).sort(better)[0]!
  const within = sets.filter(({ kw }) => kw <= loadKw + 1e-9)
  const above = sets.filter(({ kw }) => kw > loadKw + 1e-9)
  const pick = best(within, within.reduce((most, { kw }) => Math.max(most, kw), 0))
  const over = best(above, above.reduce((least, { kw }) => Math.min(least, kw), Infinity))
  return { pick: pick.tags, kw: pick.kw, sstC: TARGET_C + (loadKw - pick.kw) / (SLOPE_PER_K * pick.kw), over: over.tags }
}

function inputOf(machines: Machine[], loadKw: number) {
  const parsed = parseCoverInput({ refrigerant: 'R-448A', targetSstC: TARGET_C, load: { kw: loadKw }, lowCutOutPsig: 10, compressors: machines })
  if (!parsed.ok) throw new Error(`${parsed.field} ${parsed.reason}`)
  return parsed.input
}

const SEEDS = [1, 2, 3, 4, 5]
for (const seed of SEEDS) {
  const machines = rackOf(seed)
  for (const share of [0.2, 0.5, 0.8]) {
    const load = share * machines.reduce((sum, { kw }) => sum + kw, 0)
    const cover = planCover(inputOf(machines, load))
    const plain = bruteForce(machines, load)
    const same = cover.pick.join() === plain.pick.join() && cover.over?.tags.join() === plain.over.join()
      && Math.abs(cover.kw - plain.kw) < 1e-9 && Math.abs(cover.sstC! - plain.sstC) < 1e-6
    if (!same) throw new Error(`Rack ${seed}, load ${load}: ${JSON.stringify(cover)} is not ${JSON.stringify(plain)}`)
  }
}

const machines = rackOf(1)
const load = 0.5 * machines.reduce((sum, { kw }) => sum + kw, 0)
const input = inputOf(machines, load)
const chosen = microseconds(() => planCover(input), 1, 11) / 1_000
const plain = microseconds(() => bruteForce(machines, load), 1, 5) / 1_000

process.stdout.write(`${JSON.stringify({
  name: 'cover among sixteen compressors',
  ratio: Number((chosen / plain).toFixed(3)),
  baseline: 'plain loops over all 65,535 sets, whose answer is the same',
  milliseconds: Number(chosen.toFixed(1)),
  baselineMilliseconds: Number(plain.toFixed(1)),
  racksCompared: SEEDS.length * 3,
})}\n`)
