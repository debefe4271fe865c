/** A whole outage of our own at Quarry Street, up to any phase. The numbers are invented. */
import { limitFor, rulebookById } from '../../server/utils/holding'
import { inHandOrder, proposePoints, handBackOrder } from '../../server/utils/order/for-outage'
import { BACK_CHECKS, BEFORE_CHECKS } from '../../shared/record/checks'
import { isoTime } from '../../shared/record/entry'
import { SEAL_STATEMENT, SUBMIT_STATEMENT } from '../../shared/record/kinds/review'
import { logRoot } from '../../shared/record/merkle'
import type { Plan } from '../../shared/record/plan'
import { expectedSeen, inUnit, nextRound, watchedCases } from '../../shared/record/select'
import type { Snapshot, SnapshotCase, SnapshotPoint } from '../../shared/record/snapshot'
import { PLAIN_HOLDING } from '../../shared/schemas/equipment'
import type { CaseKind } from '../../shared/schemas/case-kinds'
import type { HandPosition, PointKind } from '../../shared/schemas/point-kinds'
import { drawnSignature } from './png'
import { RecordWriter, supervisor, technician, uuidFor } from './record'

export const STAGES_OF_A_RECORD = ['plan', 'approved', 'in-hand', 'dark', 'hand-back', 'settle', 'submitted', 'sealed'] as const
export type RecordStage = (typeof STAGES_OF_A_RECORD)[number]

export interface Scenario {
  /** the phase in which it stops */
  until?: RecordStage
  site?: Partial<Snapshot['site']>
  /** id of a rulebook with the class `tcs` or `chilled` */
  rulebook?: string
  /** tags of points that cannot be put in hand */
  excuse?: readonly string[]
  /** odd entries to sign as each phase is reached */
  during?: Partial<Record<RecordStage, (writer: RecordWriter) => void>>
  /** minutes without control between rounds; each adds a round */
  roundsAt?: readonly number[]
}

const RACK = uuidFor('rack A')
const GROUP = uuidFor('suction group MT')
const circuit = (name: string) => uuidFor(`circuit ${name}`)
export const caseId = (name: string) => uuidFor(`case ${name}`)

/** Name, kind, circuit, usual °C, and how much it warms without control, K an hour. */
const CASES: [string, CaseKind, string, number, number][] = [
  ['Dairy wall 1–3', 'open-multideck', 'A1', 2.2, 4.1],
  ['Dairy wall 4–7', 'open-multideck', 'A1', 2.8, 4.9],
  ['Fish service', 'fish-counter', 'A2', 1.3, 4.4],
  ['Meat 1–3', 'open-multideck', 'A2', 1.1, 3.2],
  ['Deli island', 'open-island', 'A3', 2.0, 3.6],
  ['Salad bar', 'service-counter', 'A3', 2.6, 2.9],
  ['Cheese service', 'service-counter', 'A3', 2.4, 2.2],
  ['Produce wall', 'produce-open', 'A3', 3.1, 2.4],
  ['Dairy cooler', 'walk-in-cooler', 'A1', 2.0, 0.7],
  ['Meat cooler', 'walk-in-cooler', 'A2', 0.9, 0.6],
  ['Juice doors', 'glass-door-chilled', 'A3', 2.9, 1.1],
]

function point(tag: string, kind: PointKind, name: string, more: Partial<SnapshotPoint> = {}): SnapshotPoint {
  return { tag, kind, name, address: '', place: 'Machine room, panel A', means: 'selector switch', guards: [], rackId: RACK, suctionGroupId: null, circuitId: null, caseIds: [], drives: null, ratedA: null, capacityKw: null, minOffMin: null, hand: null, onLoss: 'off', throughOff: false, ...more }
}

const GUARDS = ['high pressure', 'low pressure', 'overload']
const compressor = (number: number, hand: HandPosition) => point(`C-${number}`, 'compressor', `compressor ${number}`, { suctionGroupId: GROUP, guards: GUARDS, ratedA: 22, capacityKw: 18, minOffMin: 5, hand, throughOff: true })
const onCircuit = (name: string, cases: string) => [
  point(`EF-${name}`, 'evaporator-fan', `evaporator fans, ${cases}`, { circuitId: circuit(name), suctionGroupId: GROUP, hand: 'on', place: 'Panel A2' }),
  point(`LLS-${name}`, 'liquid-line-valve', `liquid line valve, ${cases}`, { circuitId: circuit(name), suctionGroupId: GROUP, hand: 'open', place: 'Panel A2' }),
  point(`DH-${name}`, 'defrost-heater', `defrost heater, ${cases}`, { circuitId: circuit(name), suctionGroupId: GROUP, hand: 'off', place: 'Panel A2' }),
]
const POINTS: SnapshotPoint[] = [
  compressor(1, 'on'), compressor(2, 'on'), compressor(3, 'off'), compressor(4, 'off'),
  ...[1, 2, 3].map(number => point(`CF-${number}`, 'condenser-fan', `condenser fan ${number}`, { place: 'Roof', hand: number < 3 ? 'on' : 'off' })),
  ...onCircuit('A1', 'dairy'), ...onCircuit('A2', 'fish and meat'), ...onCircuit('A3', 'deli'),
  point('ASH-1', 'anti-sweat-heater', 'anti-sweat heaters, doors', { hand: 'on', place: 'Panel A2' }),
  point('LT-1', 'light', 'case lights', { hand: 'on', place: 'Panel A2' }),
]

