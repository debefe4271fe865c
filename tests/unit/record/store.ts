/** A store of two cases on one rack, small enough to keep in one's head, and its outage told as far as a phase. */
import { rulebookById } from '../../../server/utils/holding'
import { marginAt } from '../../../server/utils/hold/margin'
import { handBackAfter, handBackOrder, inHandOrder, planRefusals } from '../../../server/utils/order/for-outage'
import { BACK_CHECKS, BEFORE_CHECKS } from '../../../shared/record/checks'
import type { AnyEntry } from '../../../shared/record/entry'
import { isoTime } from '../../../shared/record/entry'
import type { BodyInput, EntryKind } from '../../../shared/record/kinds'
import { newestVersion, schemaOf } from '../../../shared/record/kinds'
import { SEAL_STATEMENT, SUBMIT_STATEMENT } from '../../../shared/record/kinds/review'
import { logRoot } from '../../../shared/record/merkle'
import type { Plan } from '../../../shared/record/plan'
import type { Judgement, Surroundings } from '../../../shared/record/rules'
import { judge } from '../../../shared/record/rules'
import { expectedSeen } from '../../../shared/record/select'
import type { Snapshot, SnapshotPoint } from '../../../shared/record/snapshot'
import { PLAIN_HOLDING } from '../../../shared/schemas/equipment'
import type { HandPosition, PointKind } from '../../../shared/schemas/point-kinds'
import type { TestSigner } from '../../support/record'
import { RecordWriter, supervisor, technician, uuidFor } from '../../support/record'

export const BEGAN = Date.UTC(2026, 2, 3, 1, 0)
export const DAIRY = uuidFor('case dairy')
export const FISH = uuidFor('case fish')
/** Runs on by a controller of its own, so nobody watches it. */
export const JUICE = uuidFor('case juice')
export const GROUP = uuidFor('small suction group')
export const CIRCUIT = uuidFor('small circuit')
export const DRAWING = 'd'.repeat(64)
export const INSTRUMENT = uuidFor('small thermometer')
const RACK = uuidFor('small rack')
const { id, version, name } = rulebookById('us-food-code-2022')!
const rulebook = { id, version, name }

function point(tag: string, kind: PointKind, hand: HandPosition | null, more: Partial<SnapshotPoint> = {}): SnapshotPoint {
  return { tag, kind, name: `${kind} ${tag}`, address: '', place: 'Panel A', means: 'selector', guards: [], rackId: RACK, suctionGroupId: GROUP, circuitId: null, caseIds: [], drives: null, ratedA: null, capacityKw: null, minOffMin: null, hand, onLoss: 'off', throughOff: false, ...more }
}

const GUARDED = { guards: ['high pressure', 'low pressure'] }

/** C-2 stays off; LA-1 and C-3, which has no guard in hand, are not in the plan. */
export const snapshot: Snapshot = {
  site: { id: uuidFor('small site'), code: 'Q001', name: 'Mill Lane', address: '', timeZone: 'America/Chicago', temperatureUnit: 'F', pressureUnit: 'psig', altitudeM: 0, intervalMinutes: 10, paper: 'Letter', contactName: '', contactPhone: '', quietHours: [], holding: PLAIN_HOLDING, instrumentCheckDays: 90 },
  controller: { id: uuidFor('small controller'), name: 'rack controller', place: '', panelVolts: 460 },
  rulebook,
  racks: [{ id: RACK, name: 'Rack A', refrigerant: 'R-448A', highCutOutPsig: 395, warmestC: null, reliefValves: [] }],
  suctionGroups: [{ id: GROUP, rackId: RACK, name: 'medium', stage: 'medium', targetSuctionPsig: 48, lowCutOutPsig: 20 }],
  circuits: [{ id: CIRCUIT, rackId: RACK, suctionGroupId: GROUP, name: 'A1', defrostKind: 'electric', defrosts: null, durationMin: 20, dripMin: 5 }],
  cases: [[DAIRY, 'Dairy wall'], [FISH, 'Fish service'], [JUICE, 'Juice doors']].map(([id, name]) => ({ id: id!, name: name!, kind: 'open-multideck' as const, foodClass: 'tcs', usualC: 2, limit: { value: 41, unit: 'F' as const }, stricter: false, tauHours: 6, tauIsOwn: false, tauFrom: 0, runsAlone: id === JUICE, circuitId: CIRCUIT })),
  points: [
    point('C-1', 'compressor', 'on', { ...GUARDED, minOffMin: 3 }),
    point('C-2', 'compressor', 'off', GUARDED),
    point('C-3', 'compressor', null),
    point('CF-1', 'condenser-fan', 'on', { suctionGroupId: null }),
    point('DH-1', 'defrost-heater', 'off', { circuitId: CIRCUIT }),
    point('EF-1', 'evaporator-fan', 'on', { circuitId: CIRCUIT }),
    point('LA-1', 'leak-alarm', null),
    point('LLS-1', 'liquid-line-valve', 'open', { circuitId: CIRCUIT }),
  ],
  instruments: [{ id: INSTRUMENT, name: 'T-1', kind: 'product', accuracyC: 0.5, lastCheckOn: null }],
}

