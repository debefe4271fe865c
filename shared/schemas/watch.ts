import { z } from 'zod'
import type { AlertLine } from '../record/alerts'
import type { Verdict } from '../record/kinds/server'
import type { Phase } from '../record/phases'
import type { Role } from './people'

/** Phases of an outage that the watch shows: all until it is sealed or called off. */
export const WATCHED_PHASES = ['dark', 'in-hand', 'hand-back', 'settle', 'submitted', 'approved', 'plan'] as const satisfies readonly Phase[]
/** Outages that the watch shows at once; without control first. */
export const WATCH_MAX = 500
/** Outages that one request may name. */
export const WATCH_ASKED_MAX = 50

/** What wakes a screen: that an outage has changed, and nothing of what it says. */
export interface WatchWake { outage: string, seq: number, phase: Phase }

/** A case with product in it, as the watch shows it. Times in Unix ms by the server's clock. */
export interface WatchCase {
  id: string
  name: string
  /** when it meets its limit, the careful end of its forecast; null: it stays within, or is held on by hand */
  limitAt: number | null
  /** when it is to be read again; null while no round is asked for */
  dueAt: number | null
  verdict: Verdict | null
}

/** An outage as the watch shows it: enough to draw its strip and to say what waits. Times in Unix ms by the server's clock. */
export interface WatchOutage {
  id: string
  code: string | null
  seq: number
  phase: Phase
  planned: boolean
  site: { id: string, name: string, timeZone: string }
  controller: string
  workKind: string
  intervalMinutes: number
  startsAt: number | null
  inHandAt: number | null
  /** the last time without control */
  dark: { from: number, to: number | null } | null
  /** when the first began; another one came after it where this differs */
  firstDarkAt: number | null
  endedAt: number | null
  /** by when the work is over, 19 times in 20 */
  plannedEndAt: number | null
  /** the last moment of each round, in their order */
  rounds: number[]
  /** shortest hold first */
  cases: WatchCase[]
  /** the first deadline of any case, and the latest turn-back before it */
  deadline: { at: number, name: string, byRulebook: boolean, turnBackAt: number } | null
  turnBack: 'ordered' | 'begun' | null
  pointsInHand: number
  pointsWaiting: number
  proofsDue: number
  /** the time by which the first override must be off again */
  firstUntil: number | null
  acts: { caseId: string, name: string, words: string, deadline: number | null }[]
  plant: string[]
  /** open alerts, those that nobody has acknowledged first */
  alerts: AlertLine[]
  questioned: number
  questions: number
  discarded: number
  /** devices that signed here, and when the server last heard each; `until`: no signal until then, as its owner said */
  phones: { device: string, name: string, role: Role | 'server', deviceName: string, at: number, until: number | null }[]
  /** decisions by voice that wait for their supervisor, a person's id */
  voices: { supervisor: string, dueAt: number }[]
  /** work offered to somebody, person ids */
  offers: { to: string, fromName: string }[]
  planSubmitted: boolean
  /** null where no planned step keeps control away, or the work has gone beyond it */
  margin: { minutes: number | null, faults: string[], accepted: boolean } | null
  authors: string[]
  submitters: string[]
}

/** What a pull is answered: outages that changed, and the ids of all that were asked for and are on the watch. */
export interface WatchAnswer { now: number, items: WatchOutage[], ids: string[], /** more than the watch shows at once */ more: boolean }

const known = z.record(z.string().uuid(), z.number().int().min(0))

/** A pull names what is known here already, each outage with its seq. */
export const watchPullSchema = z.object({
  known: known.refine(items => Object.keys(items).length <= 2 * WATCH_MAX, `At most ${2 * WATCH_MAX} outages`).default({}),
  only: z.array(z.string().uuid()).max(WATCH_ASKED_MAX, `At most ${WATCH_ASKED_MAX} outages`).optional(),
}).strict()
