/** Reasons of a verdict as people at the site read them. */
import { clockWords, dateWords } from '../charts/words'

const INSTANT = /(\d{4}-\d{2}-\d{2}) (\d{2}:\d{2})(:\d{2})? UTC/g

/**
 * A reason with its instants in the site's time of day, and the date where it is not that of `beside`.
 * The engine writes them in UTC: "2026-03-03 08:24 UTC".
 * @param beside a moment on whose day no date is said, Unix ms
 */
export function localWhy(reason: string, timeZone: string, beside: number): string {
  const today = dateWords(new Date(beside).toISOString(), timeZone)
  return reason.replace(INSTANT, (_all, day: string, minute: string, second = ':00') => {
    const iso = `${day}T${minute}${second}.000Z`
    const date = dateWords(iso, timeZone)
    return `${date === today ? '' : `${date}, `}${clockWords(iso, timeZone, second !== ':00')}`
  })
}