const step = (id: string, after: string[] = []) => ({ id, name: id, shortest: 5, likely: 10, longest: 20, dark: true, after })

export function planOf(change: Partial<Plan> = {}): Plan {
  const points = snapshot.points.filter(item => item.hand !== null).map(item => ({ tag: item.tag, hand: item.hand!, reason: '' }))
  return {
    startsAt: isoTime(BEGAN + 3_600_000), workKind: { id: null, name: 'software update' }, steps: [step('load'), step('restart', ['load'])], rollBack: [step('old')],
    duration: { totalMean: 20, darkMean: 20, dark19in20: 26, rollBack19in20: 15 },
    points, order: inHandOrder(snapshot, points).order, cases: snapshot.cases.map(item => ({ id: item.id, touched: true, reason: '' })),
    census: [], measures: [], assumptions: [], watchDefrosts: false, note: '', ...change,
  }
}

export const opening = (change: Partial<BodyInput<'outage-opened'>> = {}) => ({ planned: true, lostAt: null, cause: '', snapshot, plan: planOf(), ...change })
export const unplanned = (lostAt: number) => opening({ planned: false, lostAt: isoTime(lostAt), cause: 'The controller went out', plan: planOf({ startsAt: null }) })

/** A reading of a case's product, °F unless said otherwise. */
export function reading(caseId: string, value: number, change: Partial<BodyInput<'reading-taken'>> = {}): BodyInput<'reading-taken'> {
  return { round: 0, caseId, value, unit: 'F', method: 'product', instrumentId: null, words: '', photos: [], ...change }
}

export const pressure = (suctionPsig: number): BodyInput<'pressure-read'> => ({ round: 0, suctionGroupId: GROUP, suctionPsig, dischargePsig: null })

/** A point put in its hand position, seen as asked. */
export function inHand(tag: string, change: Partial<BodyInput<'point-in-hand'>> = {}): BodyInput<'point-in-hand'> {
  const known = snapshot.points.find(item => item.tag === tag)
  const hand = change.hand ?? known?.hand ?? 'on'
  return { tag, hand, seen: expectedSeen(known?.kind ?? 'other', hand), value: null, until: isoTime(BEGAN + 12 * 3_600_000), ...change }
}

export const PHASES_TOLD = ['plan', 'approved', 'in-hand', 'dark', 'hand-back', 'settle', 'submitted', 'sealed'] as const
export type PhaseTold = (typeof PHASES_TOLD)[number]

export function signChecks(writer: RecordWriter, checks: readonly { id: (typeof BEFORE_CHECKS | typeof BACK_CHECKS)[number]['id'] }[]): void {
  for (const { id } of checks) writer.pass(0.1).sign(technician, 'check-signed', { check: id, outcome: 'done' })
}

/** All points of the plan, in its order. */
export function putAllInHand(writer: RecordWriter): void {
  for (const { tag } of writer.state.plan.order) writer.pass(0.5).sign(technician, 'point-in-hand', inHand(tag))
}

export function readAll(writer: RecordWriter, value: number): void {
  for (const id of [DAIRY, FISH]) writer.pass(0.1).sign(technician, 'reading-taken', reading(id, value))
}

