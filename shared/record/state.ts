import { INSTRUMENT_CHECK_DAYS, PLAIN_HOLDING } from '../schemas/equipment'
import type { Role } from '../schemas/people'
import type { HandPosition, PointKind } from '../schemas/point-kinds'
import type { CheckId } from './checks'
import type { AlertName } from './kinds/alerts'
import type { SeenInAuto, SeenInHand } from './kinds/hand'
import type { OpenMatter, Spoken } from './kinds/hands'
import type { Act } from './kinds/rounds'
import type { ActCause, NoticeParty, NoticeSubject, PlantFault, Verdict } from './kinds/server'
import type { Phase } from './phases'
import type { Plan } from './plan'
import type { Snapshot } from './snapshot'

/** Raised when the fold's meaning changes, so that cached folds are rebuilt. */
export const FOLD_VERSION = 12

/** Who did something, when (server-corrected Unix ms) and where it stands in the log. */
export interface Mark { by: string, at: number, seq: number, entry: string }

export interface Signer { person: string, name: string, role: Role | 'server', deviceName: string, publicKey: string }

/**
 * auto: the controller has it · hand: a person has it · excused: cannot be put in hand ·
 * returned: back in auto, proof due · proven: seen to answer the controller
 */
export type PointStatus = 'auto' | 'hand' | 'excused' | 'returned' | 'proven'

export interface PointState {
  tag: string
  kind: PointKind
  status: PointStatus
  /** the position it is held in; null unless in hand */
  hand: HandPosition | null
  seen: SeenInHand | SeenInAuto | null
  value: { number: number, unit: string } | null
  until: number | null
  /** who answers for the override, a person's id: who placed it, then whoever took it over (I6) */
  owner: string | null
  reason: string
  words: string
  photos: string[]
  mark: Mark | null
  /** a try that did not come out as asked; cleared when it does */
  tried: { seen: SeenInHand, mark: Mark } | null
  /** a machine seen stopped: when, Unix ms (rule I5) */
  stoppedAt: number | null
  /** an unsettled questioned entry says that it is in hand: it counts as in hand */
  questionedHand: string | null
  excuse: { reason: string, measure: string } | null
  exception: { owner: string, by: number, reason: string, mark: Mark } | null
  proof: Mark | null
}

export interface ReadingState {
  entry: string
  seq: number
  round: number
  /** server-corrected Unix ms */
  at: number
  value: number
  unit: 'F' | 'C'
  method: 'product' | 'air' | 'infrared'
  instrumentId: string | null
  by: string
  questioned: boolean
  /** the entry that corrected it */
  correctedBy: string | null
  /** corrected away: judged no more, still shown */
  struck: boolean
  words: string
}

export interface ActState {
  act: Act
  product: string
  quantity: number | null
  unit: string
  place: string
  /** by when it is to be cooled, Unix ms */
  coolBy: number | null
  takenBy: string
  /** product was left in the case after it */
  left: boolean
  words: string
  photos: string[]
  mark: Mark
}

/** One time that an act was asked for on a case, and what ended it. */
export interface ActOpening {
  seq: number
  at: number
  cause: ActCause
  deadline: number | null
  /** hold: the case holds long enough again; worse: a more pressing one took its place */
  closed: { how: 'act' | 'reading' | 'decision' | 'verdict' | 'hold' | 'worse', mark: Mark } | null
}

/** A thermometer held in ice and water during this outage. */
export interface InstrumentCheck { instrumentId: string, at: number, value: number, unit: 'F' | 'C', within: boolean, words: string, mark: Mark }

export interface CaseState {
  id: string
  touched: boolean
  readings: ReadingState[]
  verdict: { verdict: Verdict, deadline: number | null, minutesAbove: number, clause: string, source: string, act: string | null, why: string[], at: number, seq: number } | null
  /** seq of the entry that opened the act which is still open */
  openAct: number | null
  openings: ActOpening[]
  acts: ActState[]
  decidedOtherwise: { reason: string, clause: string, mark: Mark } | null
  acceptedWarm: boolean
  /** emptied, moved or discarded: nothing left to judge */
  empty: boolean
}

