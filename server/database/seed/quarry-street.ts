/**
 * Quarry Street, a store of the fictional Quillfeather Grocers: one controller with a medium- and a
 * low-temperature rack. Its first 26 points are those of docs/example-points.csv, in that order.
 */
import type { ControllerSeed, PointSeed, RackSeed, SiteSeed } from './equipment'

const MEDIUM_GUARDS = ['low pressure cut-out 12 psig', 'high pressure cut-out 395 psig', 'oil failure', 'overload']
const LOW_GUARDS = ['low pressure cut-out 1 psig', 'high pressure cut-out 395 psig', 'oil failure', 'overload']
const SELECTOR = 'hand-off-auto selector'
const JUMPER = 'output relay, hand lever'
const HEATER_GUARDS = ['termination thermostat', 'klixon']

function compressor(number: number, more: Partial<PointSeed> & Pick<PointSeed, 'place' | 'ratedA' | 'capacityKw' | 'hand'>): PointSeed {
  const low = number > 4
  return {
    tag: `C-${number}`, kind: 'compressor', name: `Compressor ${number}`, address: `B1.R${number}`,
    means: SELECTOR, guards: low ? LOW_GUARDS : MEDIUM_GUARDS, rack: low ? 'Rack B' : 'Rack A', suctionGroup: low ? 'B low' : 'A medium',
    minOffMin: 5, onLoss: 'off', throughOff: true, ...more,
  }
}

function condenserFan(number: number, place: string): PointSeed {
  return {
    tag: `CF-${number}`, kind: 'condenser-fan', name: `Condenser fan ${number}`, address: `B2.R${number}`, place, means: SELECTOR, guards: ['overload'],
    rack: number > 2 ? 'Rack B' : 'Rack A', ratedA: 3.4, hand: 'on', onLoss: 'off', throughOff: true,
  }
}

function liquidValve(circuit: string, words: string, address: string, cases: string[]): PointSeed {
  const letter = circuit.slice(0, 1)
  return {
    tag: `LLS-${circuit.slice(0, 2)}`, kind: 'liquid-line-valve', name: `Liquid line valve, ${words}`, address,
    place: `Liquid header, rack ${letter}, valve ${circuit.slice(1, 2)}`, means: 'manual lift stem', guards: [],
    rack: `Rack ${letter}`, suctionGroup: letter === 'A' ? 'A medium' : 'B low', circuit, cases, ratedA: 0.3, hand: 'open', onLoss: 'off',
  }
}

function evaporatorFans(circuit: string, words: string, address: string, cases: string[]): PointSeed {
  const letter = circuit.slice(0, 1)
  return {
    tag: `EF-${circuit.slice(0, 2)}`, kind: 'evaporator-fan', name: `Evaporator fans, ${words}`, address, place: `Panel C, relay row 1, ${circuit.slice(0, 2)}`,
    means: JUMPER, guards: ['overload'], rack: `Rack ${letter}`, suctionGroup: letter === 'A' ? 'A medium' : 'B low', circuit, cases, ratedA: 4.2, hand: 'on', onLoss: 'on',
  }
}

function defrostHeater(circuit: string, words: string, address: string, cases: string[], ratedA: number): PointSeed {
  const letter = circuit.slice(0, 1)
  return {
    tag: `DH-${circuit.slice(0, 2)}`, kind: 'defrost-heater', name: `Defrost heater, ${words}`, address, place: `Panel C, contactor row 3, ${circuit.slice(0, 2)}`,
    means: 'contactor selector', guards: HEATER_GUARDS, rack: `Rack ${letter}`, suctionGroup: letter === 'A' ? 'A medium' : 'B low', circuit, cases, ratedA, hand: 'off', onLoss: 'off',
  }
}

