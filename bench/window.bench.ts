// What finding a start in a week of 40 circuits' defrosts costs beside plain loops over every defrost; both must say the same.
import { planWindow } from '~~/server/utils/window'
import { planWindowSchema } from '~~/shared/schemas/plan-window'
import type { PlanWindowInput } from '~~/shared/schemas/plan-window'
import { microseconds } from './measure'
import { seeded } from './random'

const MINUTE = 60_000
const DAY = 86_400_000
const CLEAR = 30 * MINUTE
const MOST_STARTS = 5

interface Stretch { circuit: string, start: number, end: number }

/** A week without a change of the clocks, which plain loops would get wrong. */
function inputOf(seed: number): PlanWindowInput {
  const random = seeded(seed)
  const time = () => `${String(Math.floor(24 * random())).padStart(2, '0')}:${String(5 * Math.floor(12 * random())).padStart(2, '0')}`
  return planWindowSchema.parse({
    timeZone: 'Europe/London', from: '2026-06-01T06:10:00Z', days: 7, leadMin: 40, darkMin: 35,
    avoid: [{ days: [1, 2, 3, 4, 5], start: '16:00', end: '19:00', why: 'rush hours' }, { days: [2, 4], start: '05:00', end: '06:30', why: 'deliveries' }, { days: [5, 6], start: '23:00', end: '01:00', why: 'cleaning' }],
    circuits: Array.from({ length: 40 }, (_, index) => ({
      id: `A${String(index + 1).padStart(2, '0')}`,
      // Close together, as schedules are set, so that clean stretches are left between them.
      defrosts: index % 3 === 0 ? { everyHours: 6, offset: `0${index % 2}:${seed % 2 === 0 ? '15' : '30'}` } : { times: [random() < 0.8 ? '00:30' : time(), '06:45', '18:00'] },
      durationMin: 15 + 5 * (index % 4), dripMin: 5 + index % 3,
    })),
  })
}

/** Every minute of the time in question, with its local time of day and day of the week. */
function walls(timeZone: string, from: number, to: number) {
  const format = new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', minute: '2-digit', weekday: 'short', hourCycle: 'h23' })
  const days = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun']
  const found: { at: number, time: string, day: number }[] = []
  for (let at = from; at < to; at += MINUTE) {
    const words = format.format(at)
    found.push({ at, time: words.slice(-5), day: days.indexOf(words.slice(0, 3)) + 1 })
  }
  return found
}

function timesOf({ defrosts }: PlanWindowInput['circuits'][number]): string[] {
  if ('times' in defrosts) return defrosts.times
  const [hour = 0, minute = 0] = defrosts.offset.split(':').map(Number)
  return Array.from({ length: 24 / defrosts.everyHours }, (_, index) => `${String((hour + index * defrosts.everyHours) % 24).padStart(2, '0')}:${String(minute).padStart(2, '0')}`)
}

function minutesFrom(start: string, end: string): number {
  const [from, to] = [start, end].map(time => Number(time.slice(0, 2)) * 60 + Number(time.slice(3)))
  return to! > from! ? to! - from! : to! + 1440 - from!
}

/** Each candidate held against each defrost and each avoided stretch. */
function bruteForce(input: PlanWindowInput) {
  const from = Date.parse(input.from)
  const reach = (input.leadMin + input.darkMin) * MINUTE
  const minutes = walls(input.timeZone, from - 2 * DAY, from + (input.days + 1) * DAY)
  const defrosts: Stretch[] = []
  const avoided: Stretch[] = []
  for (const { at, time, day } of minutes) {
    for (const circuit of input.circuits)
      if (timesOf(circuit).includes(time)) defrosts.push({ circuit: circuit.id, start: at, end: at + (circuit.durationMin + circuit.dripMin) * MINUTE })
    for (const { days, start, end, why } of input.avoid)
      if (time === start && days.includes(day)) avoided.push({ circuit: why, start: at, end: at + minutesFrom(start, end) * MINUTE })
  }
  const meets = (at: number) => defrosts.filter(({ start, end }) => start < at + reach && end > at - CLEAR)
  const candidates: { at: number, count: number, avoided: boolean }[] = []
  for (let at = from; at < from + input.days * DAY; at += input.stepMin * MINUTE)
    candidates.push({ at, count: meets(at).length, avoided: avoided.some(({ start, end }) => start < at + reach && end > at) })
  candidates.sort((a, b) => a.count - b.count || (a.count === 0 ? Number(a.avoided) - Number(b.avoided) : 0) || a.at - b.at)
  const starts: typeof candidates = []
  for (const candidate of candidates) {
    if (starts.length === MOST_STARTS) break
    // Of two clean starts with no defrost between them one is enough.
    const sameStretch = (other: typeof candidate) => other.count === 0 && candidate.count === 0
      && !defrosts.some(({ start, end }) => start - reach < Math.max(other.at, candidate.at) && end + CLEAR > Math.min(other.at, candidate.at))
    if (!starts.some(sameStretch)) starts.push(candidate)
  }
  return {
    starts: starts.map(({ at, count }) => ({ at: new Date(at).toISOString(), clean: count === 0 })),
    conflicts: meets(from).map(({ circuit, start }) => ({ circuit, at: new Date(start).toISOString() })),
  }
}

const SEEDS = [1, 2, 3, 4]
let clean = 0
for (const seed of SEEDS) {
  const planned = planWindow(inputOf(seed))
  const short = {
    starts: planned.starts.map(({ at, clean }) => ({ at, clean })),
    conflicts: planned.conflicts.map(({ circuit, at }) => ({ circuit, at })),
  }
  clean += short.starts.filter(start => start.clean).length
  const plain = bruteForce(inputOf(seed))
  if (JSON.stringify(short) !== JSON.stringify(plain)) throw new Error(`Week ${seed}: ${JSON.stringify(short)} is not ${JSON.stringify(plain)}`)
}

const input = inputOf(1)
const planned = microseconds(() => planWindow(input), 1, 11) / 1_000
const plain = microseconds(() => bruteForce(input), 1, 3) / 1_000

process.stdout.write(`${JSON.stringify({
  name: 'a start in seven days of 40 circuits',
  ratio: Number((planned / plain).toFixed(3)),
  baseline: 'plain loops over every minute, candidate and defrost, whose answer is the same',
  milliseconds: Number(planned.toFixed(1)),
  baselineMilliseconds: Number(plain.toFixed(1)),
  weeksCompared: SEEDS.length,
  cleanStartsFound: clean,
})}\n`)
