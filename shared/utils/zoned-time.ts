/** Local time of a zone as forms hold it, 'YYYY-MM-DDTHH:mm'. @param ms Unix ms @param timeZone IANA name */
export function localTime(ms: number, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).formatToParts(ms)
  const part = (type: string) => parts.find(item => item.type === type)!.value
  return `${part('year')}-${part('month')}-${part('day')}T${part('hour')}:${part('minute')}`
}

/**
 * The moment at which clocks of a zone show a local time, Unix ms; null when the text is no such time.
 * A time that the clock skips comes out as the moment after the gap, one that comes twice as the first.
 */
export function utcOfLocal(local: string, timeZone: string): number | null {
  if (!/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}$/.test(local)) return null
  const wanted = Date.parse(`${local}:00.000Z`)
  if (Number.isNaN(wanted)) return null
  // Offsets before and after any change near that day; the earlier moment that reads right wins.
  const candidates = [wanted - offsetAt(wanted - DAY, timeZone), wanted - offsetAt(wanted + DAY, timeZone)].sort((a, b) => a - b)
  return candidates.find(ms => localTime(ms, timeZone) === local) ?? candidates[1]!
}

const DAY = 24 * 60 * 60_000

/** Offset of a zone from UTC at a moment, ms. */
function offsetAt(ms: number, timeZone: string): number {
  return Date.parse(`${localTime(ms, timeZone)}:00.000Z`) - Math.floor(ms / 60_000) * 60_000
}
