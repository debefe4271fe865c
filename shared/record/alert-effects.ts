/** What the entries of an alert do to the state. An alert that is not known is left alone. */
import type { BodyOf } from './kinds'
import type { AlertState, Mark, OutageState } from './state'

const find = (state: OutageState, key: string): AlertState | undefined => state.alerts.find(alert => alert.key === key)

export function raiseAlert(state: OutageState, body: BodyOf<'alert-raised'>, mark: Mark): void {
  // The same alert is never there twice, whatever a log says.
  if (find(state, body.key)) return
  const { key, alert, about, level, words, until, to } = body
  state.alerts.push({ key, alert, about, level, words, until: until === null ? null : Date.parse(until), to, toldAt: mark.at, mark, acknowledged: null, over: null })
}

export function passOnAlert(state: OutageState, { key, level, to }: BodyOf<'alert-passed-on'>, mark: Mark): void {
  const alert = find(state, key)
  if (alert) Object.assign(alert, { level, to: [...new Set([...alert.to, ...to])], toldAt: mark.at })
}

/** The first one who acknowledges is the one that counts. */
export function acknowledgeAlert(state: OutageState, { key, person, name, acknowledgedAt }: BodyOf<'alert-acknowledged'>): void {
  const alert = find(state, key)
  if (!alert) return
  state.named[person] ??= name
  alert.acknowledged ??= { person, name, at: Date.parse(acknowledgedAt) }
}

export function endAlert(state: OutageState, key: string, mark: Mark): void {
  const alert = find(state, key)
  if (alert) alert.over ??= mark.at
}