export interface PressureState { round: number, at: number, suctionGroupId: string, suctionPsig: number, dischargePsig: number | null, by: string, seq: number, questioned: boolean }

export interface DarkInterval { from: number, to: number | null, how: 'gate' | 'fact', words: string, /** what the gate would have missed */ breach: string[], mark: Mark }

/** A mail to the shop's contact or the monitoring centre, and who said that they have read it. */
export interface NoticeState { mail: string, party: NoticeParty, subject: NoticeSubject, name: string, to: string, /** handed in, Unix ms; null where only the answer to it is known */ sentAt: number | null, seq: number, acknowledged: { name: string, at: number, seq: number } | null }

export interface Question { entry: string, about: string | null, words: string, mark: Mark, answer: { words: string, mark: Mark } | null }

/** Work offered to somebody, and how that ended. */
export interface OfferState {
  entry: string
  /** person ids */
  from: string
  to: string
  toName: string
  /** what was open, as the leaving one saw it */
  open: { what: OpenMatter, about: string, words: string }[]
  words: string
  mark: Mark
  end: { what: 'taken' | 'withdrawn' | 'refused', words: string, mark: Mark } | null
}

/** The outage passed from one to another; what the incoming one found of each open matter. */
export interface TakenState { from: string, by: string, offer: string | null, looked: { what: OpenMatter, about: string, found: string }[], words: string, mark: Mark }

/** A supervisor's decision that was given by voice, and what stood before it, should it be denied. */
export interface VoiceState {
  entry: string
  supervisor: string
  supervisorName: string
  /** who took it down, a person's id */
  takenBy: string
  /** server-corrected Unix ms */
  givenAt: number
  words: string
  decision: Spoken
  mark: Mark
  answer: { what: 'confirmed' | 'denied', words: string, mark: Mark } | null
  before: {
    marginAccepted: OutageState['marginAccepted']
    exceptions: Record<string, PointState['exception']>
    decided: CaseState['decidedOtherwise']
  }
}

/** An alert of this outage, and what came of it. */
export interface AlertState {
  key: string
  alert: AlertName
  /** cases' ids, points' tags or people's ids, by what it is */
  about: string[]
  /** the last level that was told */
  level: number
  words: string
  /** when what is feared comes to pass, Unix ms */
  until: number | null
  /** printed names of all who were told */
  to: string[]
  /** when it was raised or last passed on, Unix ms */
  toldAt: number
  mark: Mark
  acknowledged: { person: string, name: string, at: number } | null
  /** since when it is so no more, Unix ms */
  over: number | null
}

export interface Questioned { entry: string, seq: number, kind: string, why: string[], tag: string | null, settled: { words: string, mark: Mark } | null }

