/** Looks for alerts on a simulated clock, and enters what is due as the server does. */
import type { AlertSettings, AlertsDue } from '../../../server/utils/alerts'
import { alertsDue } from '../../../server/utils/alerts'
import { alertEntries } from '../../../server/utils/alerts/entries'
import type { CaseForecast } from '../../../server/utils/hold/for-outage'
import { forecastCases } from '../../../server/utils/hold/for-outage'
import { isoTime } from '../../../shared/record/entry'
import type { AlertName } from '../../../shared/record/kinds/alerts'
import type { RecordWriter, TestSigner } from '../../support/record'
import { supervisor, technician, uuidFor } from '../../support/record'

const person = ({ id, name }: { id: string, name: string }) => ({ id, name, email: `${name.split(' ')[0]!.toLowerCase()}@quillfeather.example` })
export const ADMINISTRATOR = person({ id: uuidFor('person Maud Pennington'), name: 'Maud Pennington' })
export const TECHNICIAN = person(technician)
export const SUPERVISOR = person(supervisor)

/** The technician at once, the supervisor after five minutes, the administrator after ten more. */
export const SETTINGS: AlertSettings = { levels: [[TECHNICIAN], [SUPERVISOR], [ADMINISTRATOR]], passOnAfter: [5, 10] }

/** One look, entered in the log. */
export function look(writer: RecordWriter, settings = SETTINGS): AlertsDue {
  const due = alertsDue(writer.state, writer.now, settings)
  for (const { kind, body } of alertEntries(due, writer.now)) writer.serverEntry(kind, body)
  return due
}

export interface Happened { minute: number, what: 'raised' | 'passed on' | 'over', alert: AlertName, to: string[] }

/** Lets time go by with a look every half minute. @returns what happened, by minutes from now */
export function wait(writer: RecordWriter, minutes: number, settings = SETTINGS): Happened[] {
  const began = writer.now
  const happened: Happened[] = []
  for (let half = 0; half <= minutes * 2; half++) {
    writer.now = began + half * 30_000
    const { raise, passOn, over } = look(writer, settings)
    const minute = half / 2
    const alertOf = (key: string) => writer.state.alerts.find(item => item.key === key)!.alert
    happened.push(
      ...over.map((key): Happened => ({ minute, what: 'over', alert: alertOf(key), to: [] })),
      ...passOn.map(({ key, to }): Happened => ({ minute, what: 'passed on', alert: alertOf(key), to: to.map(item => item.name) })),
      ...raise.map(({ alert, to }): Happened => ({ minute, what: 'raised', alert, to: to.map(item => item.name) })),
    )
  }
  return happened
}

/** The first half minute, of those that `wait` looks at, in which a forecast is so; in minutes from now. */
export function firstMinute(writer: RecordWriter, isSo: (forecast: CaseForecast, at: number) => boolean): number {
  for (let half = 0; half < 1200; half++) if (forecastCases(writer.state, writer.now + half * 30_000).some(item => isSo(item, writer.now + half * 30_000))) return half / 2
  throw new Error('It is never so')
}

/** What happened to one kind of alert. */
export const of = (happened: readonly Happened[], alert: AlertName) => happened.filter(item => item.alert === alert)
export const minutesOf = (happened: readonly Happened[], alert: AlertName, what: Happened['what'] = 'raised') => of(happened, alert).filter(item => item.what === what).map(item => item.minute)

/** Somebody acknowledges every open alert of a kind, or all. */
export function acknowledge(writer: RecordWriter, by: TestSigner, alert?: AlertName): void {
  for (const item of writer.state.alerts) {
    if (item.over === null && item.acknowledged === null && (alert === undefined || item.alert === alert)) writer.serverEntry('alert-acknowledged', { key: item.key, person: by.id, name: by.name, acknowledgedAt: isoTime(writer.now) })
  }
}
