import type { AlertName } from '~~/shared/record/kinds/alerts'
import type { AlertView } from './view'

/** Something of which a rule says that it is so now. */
export interface AlertFinding {
  /** a case's id, a point's tag, a person's id, by the rule */
  about: string
  /** an alert that was raised before this moment is not about it, Unix ms; null: any open one is */
  since: number | null
  /** reason enough to raise an alert; else it only keeps one open, or joins one that is raised for another */
  begins: boolean
}

/** One kind of alert. Words are one line: what, until when, what to do; the site is put before them. */
export interface AlertRule {
  /** the last level that is told at once */
  start: 1 | 2
  /** all that is so goes into one alert, instead of one for each */
  together: boolean
  /** while nobody has said to have seen an open one, no other is raised: it tells the same people the same */
  oneAtATime?: boolean
  /** while one of this kind is open it is not passed on: that one tells the next people already */
  yieldsTo?: AlertName
  find: (view: AlertView) => AlertFinding[]
  words: (view: AlertView, about: readonly string[]) => string
  /** when what is feared comes to pass, Unix ms; null: it has no time */
  until: (view: AlertView, about: readonly string[]) => number | null
}

export type AlertRules = { [K in AlertName]: AlertRule }

/** Whether an alert raised at a moment is about a finding. */
export function isAbout(alert: { about: readonly string[], raisedAt: number }, finding: AlertFinding): boolean {
  return alert.about.includes(finding.about) && (finding.since === null || alert.raisedAt >= finding.since)
}
