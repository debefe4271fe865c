import type { SQL } from 'drizzle-orm'
import { sql } from 'drizzle-orm'

/** SQL text with $1, $2 … as drizzle runs it, so that it joins a transaction. Objects travel as JSON, undefined as null. */
export function numbered(text: string, values: readonly unknown[]): SQL {
  const parts = text.split(/\$(\d+)/)
  return sql.join(parts.map((part, index) => index % 2 === 0 ? sql.raw(part) : sql`${bound(values[Number(part) - 1])}`))
}

function bound(value: unknown): unknown {
  if (value === undefined || value === null) return null
  return typeof value === 'object' ? JSON.stringify(value) : value
}