/** The points of docs/example-points.csv; only `drives` has no column there. */
export const EXAMPLE_POINTS: PointSeed[] = [
  compressor(1, { place: 'Panel A, selector 3, middle row', ratedA: 42, capacityKw: 36, hand: 'on' }),
  compressor(2, { place: 'Panel A, selector 4, middle row', ratedA: 34, capacityKw: 30, hand: 'on' }),
  compressor(3, { place: 'Panel A, selector 5, middle row', ratedA: 34, capacityKw: 30, hand: 'off' }),
  compressor(4, { place: 'Panel A, selector 6, middle row', ratedA: 25, capacityKw: 22, hand: 'off' }),
  compressor(5, { place: 'Panel B, selector 1, middle row', ratedA: 27, capacityKw: 14, hand: 'on' }),
  compressor(6, { place: 'Panel B, selector 2, middle row', ratedA: 27, capacityKw: 14, hand: 'off' }),
  compressor(7, { place: 'Panel B, selector 3, middle row', ratedA: 19, capacityKw: 9.5, hand: 'off' }),
  {
    tag: 'DR-1', kind: 'drive', name: 'Drive of compressor 1', address: 'B1.A1', place: 'Panel A, drive keypad, top left', means: 'keypad, local speed', guards: ['drive trip'],
    rack: 'Rack A', suctionGroup: 'A medium', drives: 'C-1', ratedA: 45, hand: { hz: 60 }, onLoss: 'off',
  },
  condenserFan(1, 'Panel A, selector 1, top row'),
  condenserFan(2, 'Panel A, selector 2, top row'),
  condenserFan(3, 'Panel B, selector 4, top row'),
  condenserFan(4, 'Panel B, selector 5, top row'),
  liquidValve('A1 produce', 'produce', 'B3.R1', ['Produce 1–6', 'Juice doors 8']),
  liquidValve('A2 deli and fish', 'deli and fish', 'B3.R2', ['Fish service', 'Deli island 2', 'Deli service 3']),
  liquidValve('A3 dairy', 'dairy', 'B3.R3', ['Dairy wall 1–3', 'Dairy wall 4–7']),
  liquidValve('A4 meat', 'meat', 'B3.R4', ['Meat 1–3', 'Walk-in cooler']),
  liquidValve('B1 freezer doors', 'freezer doors', 'B3.R5', ['Freezer doors 9']),
  liquidValve('B2 walk-in freezer', 'walk-in freezer', 'B3.R6', ['Walk-in freezer']),
  evaporatorFans('A4 meat', 'meat', 'B4.R1', ['Meat 1–3', 'Walk-in cooler']),
  evaporatorFans('B1 freezer doors', 'freezer doors', 'B4.R2', ['Freezer doors 9']),
  evaporatorFans('B2 walk-in freezer', 'walk-in freezer', 'B4.R3', ['Walk-in freezer']),
  defrostHeater('A4 meat', 'meat', 'B4.R4', ['Meat 1–3'], 12.5),
  defrostHeater('B1 freezer doors', 'freezer doors', 'B4.R5', ['Freezer doors 9'], 21),
  defrostHeater('B2 walk-in freezer', 'walk-in freezer', 'B4.R6', ['Walk-in freezer'], 18),
  { tag: 'LT-1', kind: 'light', name: 'Case lights, sales floor', address: 'B5.R1', place: 'Panel C, selector 1, bottom row', means: SELECTOR, ratedA: 16, hand: 'on', onLoss: 'on', throughOff: true },
  { tag: 'LEAK-1', kind: 'leak-alarm', name: 'Leak alarm, machinery room', address: 'B5.R2', place: 'Machinery room door, alarm panel', means: 'none: stays in service', hand: 'as-found', onLoss: 'on' },
]

const MORE_POINTS: PointSeed[] = [
  {
    tag: 'AS-B1', kind: 'anti-sweat-heater', name: 'Door heaters, freezer doors', address: 'B5.R3', place: 'Panel C, selector 2, bottom row', means: SELECTOR, guards: ['overload'],
    rack: 'Rack B', suctionGroup: 'B low', circuit: 'B1 freezer doors', cases: ['Freezer doors 9'], ratedA: 9, hand: 'on', onLoss: 'on', throughOff: true,
  },
  { tag: 'MRV-1', kind: 'machinery-room-ventilation', name: 'Machinery room fan', address: 'B5.R4', place: 'Machinery room door, switch outside', means: 'wall switch', guards: ['overload'], ratedA: 5.5, hand: 'on', onLoss: 'on' },
  { tag: 'EL-1', kind: 'egress-light', name: 'Egress light, machinery room', address: 'B5.R5', place: 'Machinery room door, switch inside', means: 'wall switch', ratedA: 0.6, hand: 'on', onLoss: 'on' },
  { tag: 'TRAP-1', kind: 'person-trapped-alarm', name: 'Person-trapped alarm, walk-in freezer', address: 'B5.R6', place: 'Walk-in freezer, inside the door', means: 'none: stays in service', cases: ['Walk-in freezer'], hand: 'as-found', onLoss: 'on' },
]

