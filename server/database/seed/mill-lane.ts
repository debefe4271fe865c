/** Mill Lane, a smaller store of the fictional Quillfeather Grocers: one rack at medium temperature. */
import type { PointSeed, SiteSeed } from './equipment'

const GUARDS = ['low pressure cut-out 0.8 bar', 'high pressure cut-out 25 bar', 'oil failure', 'overload']
const SELECTOR = 'hand-off-auto selector'

function compressor(number: number, capacityKw: number, ratedA: number, hand: 'on' | 'off'): PointSeed {
  return {
    tag: `K-${number}`, kind: 'compressor', name: `Compressor ${number}`, address: `1/${number}`, place: `Rack panel, selector ${number}`, means: SELECTOR, guards: GUARDS,
    rack: 'Rack A', suctionGroup: 'A medium', ratedA, capacityKw, minOffMin: 5, hand, onLoss: 'off', throughOff: true,
  }
}

function condenserFan(number: number): PointSeed {
  return {
    tag: `CF-${number}`, kind: 'condenser-fan', name: `Condenser fan ${number}`, address: `1/${4 + number}`, place: `Rack panel, selector ${4 + number}`, means: SELECTOR, guards: ['overload'],
    rack: 'Rack A', ratedA: 2.1, hand: 'on', onLoss: 'off', throughOff: true,
  }
}

function liquidValve(number: number, circuit: string, cases: string[]): PointSeed {
  return {
    tag: `LV-${number}`, kind: 'liquid-line-valve', name: `Liquid line valve, ${circuit.slice(2)}`, address: `2/${number}`, place: `Liquid header, valve ${number}`, means: 'manual lift stem',
    rack: 'Rack A', suctionGroup: 'A medium', circuit, cases, hand: 'open', onLoss: 'off',
  }
}

export const millLane: SiteSeed = {
  site: {
    code: 'Q031', name: 'Mill Lane', address: '4 Mill Lane, Thornbeck', timeZone: 'Europe/London', temperatureUnit: 'C', pressureUnit: 'bar', altitudeM: 60,
    rulebook: 'uk-england-2013', intervalMinutes: 10, paper: 'A4',
    contactName: 'Piers Hallam', contactEmail: 'mill-lane@quillfeather.example', contactPhone: '+44 1632 960131', monitoringEmail: 'monitoring@quillfeather.example',
    quietHours: [{ days: [1, 2, 3, 4, 5], start: '17:00', end: '19:00', why: 'rush hours' }],
  },
  controllers: [{
    controller: { name: 'Rack controller', place: 'Plant room, rack panel', panelVolts: 400, notes: '' },
    racks: [{
      rack: { name: 'Rack A', refrigerant: 'R-449A', highCutOutPsig: 363 },
      suctionGroups: [{ name: 'A medium', stage: 'medium', targetSuctionPsig: 43, lowCutOutPsig: 12 }],
      circuits: [
        { name: '1 dairy', suctionGroup: 'A medium', defrostKind: 'off-time', defrosts: { everyHours: 6, offset: '02:00' }, durationMin: 30, dripMin: 0 },
        { name: '2 produce', suctionGroup: 'A medium', defrostKind: 'off-time', defrosts: { everyHours: 8, offset: '03:00' }, durationMin: 30, dripMin: 0 },
        { name: '3 cold room', suctionGroup: 'A medium', defrostKind: 'electric', defrosts: { times: ['05:30', '17:30'] }, durationMin: 20, dripMin: 5 },
      ],
    }],
    cases: [
      { name: 'Dairy wall', kind: 'open-multideck', foodClass: 'chilled', usualC: 3.1, circuit: '1 dairy' },
      { name: 'Ready meals', kind: 'open-multideck', foodClass: 'chilled', usualC: 3.4, circuit: '1 dairy' },
      { name: 'Produce wall', kind: 'produce-open', foodClass: 'chilled', usualC: 4.2, circuit: '2 produce' },
      { name: 'Cold room', kind: 'walk-in-cooler', foodClass: 'chilled-storage', usualC: 2.6, circuit: '3 cold room' },
      { name: 'Freezer island', kind: 'open-coffin', foodClass: 'quick-frozen', usualC: -20, runsAlone: true, circuit: null },
    ],
    points: [
      compressor(1, 18, 24, 'on'),
      compressor(2, 18, 24, 'off'),
      compressor(3, 12, 17, 'off'),
      condenserFan(1),
      condenserFan(2),
      liquidValve(1, '1 dairy', ['Dairy wall', 'Ready meals']),
      liquidValve(2, '2 produce', ['Produce wall']),
      liquidValve(3, '3 cold room', ['Cold room']),
      {
        tag: 'EF-3', kind: 'evaporator-fan', name: 'Evaporator fans, cold room', address: '2/4', place: 'Rack panel, relay 4', means: 'output relay, hand lever', guards: ['overload'],
        rack: 'Rack A', suctionGroup: 'A medium', circuit: '3 cold room', cases: ['Cold room'], ratedA: 1.8, hand: 'on', onLoss: 'on',
      },
      {
        tag: 'DH-3', kind: 'defrost-heater', name: 'Defrost heater, cold room', address: '2/5', place: 'Rack panel, contactor 5', means: 'contactor selector', guards: ['termination thermostat', 'klixon'],
        rack: 'Rack A', suctionGroup: 'A medium', circuit: '3 cold room', cases: ['Cold room'], ratedA: 8, hand: 'off', onLoss: 'off',
      },
      { tag: 'LEAK-1', kind: 'leak-alarm', name: 'Leak alarm, plant room', address: '2/6', place: 'Plant room door', means: 'none: stays in service', hand: 'as-found', onLoss: 'on' },
    ],
  }],
  instruments: [
    { name: 'Probe 1', kind: 'product', serial: 'QF-1121', accuracyC: 0.5, checkedDaysAgo: 20 },
    { name: 'Infrared', kind: 'infrared', serial: 'QF-3007', accuracyC: 2, checkedDaysAgo: 48 },
  ],
}