export function quarryStreet(site: Scenario['site'] = {}, rulebookId = 'us-food-code-2022'): Snapshot {
  const { id, version, name } = rulebookById(rulebookId)!
  const rulebook = { id, version, name }
  const foodClass = id === 'uk-england-2013' ? 'chilled' : 'tcs'
  const cases = CASES.map(([name, kind, on, usualC]): SnapshotCase => ({ id: caseId(name), name, kind, foodClass, usualC, limit: limitFor(rulebook.id, foodClass), stricter: false, tauHours: 6, tauIsOwn: false, tauFrom: 0, runsAlone: name === 'Juice doors', circuitId: circuit(on) }))
  return {
    site: { id: uuidFor('site Quarry Street'), code: 'Q027', name: 'Quarry Street', address: '27 Quarry Street', timeZone: 'America/Chicago', temperatureUnit: 'F', pressureUnit: 'psig', altitudeM: 180, intervalMinutes: 10, paper: 'Letter', contactName: 'Piet Harrow', contactPhone: '555 0127', quietHours: [], holding: PLAIN_HOLDING, instrumentCheckDays: 90, ...site },
    controller: { id: uuidFor('controller A'), name: 'rack A controller', place: 'Machine room', panelVolts: 460 },
    rulebook,
    racks: [{ id: RACK, name: 'Rack A', refrigerant: 'R-448A', highCutOutPsig: 395, warmestC: null, reliefValves: [] }],
    suctionGroups: [{ id: GROUP, rackId: RACK, name: 'medium temperature', stage: 'medium', targetSuctionPsig: 48, lowCutOutPsig: 20 }],
    circuits: ['A1', 'A2', 'A3'].map(name => ({ id: circuit(name), rackId: RACK, suctionGroupId: GROUP, name, defrostKind: 'electric', defrosts: null, durationMin: 20, dripMin: 5 })),
    cases,
    points: POINTS,
    instruments: [{ id: uuidFor('instrument T-4'), name: 'T-4', kind: 'product', accuracyC: 0.5, lastCheckOn: '2026-02-16' }],
  }
}

export function planOf(snapshot: Snapshot, startsAt: number): Plan {
  const points = proposePoints(snapshot).filter(planned => planned.hand !== 'as-found')
  const step = (id: string, name: string, likely: number, dark: boolean, after: string[]) => ({ id, name, shortest: likely * 0.7, likely, longest: likely * 1.8, dark, after })
  return {
    startsAt: isoTime(startsAt), workKind: { id: uuidFor('work software update'), name: 'software update' },
    steps: [step('load', 'Load the new software', 14, true, []), step('restart', 'Restart the controller', 6, true, ['load']), step('look', 'Look over the settings', 5, true, ['restart'])],
    rollBack: [step('old', 'Put the old software back', 12, true, [])],
    duration: { totalMean: 25, darkMean: 25, dark19in20: 34, rollBack19in20: 17 },
    points, order: inHandOrder(snapshot, points).order,
    cases: snapshot.cases.map(item => ({ id: item.id, touched: !item.runsAlone, reason: item.runsAlone ? 'its own controller runs on' : '' })),
    census: [], measures: [{ kind: 'night-covers', caseIds: [caseId('Dairy wall 1–3')], factor: 1.5, words: '' }], assumptions: [], watchDefrosts: false, note: 'Doors shut by the store from 01:45.',
  }
}

/** Product temperature of a case, K above usual, so many minutes after control was lost. */
function warming(perHour: number, minutes: number, backAfter: number): number {
  const rise = 0.1 + perHour * Math.max(0, Math.min(minutes, backAfter)) / 60
  return minutes <= backAfter ? rise : rise * Math.exp(-(minutes - backAfter) / 40)
}

/** A round over all watched cases and the rack, ten seconds a case. */
export function takeRound(writer: RecordWriter, minutes: number, backAfter = 23.2): void {
  const round = nextRound(writer.state)
  const unit = writer.state.snapshot.site.temperatureUnit
  for (const item of watchedCases(writer.state).filter(watched => !watched.empty)) {
    const [, , , usual, perHour] = CASES.find(([name]) => caseId(name) === item.id)!
    writer.pass(1 / 6)
    writer.sign(technician, 'reading-taken', { round, caseId: item.id, value: Math.round(inUnit(usual + warming(perHour, minutes, backAfter), unit) * 10) / 10, unit, method: 'product', instrumentId: uuidFor('instrument T-4') })
  }
  writer.sign(technician, 'pressure-read', { round, suctionGroupId: GROUP, suctionPsig: 47, dischargePsig: 228 })
}