export interface OutageState {
  foldVersion: number
  id: string
  code: string | null
  size: number
  phase: Phase
  planned: boolean
  snapshot: Snapshot
  opened: Mark | null
  cause: string
  plan: Plan
  /** who wrote or changed the plan, person ids */
  authors: string[]
  planSubmitted: Mark | null
  planReturned: { reason: string, mark: Mark } | null
  approved: Mark | null
  /** the numbers that a supervisor accepted last, minutes */
  marginAccepted: { minutes: number | null, deadlineMinutes: number | null, reason: string, mark: Mark } | null
  inHandBegun: Mark | null
  /** who answers for the outage, until another one takes it: a person's id */
  holder: { person: string, mark: Mark } | null
  offers: OfferState[]
  taken: TakenState[]
  voices: VoiceState[]
  /** names of people whom entries name before they sign themselves */
  named: Record<string, string>
  checks: Partial<Record<CheckId, { outcome: 'done' | 'needless', words: string, photos: string[], mark: Mark }>>
  points: Record<string, PointState>
  cases: Record<string, CaseState>
  instrumentChecks: InstrumentCheck[]
  pressures: PressureState[]
  /** warnings of the plant that are not over */
  plant: { fault: PlantFault, about: string, words: string, act: string, at: number, seq: number }[]
  alerts: AlertState[]
  darks: DarkInterval[]
  turnedBack: { reason: string, mark: Mark } | null
  /** a supervisor's order to turn back, the last one */
  turnBackOrdered: { reason: string, mark: Mark } | null
  steps: Record<string, { begun: Mark | null, done: Mark | null }>
  /** when the last control came back, Unix ms */
  backAt: number | null
  handBackClosed: Mark | null
  defrostsWatched: { circuitId: string, words: string, mark: Mark }[]
  notes: { words: string, photos: string[], mark: Mark }[]
  corrections: { corrects: string, reason: string, mark: Mark }[]
  questions: Question[]
  questioned: Questioned[]
  calledOff: { reason: string, mark: Mark } | null
  submitted: { drawing: string, words: string, mark: Mark } | null
  submitters: string[]
  reviewed: Mark | null
  returned: { reason: string, mark: Mark }[]
  sealed: { drawing: string, size: number, root: string, words: string, mark: Mark } | null
  signers: Record<string, Signer>
  /** hashes of photos and drawings that entries name */
  files: string[]
  refusals: { device: string, n: number, id: string, reason: string, seq: number }[]
  /** each device's own chain here: its count and the hash of its last entry, refused ones included */
  chain: Record<string, { n: number, hash: string }>
  /** each device: when the server last received something of it, and until when it said that it has no signal, Unix ms */
  heard: Record<string, { at: number, until: number | null }>
  /** what the shop and the monitoring centre were written, in the order of the log */
  notices: NoticeState[]
  /** Largest |skew| seen, ms, and whose device */
  largestSkew: { ms: number, device: string } | null
}

const NO_ID = '00000000-0000-0000-0000-000000000000'

export const EMPTY_PLAN: Plan = {
  startsAt: null,
  workKind: { id: null, name: '-' },
  steps: [],
  rollBack: [],
  duration: { totalMean: 0, darkMean: 0, dark19in20: 0, rollBack19in20: 0 },
  points: [],
  order: [],
  cases: [],
  census: [],
  measures: [],
  assumptions: [],
  watchDefrosts: false,
  note: '',
}

const EMPTY_SNAPSHOT: Snapshot = {
  site: { id: NO_ID, code: '', name: '', address: '', timeZone: 'UTC', temperatureUnit: 'C', pressureUnit: 'psig', altitudeM: 0, intervalMinutes: 10, paper: 'A4', contactName: '', contactPhone: '', quietHours: [], holding: structuredClone(PLAIN_HOLDING), instrumentCheckDays: INSTRUMENT_CHECK_DAYS },
  controller: { id: NO_ID, name: '', place: '', panelVolts: null },
  rulebook: { id: '', version: '', name: '' },
  racks: [], suctionGroups: [], circuits: [], cases: [], points: [], instruments: [],
}

/** The state of a log without entries. */
export function emptyState(id: string): OutageState {
  return {
    foldVersion: FOLD_VERSION, id, code: null, size: 0, phase: 'plan', planned: true,
    snapshot: structuredClone(EMPTY_SNAPSHOT), opened: null, cause: '', plan: structuredClone(EMPTY_PLAN),
    authors: [], planSubmitted: null, planReturned: null, approved: null, marginAccepted: null, inHandBegun: null, holder: null, offers: [], taken: [], voices: [], named: {},
    checks: {}, points: {}, cases: {}, instrumentChecks: [], pressures: [], plant: [], alerts: [], darks: [], turnedBack: null, turnBackOrdered: null, steps: {}, backAt: null,
    handBackClosed: null, defrostsWatched: [], notes: [], corrections: [], questions: [], questioned: [],
    calledOff: null, submitted: null, submitters: [], reviewed: null, returned: [], sealed: null, signers: {}, files: [],
    refusals: [], chain: {}, heard: {}, notices: [], largestSkew: null,
  }
}