const RACKS: RackSeed[] = [
  {
    rack: { name: 'Rack A', refrigerant: 'R-448A', highCutOutPsig: 395 },
    suctionGroups: [{ name: 'A medium', stage: 'medium', targetSuctionPsig: 44, lowCutOutPsig: 12 }],
    circuits: [
      { name: 'A1 produce', suctionGroup: 'A medium', defrostKind: 'off-time', defrosts: { everyHours: 6, offset: '00:15' }, durationMin: 30, dripMin: 0 },
      { name: 'A2 deli and fish', suctionGroup: 'A medium', defrostKind: 'off-time', defrosts: { everyHours: 6, offset: '01:30' }, durationMin: 35, dripMin: 0 },
      { name: 'A3 dairy', suctionGroup: 'A medium', defrostKind: 'off-time', defrosts: { times: ['04:30', '10:30', '16:30', '22:30'] }, durationMin: 40, dripMin: 0 },
      { name: 'A4 meat', suctionGroup: 'A medium', defrostKind: 'electric', defrosts: { times: ['05:00', '13:00', '21:00'] }, durationMin: 25, dripMin: 5 },
    ],
  },
  {
    rack: { name: 'Rack B', refrigerant: 'R-448A', highCutOutPsig: 395 },
    suctionGroups: [{ name: 'B low', stage: 'low', targetSuctionPsig: 8, lowCutOutPsig: 1 }],
    circuits: [
      { name: 'B1 freezer doors', suctionGroup: 'B low', defrostKind: 'electric', defrosts: { times: ['23:00'] }, durationMin: 40, dripMin: 10 },
      { name: 'B2 walk-in freezer', suctionGroup: 'B low', defrostKind: 'electric', defrosts: { times: ['06:00', '18:00'] }, durationMin: 30, dripMin: 10 },
    ],
  },
]

const CASES: ControllerSeed['cases'] = [
  { name: 'Dairy wall 1–3', kind: 'open-multideck', foodClass: 'tcs', usualC: 1.6, tauHours: 3.6, circuit: 'A3 dairy' },
  { name: 'Dairy wall 4–7', kind: 'open-multideck', foodClass: 'tcs', usualC: 1.8, circuit: 'A3 dairy' },
  { name: 'Deli island 2', kind: 'open-island', foodClass: 'tcs', usualC: 0.8, circuit: 'A2 deli and fish' },
  { name: 'Deli service 3', kind: 'service-counter', foodClass: 'tcs', usualC: 1.2, circuit: 'A2 deli and fish' },
  { name: 'Fish service', kind: 'fish-counter', foodClass: 'tcs', usualC: 0.2, circuit: 'A2 deli and fish' },
  { name: 'Freezer doors 9', kind: 'glass-door-frozen', foodClass: 'frozen', usualC: -21, circuit: 'B1 freezer doors' },
  { name: 'Juice doors 8', kind: 'glass-door-chilled', foodClass: 'tcs', usualC: 2.2, circuit: 'A1 produce' },
  { name: 'Meat 1–3', kind: 'open-multideck', foodClass: 'tcs', usualC: 0.4, limitStricter: 40, circuit: 'A4 meat' },
  { name: 'Produce 1–6', kind: 'produce-open', foodClass: 'tcs', usualC: 2.4, circuit: 'A1 produce' },
  { name: 'Walk-in cooler', kind: 'walk-in-cooler', foodClass: 'tcs', usualC: 1.7, circuit: 'A4 meat' },
  { name: 'Walk-in freezer', kind: 'walk-in-freezer', foodClass: 'frozen', usualC: -22, circuit: 'B2 walk-in freezer' },
]

export const quarryStreet: SiteSeed = {
  site: {
    code: 'Q027', name: 'Quarry Street', address: '218 Quarry Street, Millbrook, Illinois', timeZone: 'America/Chicago', temperatureUnit: 'F', pressureUnit: 'psig', altitudeM: 180,
    rulebook: 'us-food-code-2022', intervalMinutes: 10, paper: 'Letter',
    contactName: 'Odalys Brandt', contactEmail: 'quarry-street@quillfeather.example', contactPhone: '+1 555 0127', monitoringEmail: 'monitoring@quillfeather.example',
    quietHours: [
      { days: [1, 2, 3, 4, 5, 6, 7], start: '16:00', end: '20:00', why: 'rush hours' },
      { days: [2, 5], start: '05:30', end: '07:00', why: 'frozen delivery' },
    ],
  },
  controllers: [{
    controller: { name: 'Rack controller', place: 'Machinery room, panel A, behind the left door', panelVolts: 480, notes: 'Serves both racks. Selectors of rack B are in panel B, across the aisle.' },
    racks: RACKS,
    cases: CASES,
    points: [...EXAMPLE_POINTS, ...MORE_POINTS],
  }],
  instruments: [
    { name: 'Probe 1', kind: 'product', serial: 'QF-1107', accuracyC: 0.5, checkedDaysAgo: 34 },
    { name: 'Probe 2', kind: 'product', serial: 'QF-1108', accuracyC: 0.5, checkedDaysAgo: 34 },
    { name: 'Air logger', kind: 'air', serial: 'QF-2041', accuracyC: 1, checkedDaysAgo: 90 },
    { name: 'Infrared', kind: 'infrared', serial: 'QF-3002', accuracyC: 2, checkedDaysAgo: 61 },
  ],
}