function putInHand(writer: RecordWriter, excuse: readonly string[]): void {
  for (const { tag } of writer.state.plan.order) {
    if (excuse.includes(tag)) {
      writer.pass(0.8).sign(technician, 'point-excused', { tag, reason: 'switch broken', measure: 'left as it is' })
      continue
    }
    const { kind } = writer.state.points[tag]!
    const { hand } = writer.state.plan.points.find(planned => planned.tag === tag)!
    const running = hand === 'on' && (kind === 'compressor' || kind === 'condenser-fan')
    writer.pass(0.8).sign(technician, 'point-in-hand', { tag, hand, seen: expectedSeen(kind, hand), value: running ? { number: kind === 'compressor' ? 18.4 : 3.1, unit: 'A' } : kind === 'defrost-heater' ? { number: 0, unit: 'A' } : null, until: isoTime(writer.now + 4 * 3_600_000) })
  }
}

const STEPS: Record<RecordStage, (writer: RecordWriter, scenario: Scenario) => void> = {
  'plan': (writer, { site, rulebook }) => {
    const snapshot = quarryStreet(site, rulebook)
    writer.sign(technician, 'outage-opened', { planned: true, lostAt: null, cause: '', snapshot, plan: planOf(snapshot, writer.now + 16 * 3_600_000) })
    writer.pass(4).sign(technician, 'plan-submitted', { note: '' })
  },
  'approved': writer => void writer.pass(45).sign(supervisor, 'plan-approved', { note: '' }),
  'in-hand': (writer, { excuse = [] }) => {
    writer.pass(15 * 60).sign(technician, 'in-hand-begun', {})
    for (const check of BEFORE_CHECKS) writer.pass(1.2).sign(technician, 'check-signed', { check: check.id, outcome: 'done', words: check.id === 'settings-saved' ? 'file read back' : '' })
    putInHand(writer, excuse)
    takeRound(writer, 0)
    writer.pass(8.6)
    takeRound(writer, 0)
  },
  'dark': (writer, { roundsAt = [5, 11, 16, 20] }) => {
    writer.pass(1).sign(technician, 'went-dark', { lostAt: isoTime(writer.now) })
    const lost = writer.now
    writer.sign(technician, 'step-ticked', { step: 'load', state: 'begun' })
    for (const minutes of roundsAt) {
      writer.now = lost + minutes * 60_000
      takeRound(writer, minutes)
    }
    writer.sign(technician, 'step-ticked', { step: 'load', state: 'done' })
  },
  'hand-back': (writer) => {
    writer.now = Math.max(writer.now + 20_000, writer.state.darks.at(-1)!.from + 23 * 60_000 + 10_000)
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    for (const check of BACK_CHECKS) writer.pass(0.4).sign(technician, 'check-signed', { check: check.id, outcome: 'done' })
  },
  'settle': (writer) => {
    const lost = writer.state.darks[0]!.from
    for (let next = handBackOrder(writer.state)[0]; next; next = handBackOrder(writer.state)[0]) {
      const sure = writer.state.points[next.tag]!.kind !== 'defrost-heater'
      writer.pass(0.6).sign(technician, 'point-in-auto', { tag: next.tag, seen: sure ? 'answers' : 'not-called' })
      if (next.tag === 'CF-1') takeRound(writer, (writer.now - lost) / 60_000)
      if (!sure) writer.pass(0.4).sign(technician, 'point-proven', { tag: next.tag, words: 'called by hand from the controller, 11 A' })
    }
    writer.pass(1).sign(technician, 'hand-back-closed', {})
  },
  'submitted': (writer) => {
    const lost = writer.state.darks[0]!.from
    for (const minutes of [7, 7.5]) {
      writer.pass(minutes)
      takeRound(writer, (writer.now - lost) / 60_000)
    }
    writer.pass(2).sign(technician, 'submitted', { statement: SUBMIT_STATEMENT, drawing: writer.keep(drawnSignature(0)) })
  },
  'sealed': (writer) => {
    writer.pass(270).sign(supervisor, 'note-added', { words: 'Read through in the morning.' })
    // Naming a signer is an entry too, so the seal counts what stands before it.
    writer.sign(supervisor, 'sealed', { statement: SEAL_STATEMENT, drawing: writer.keep(drawnSignature(1)), size: writer.state.size, root: logRoot(writer.entries) })
  },
}

/** A record up to a phase, with what a scenario adds on the way. */
export function buildRecord(scenario: Scenario = {}): RecordWriter {
  const writer = new RecordWriter('Quarry Street', Date.UTC(2026, 2, 2, 16, 10))
  for (const stage of STAGES_OF_A_RECORD) {
    STEPS[stage](writer, scenario)
    scenario.during?.[stage]?.(writer)
    if (stage === (scenario.until ?? 'sealed')) break
  }
  return writer
}