/** Suction read at once and ten minutes later. */
export function steadySuction(writer: RecordWriter): void {
  writer.sign(technician, 'pressure-read', pressure(47))
  writer.pass(10).sign(technician, 'pressure-read', pressure(48))
}

export function returnAll(writer: RecordWriter): void {
  for (let next = handBackOrder(writer.state)[0]; next; next = handBackOrder(writer.state)[0]) writer.pass(0.5).sign(technician, 'point-in-auto', { tag: next.tag, seen: 'answers' })
}

export const submission = () => ({ statement: SUBMIT_STATEMENT, drawing: DRAWING } as const)
export const seal = (writer: RecordWriter) => ({ statement: SEAL_STATEMENT, drawing: DRAWING, size: writer.entries.length, root: logRoot(writer.entries) } as const)

const CHAPTERS: Record<PhaseTold, (writer: RecordWriter) => void> = {
  'plan': writer => void writer.sign(technician, 'outage-opened', opening()),
  'approved': (writer) => {
    writer.pass(5).sign(technician, 'plan-submitted', {})
    writer.pass(5).sign(supervisor, 'plan-approved', {})
  },
  'in-hand': writer => void writer.pass(50).sign(technician, 'in-hand-begun', {}),
  'dark': (writer) => {
    readyForDark(writer)
    writer.pass(1).sign(technician, 'went-dark', { lostAt: isoTime(writer.now) })
  },
  'hand-back': (writer) => {
    writer.pass(8)
    readAll(writer, 39)
    writer.pass(12).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
  },
  'settle': (writer) => {
    signChecks(writer, BACK_CHECKS)
    returnAll(writer)
    writer.pass(1).sign(technician, 'hand-back-closed', {})
  },
  'submitted': (writer) => {
    readAll(writer, 39)
    writer.pass(8)
    readAll(writer, 38)
    writer.files.set(DRAWING, new Uint8Array())
    writer.pass(1).sign(technician, 'submitted', submission())
  },
  'sealed': (writer) => {
    writer.pass(30).sign(supervisor, 'review-begun', {})
    writer.pass(1).sign(supervisor, 'sealed', seal(writer))
  },
}

/** In hand, with nothing missing that going dark asks for. */
export function readyForDark(writer: RecordWriter): void {
  signChecks(writer, BEFORE_CHECKS)
  putAllInHand(writer)
  readAll(writer, 37)
  steadySuction(writer)
}

/** A record that has just reached a phase. @param until the phase in which it stops */
export function storyTo(until: PhaseTold): RecordWriter {
  const writer = new RecordWriter('Mill Lane', BEGAN)
  for (const phase of PHASES_TOLD.slice(0, PHASES_TOLD.indexOf(until) + 1)) CHAPTERS[phase](writer)
  return writer
}

/** Goes on from a phase to a later one. */
export function goOn(writer: RecordWriter, after: PhaseTold, until: PhaseTold): void {
  for (const phase of PHASES_TOLD.slice(PHASES_TOLD.indexOf(after) + 1, PHASES_TOLD.indexOf(until) + 1)) CHAPTERS[phase](writer)
}

const AROUND: Surroundings = { planRefusals, handBackAfter, margin: marginAt, filesAwaited: () => [], root: null }

/** What would become of an entry if it were signed now; nothing is stored. */
export function judged<K extends EntryKind>(writer: RecordWriter, signer: TestSigner, kind: K, body: BodyInput<K>, around: Partial<Surroundings> = {}): Judgement {
  const chain = writer.state.chain[signer.device]
  const entry = {
    v: newestVersion(kind), id: uuidFor(`judged ${kind} ${JSON.stringify(body)}`), outage: writer.id, kind, body: schemaOf(kind, newestVersion(kind))!.parse(body), at: isoTime(writer.now), skew: 0,
    by: signer.id, device: signer.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null,
  } as AnyEntry
  if (signer.role === 'server') throw new Error('The server is not judged')
  return judge(writer.state, entry, { id: signer.id, role: signer.role }, { ...AROUND, ...around })
}
