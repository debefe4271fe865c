/** What the real queries of the program touch: they are listened to while they run, and asked again with EXPLAIN. */
import { drizzle } from 'drizzle-orm/postgres-js'
import postgres from 'postgres'
import * as schema from '../../server/database/schema'
import type { Database } from '../../server/utils/database'

export interface Touched {
  sql: string
  /** pages of 8 kB touched, in memory or read, each time that it is touched */
  pages: number
  /** times that an index was gone down */
  descents: number
  /** rows that a count took; 1 for every other query */
  counted: number
}

interface Node { 'Node Type': string, 'Actual Loops': number, 'Actual Rows': number, 'Shared Hit Blocks': number, 'Shared Read Blocks': number, 'Plans'?: Node[] }

/** How a query may be answered: as PostgreSQL chooses, or by the order of an index, row by row. */
export type Way = 'chosen' | 'by index'
const SETTINGS: Record<Way, 'on' | 'off'> = { 'chosen': 'on', 'by index': 'off' }

export function openListening(url: string) {
  const client = postgres(url, { max: 1, onnotice: () => {} })
  let heard: { sql: string, params: unknown[] }[] = []
  const db = drizzle(client, { schema, casing: 'snake_case', logger: { logQuery: (sql, params) => void heard.push({ sql, params }) } }) as unknown as Database

  async function explain({ sql, params }: { sql: string, params: unknown[] }): Promise<Touched> {
    const [row] = await client.unsafe<{ 'QUERY PLAN': [{ Plan: Node }] }[]>(`explain (analyze, buffers, timing off, format json) ${sql}`, params as never[])
    const root = row!['QUERY PLAN'][0].Plan
    return { sql, pages: root['Shared Hit Blocks'] + root['Shared Read Blocks'], descents: descentsOf(root), counted: countedBy(root) }
  }

  return {
    client,
    db,
    /** Runs a piece of the program, then asks each of its reading queries what it touches. */
    async touchedBy(work: (db: Database) => Promise<unknown>, way: Way = 'chosen'): Promise<Touched[]> {
      heard = []
      await work(db)
      const asked = heard.filter(({ sql }) => sql.startsWith('select'))
      await client.unsafe(`set enable_seqscan = ${SETTINGS[way]}; set enable_bitmapscan = ${SETTINGS[way]}`)
      const touched: Touched[] = []
      for (const query of asked) touched.push(await explain(query))
      await client.unsafe('set enable_seqscan = on; set enable_bitmapscan = on')
      return touched
    },
  }
}

/** Of a bitmap scan of GIN it goes down once for each word at least: few against the pages that are then read. */
function descentsOf(node: Node): number {
  const own = node['Node Type'].includes('Index') ? node['Actual Loops'] : 0
  return own + (node.Plans ?? []).reduce((sum, child) => sum + descentsOf(child), 0)
}

/** A count stands over what it counts, which ends where it needs no more. */
function countedBy({ 'Node Type': type, Plans: plans = [] }: Node): number {
  return type === 'Aggregate' && plans[0]?.['Node Type'] === 'Limit' ? Math.max(1, plans[0]['Actual Rows']) : 1
}
