import { clockWords, dateWords } from '../../shared/charts/words'

/** "Thu 3 Dec 2026, 02:00" at a site. @param at Unix ms. @param zone IANA */
export function momentWords(at: number, zone: string): string {
  const iso = new Date(at).toISOString()
  return `${dateWords(iso, zone)}, ${clockWords(iso, zone)}`
}

/** "02:40", with the date where it is another day than the one that was just named. @param beside Unix ms */
export function clockBeside(at: number, beside: number, zone: string): string {
  const [one, other] = [at, beside].map(moment => dateWords(new Date(moment).toISOString(), zone))
  return one === other ? clockWords(new Date(at).toISOString(), zone) : momentWords(at, zone)
}

/** "from Thu 3 Dec 2026, 02:00, until about 03:10". @param until null: nobody can say yet */
export function spanWords(from: number, until: number | null, zone: string): string {
  return `from ${momentWords(from, zone)}, ${until === null ? 'until Holdover writes that it is back' : `until about ${clockBeside(until, from, zone)}`}`
}
