import type { RouteLocationRaw } from 'vue-router'
import type { InsightQuery } from '~~/shared/schemas/insights'
import type { RecordOutcome } from '~~/shared/schemas/record-filter'

/** What a number counts, beside the choice itself. */
export interface Narrowing { site?: string, controller?: string, work?: string, tag?: string, outcome?: RecordOutcome }

/** The records behind a number: the list, with the choice and what narrows it in its address. */
export function recordsLink(choice: InsightQuery, narrowing: Narrowing = {}): RouteLocationRaw {
  return { path: '/records', query: defined({ ...choice, phase: 'submitted,sealed', ...narrowing }) }
}

/** A table of the choice as CSV. */
export function tableAddress(choice: InsightQuery, table: string): string {
  const query = new URLSearchParams(defined({ ...choice })).toString()
  return `/api/insights/${table}.csv${query ? `?${query}` : ''}`
}

/** The days of a choice that ends now. @param now Unix ms @param days of today and before */
export function lastDays(now: number, days: number): { from: string } {
  return { from: new Date(now - (days - 1) * 86_400_000).toISOString().slice(0, 10) }
}

function defined(fields: Record<string, string | undefined>): Record<string, string> {
  return Object.fromEntries(Object.entries(fields).filter((field): field is [string, string] => field[1] !== undefined))
}
