/** The tables of the insights as CSV, a row a line of the page. Pure. */
import { isoTime } from '../../../shared/record/entry'
import { BYTE_ORDER_MARK, csvRow } from '../../../shared/record/readings-csv'
import type { InsightTable, Insights } from '../../../shared/schemas/insights'

type Cells = (string | number | null)[]

const TABLES: Record<InsightTable, { head: string[], rows: (insights: Insights) => Cells[] }> = {
  work: {
    head: ['kind_of_work', 'outages', 'planned', 'median_minutes_without_control', 'median_likely', 'median_19_in_20', 'over_19_in_20', 'furthest_over_minutes', 'furthest_over_outage'],
    rows: ({ work }) => work.map(item => [item.name, item.outages, item.planned, item.took, item.likely, item.within, item.over, item.worst?.minutes ?? null, item.worst?.code ?? null]),
  },
  steps: {
    head: ['kind_of_work', 'step', 'way_back', 'outage', 'minutes', 'median_minutes', 'shortest', 'likely', 'longest', 'times_over_longest', 'times_under_shortest'],
    rows: ({ work }) => work.flatMap(({ name, steps }) => steps.flatMap(step => step.took.map((took): Cells => [name, step.name, step.back ? 'yes' : 'no', took.code, took.minutes, step.median, step.planned.shortest, step.planned.likely, step.planned.longest, step.over, step.under]))),
  },
  holds: {
    head: ['site', 'case', 'outages', 'shortest_minutes', 'shortest_outage', 'reckoned_minutes', 'longest_minutes', 'longest_outage', 'limit_never_reached'],
    rows: ({ holds }) => holds.map(item => [item.site.name, item.name, item.outages, item.shortest?.minutes ?? null, item.shortest?.code ?? null, item.reckoned, item.longest?.minutes ?? null, item.longest?.code ?? null, item.never]),
  },
  points: {
    head: ['site', 'controller', 'point', 'name', 'outages', 'excused', 'not_proven', 'reasons'],
    rows: ({ points }) => points.map(item => [item.site.name, item.controller.name, item.tag, item.name, item.outages, item.excused, item.notProven, item.reasons.join('; ')]),
  },
  rounds: {
    head: ['site', 'outages', 'rounds_without_control', 'late', 'late_percent', 'latest_by_minutes', 'latest_outage'],
    rows: ({ late }) => late.map(item => [item.site.name, item.outages, item.rounds, item.late, item.share, item.worst?.minutes ?? null, item.worst?.code ?? null]),
  },
  discards: {
    head: ['time_utc', 'site', 'outage', 'seq', 'case', 'product', 'quantity', 'unit', 'cause'],
    rows: ({ discards }) => discards.map(item => [isoTime(item.at), item.site.name, item.outage.code, item.seq, item.name, item.product, item.quantity, item.unit, item.cause]),
  },
}

/** One table with its head; UTF-8 behind a byte order mark. */
export function insightsCsv(insights: Insights, table: InsightTable): string {
  const { head, rows } = TABLES[table]
  return BYTE_ORDER_MARK + csvRow(head) + rows(insights).map(csvRow).join('')
}
