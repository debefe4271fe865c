/**
 * From when on a record may be deleted: so many years after its last entry, by the calendar in UTC.
 * 29 February becomes 28 February in a year that has none, as in the database (PostgreSQL, 9.9, date + interval).
 * @param lastAt when its last entry was received, Unix ms
 * @param years whole years
 * @returns Unix ms
 */
export function retentionOver(lastAt: number, years: number): number {
  const last = new Date(lastAt)
  const over = new Date(lastAt)
  over.setUTCFullYear(last.getUTCFullYear() + years)
  if (over.getUTCMonth() !== last.getUTCMonth()) over.setUTCDate(0)
  return over.getTime()
}

/** The years that count for a site: its own where they are longer. @param own null: it has none */
export function retentionYears(organisation: number, own: number | null): number {
  return Math.max(organisation, own ?? 0)
}
