import type { Phase } from '~~/shared/record/phases'
import type { OutageItem } from '~~/shared/schemas/outage-list'
import { clockWords, countWords, dateWords, dayClockWords } from '~~/shared/charts/words'

/** Phases of an outage that somebody still works on, nearest to dark first. */
export const OPEN_PHASES = ['dark', 'in-hand', 'hand-back', 'settle', 'approved', 'plan'] as const satisfies readonly Phase[]
/** Phases in which something is done on the site now. */
export const LIVE = ['dark', 'in-hand', 'hand-back', 'settle'] as const satisfies readonly Phase[]
/** Phases whose log has become a record to be read. */
export const RECORD_PHASES = ['submitted', 'sealed', 'called-off'] as const satisfies readonly Phase[]

const isRecord = (phase: Phase) => (RECORD_PHASES as readonly Phase[]).includes(phase)

/** Where an outage opens: its run while somebody works on it, else its record. An auditor reads only. */
export function outagePath({ id, phase }: Pick<OutageItem, 'id' | 'phase'>, role?: string): string {
  return isRecord(phase) || role === 'auditor' ? `/records/${id}` : `/outages/${id}`
}

/** By phase, then by the longest without control, then by the earliest start; ties break on id. */
export function byUrgency(items: readonly OutageItem[]): OutageItem[] {
  const rank = (item: OutageItem) => {
    const place = (OPEN_PHASES as readonly Phase[]).indexOf(item.phase)
    return place < 0 ? OPEN_PHASES.length : place
  }
  const moment = (item: OutageItem) => item.darkAt ?? item.startsAt ?? item.openedAt
  return [...items].sort((one, other) => rank(one) - rank(other) || compare(moment(one), moment(other)) || compare(one.id, other.id))
}

const compare = (one: string, other: string) => one < other ? -1 : one > other ? 1 : 0

/** Whether a supervisor is asked for something: a plan to approve, a record to countersign, or a decision by voice to sign. */
export function waitsForSupervisor({ phase, planSubmitted, voices }: OutageItem): boolean {
  return voices > 0 || phase === 'submitted' || (phase === 'plan' && planSubmitted)
}

/** The work, and whether nobody planned it. An unplanned outage that names no work is just that. */
export function workWords({ workKind, planned }: Pick<OutageItem, 'workKind' | 'planned'>): string {
  return planned || workKind.toLowerCase() === 'unplanned' ? workKind : `${workKind}, unplanned`
}

/** Where an outage stands, in words. Times are the site's. */
export function standing(item: OutageItem): string {
  const at = (iso: string | null) => iso ? dayClockWords(iso, item.site.timeZone) : ''
  const points = item.pointsInHand > 0 ? `${countWords(item.pointsInHand, 'point')} in hand` : 'no point in hand'
  switch (item.phase) {
    case 'plan': return item.planSubmitted ? `Plan asks for approval${item.startsAt ? `, starts ${at(item.startsAt)}` : ''}` : `Plan being made${item.startsAt ? `, starts ${at(item.startsAt)}` : ''}`
    case 'approved': return `Approved${item.startsAt ? `, starts ${at(item.startsAt)}` : ''}`
    case 'in-hand': return `Putting points in hand, ${points}`
    case 'dark': return `Without control${item.darkAt ? ` since ${clockWords(item.darkAt, item.site.timeZone)}` : ''}, ${points}`
    case 'hand-back': return `Handing back, ${points}`
    case 'settle': return `Settling, ${points}`
    case 'submitted': return `Record submitted, ${countWords(item.size, 'entry', 'entries')}`
    case 'sealed': return `Sealed${item.endedAt ? ` ${dateWords(item.endedAt, item.site.timeZone)}` : ''}`
    case 'called-off': return `Called off${item.endedAt ? ` ${dateWords(item.endedAt, item.site.timeZone)}` : ''}`
  }
}
