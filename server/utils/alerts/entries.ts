import { isoTime } from '~~/shared/record/entry'
import type { BodyOf } from '~~/shared/record/kinds'
import type { AlertsDue } from './due'

type AlertKind = 'alert-raised' | 'alert-passed-on' | 'alert-over'
/** An entry of the server's own that is to be added: its kind with its body. */
export type AlertEntry = { [K in AlertKind]: { kind: K, body: BodyOf<K> } }[AlertKind]

/** What is due as it is entered in the log: what is over first, then what is passed on, then what is new. @param now Unix ms */
export function alertEntries({ raise, passOn, over }: AlertsDue, now: number): AlertEntry[] {
  const judgedAt = isoTime(now)
  return [
    ...over.map((key): AlertEntry => ({ kind: 'alert-over', body: { key, judgedAt } })),
    ...passOn.map(({ key, level, to }): AlertEntry => ({ kind: 'alert-passed-on', body: { key, level, to: to.map(person => person.name), judgedAt } })),
    ...raise.map(({ key, alert, about, level, words, until, to }): AlertEntry => ({
      kind: 'alert-raised', body: { key, alert, about, level, words, until: until === null ? null : isoTime(until), to: to.map(person => person.name), judgedAt },
    })),
  ]
}
