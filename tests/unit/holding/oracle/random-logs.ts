/** Random logs for the comparison of the two implementations, the same ones every time. */
import type { AssessInput, AssessReading } from '../../../../shared/schemas/assess'
import { ORACLE_ROWS } from './table'

/** A seeded source of numbers from 0 to below 1 (mulberry32, in the public domain). */
export function seeded(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6D2B79F5) | 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
}

/** Temperatures at which something changes in some row, by unit. */
const MARKS = { F: [10, 22, 30, 41, 45, 46, 50, 51], C: [-18, -15, -12, -5.6, -1, 2, 3, 4, 5, 7, 8, 60] }
/** Durations at which something changes in some row, minutes. */
const NUMBERS = [60, 120, 180, 240, 300]

export function randomLog(random: () => number): AssessInput {
  const whole = (from: number, to: number) => from + Math.floor(random() * (to - from + 1))
  const pick = <T>(list: readonly T[]) => list[Math.floor(random() * list.length)]!
  const often = (share: number) => random() < share

  const [name, row] = pick(Object.entries(ORACLE_ROWS))
  const [rulebook = '', foodClass = ''] = name.split('/')
  const unit = often(0.5) ? 'C' : 'F'
  const toInput = (value: number) => unit === row.unit ? value : unit === 'F' ? value * 9 / 5 + 32 : (value - 32) * 5 / 9
  const span = row.unit === 'F' ? 12 : 7
  const mild = often(0.3)

  function temperature(): number {
    if (often(0.02)) return unit === 'C' ? whole(-60, 80) : whole(-76, 176)
    // A value as somebody types it, in tenths of the input's own unit.
    if (often(0.3)) return Math.round(toInput(row.limit + (random() * 2 - 1) * span) * 10) / 10
    if (often(0.4)) return toInput(pick(MARKS[row.unit].filter(mark => Math.abs(mark - row.limit) < 4 * span || mark === 60)) + pick([0, 0, 0.1, -0.1, 0.000_000_4, 0.000_002, -0.000_002]))
    return toInput(row.limit + whole(-10 * span, mild ? 5 : 10 * span) / 10)
  }

  function reading(at: number): AssessReading {
    return {
      at: new Date(at).toISOString(),
      value: temperature(),
      ...(often(0.75) ? {} : { method: row.byAir && often(0.7) ? 'air' as const : pick(['product', 'air', 'infrared'] as const) }),
      ...(often(0.8) ? {} : { accuracy: pick([0, 0.5, 1, 2, 3]) }),
    }
  }

  // Across the changes of clock in Europe and North America as well: what counts is UTC.
  const dark = pick([Date.UTC(2026, 2, 8, 6), Date.UTC(2026, 2, 29, 0), Date.UTC(2026, 9, 25, 0), Date.UTC(2026, 10, 1, 5), Date.UTC(2026, 5, 15, 12)]) + whole(0, 90) * 60_000
  let at = dark + (often(0.3) ? 0 : whole(-45, 120)) * 60_000
  const readings: AssessReading[] = []
  for (let count = often(0.2) ? 1 : whole(2, 14); count > 0; count -= 1) {
    readings.push(reading(at))
    at += often(0.1) ? pick(NUMBERS) * 60_000 : often(0.2) ? whole(1, 120 * 60) * 1_000 : whole(1, 20) * 60_000 + (often(0.1) ? whole(-1, 1) : 0)
  }
  const last = Date.parse(readings[readings.length - 1]!.at)
  const rest = often(0.4) ? 0 : often(0.3) ? pick(NUMBERS) * 60_000 + whole(-1, 1) : whole(0, 200) * 60_000
  const lowest = name === 'eu-853-2004/quick-frozen' ? -12 : row.limit
  const allowsMinus12 = often(0.5)
  const site: AssessInput['site'] = {
    ...(often(0.7) ? {} : { limit: Math.min(lowest, allowsMinus12 ? lowest : row.limit) - pick([0, 0.5, 1, 2, 4]) }),
    ...(often(0.7) ? {} : { minutes: pick([1, 30, 45, 60, 90, 100, 120, 130, 180, 240].filter(minutes => minutes <= (row.longest ?? 240))) }),
    ...(often(0.6) ? {} : { addAccuracy: often(0.7) }),
    ...(allowsMinus12 && often(0.5) ? { allowsMinus12 } : {}),
  }
  if (!site.allowsMinus12 && site.limit !== undefined) site.limit = Math.min(site.limit, row.limit)
  return {
    rulebook,
    foodClass,
    unit,
    darkAt: new Date(dark).toISOString(),
    intervalMinutes: pick([5, 10, 15, 30, 60]),
    readings,
    now: new Date(Math.max(dark, last) + rest).toISOString(),
    ...(Object.keys(site).length === 0 ? {} : { site }),
  }
}
