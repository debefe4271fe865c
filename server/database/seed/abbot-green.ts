/** Abbot Green, a smaller store of the fictional Quillfeather Grocers: one carbon dioxide rack of two stages. */
import type { PointSeed, SiteSeed } from './equipment'

const SELECTOR = 'hand-off-auto selector'

function compressor(tag: string, stage: 'medium' | 'low', capacityKw: number, ratedA: number, hand: 'on' | 'off', selector: number): PointSeed {
  return {
    tag, kind: 'compressor', name: `Compressor ${tag.slice(-1)}, ${stage} stage`, address: `DO-${selector}`, place: `Rack panel, selector ${selector}`, means: SELECTOR,
    guards: ['low pressure cut-out', 'high pressure cut-out', 'oil failure', 'overload'],
    rack: 'Rack A', suctionGroup: stage === 'medium' ? 'Medium stage' : 'Low stage', ratedA, capacityKw, minOffMin: 5, hand, onLoss: 'off', throughOff: true,
  }
}

function expansionValve(number: number, circuit: string, words: string, suctionGroup: string, cases: string[], hand: PointSeed['hand']): PointSeed {
  return {
    tag: `EV-${number}`, kind: 'expansion-valve', name: `Expansion valve, ${words}`, address: `AO-${number}`, place: `Case controller ${number}, under the kick plate`, means: 'service tool, fixed opening',
    rack: 'Rack A', suctionGroup, circuit, cases, hand, onLoss: 'off',
  }
}

export const abbotGreen: SiteSeed = {
  site: {
    code: 'Q008', name: 'Abbot Green', address: '77 Abbot Street, Carrow Vale, Victoria', timeZone: 'Australia/Melbourne', temperatureUnit: 'C', pressureUnit: 'kPa', altitudeM: 35,
    rulebook: 'au-3-2-2', intervalMinutes: 10, paper: 'A4',
    contactName: 'Tamsin Wray', contactEmail: 'abbot-green@quillfeather.example', contactPhone: '+61 3 5550 0108', monitoringEmail: 'monitoring@quillfeather.example',
    quietHours: [],
  },
  controllers: [{
    controller: { name: 'Rack controller', place: 'Roof plant room, rack panel', panelVolts: 400, notes: 'Carbon dioxide: standstill pressure rises with everything off.' },
    racks: [{
      rack: { name: 'Rack A', refrigerant: 'R-744', highCutOutPsig: 1595, warmestC: 34, reliefValves: ['RV-2 flash tank 60', 'RV-1 high side 120'] },
      suctionGroups: [
        { name: 'Medium stage', stage: 'medium', targetSuctionPsig: 414, lowCutOutPsig: 348 },
        { name: 'Low stage', stage: 'low', targetSuctionPsig: 193, lowCutOutPsig: 145 },
      ],
      circuits: [
        { name: '1 fish', suctionGroup: 'Medium stage', defrostKind: 'off-time', defrosts: { everyHours: 6, offset: '01:00' }, durationMin: 25, dripMin: 0 },
        { name: '2 dairy', suctionGroup: 'Medium stage', defrostKind: 'off-time', defrosts: { everyHours: 6, offset: '02:00' }, durationMin: 30, dripMin: 0 },
        { name: '3 freezers', suctionGroup: 'Low stage', defrostKind: 'electric', defrosts: { times: ['04:00'] }, durationMin: 30, dripMin: 10 },
      ],
    }],
    cases: [
      { name: 'Fish service', kind: 'fish-counter', foodClass: 'tcs', usualC: 0.3, circuit: '1 fish' },
      { name: 'Dairy wall', kind: 'open-multideck', foodClass: 'tcs', usualC: 2.1, circuit: '2 dairy' },
      { name: 'Dessert doors', kind: 'glass-door-chilled', foodClass: 'tcs', usualC: 2.8, circuit: '2 dairy' },
      { name: 'Freezer doors', kind: 'glass-door-frozen', foodClass: 'frozen', usualC: -21, circuit: '3 freezers' },
    ],
    points: [
      compressor('MC-1', 'medium', 28, 31, 'on', 1),
      compressor('MC-2', 'medium', 28, 31, 'off', 2),
      compressor('LC-1', 'low', 9, 12, 'on', 3),
      compressor('LC-2', 'low', 9, 12, 'off', 4),
      { tag: 'GF-1', kind: 'condenser-fan', name: 'Gas cooler fans', address: 'AO-9', place: 'Rack panel, speed dial', means: 'speed dial', guards: ['overload'], rack: 'Rack A', ratedA: 6, hand: { percent: 70 }, onLoss: 'off' },
      expansionValve(1, '1 fish', 'fish', 'Medium stage', ['Fish service'], { percent: 40 }),
      expansionValve(2, '2 dairy', 'dairy', 'Medium stage', ['Dairy wall', 'Dessert doors'], { percent: 45 }),
      expansionValve(3, '3 freezers', 'freezers', 'Low stage', ['Freezer doors'], { percent: 35 }),
      { tag: 'HPV-1', kind: 'high-pressure-valve', name: 'High-pressure valve', address: 'AO-7', place: 'Rack, gas cooler return', means: 'none: own controller', rack: 'Rack A', hand: 'as-found', onLoss: 'holds' },
      { tag: 'FGV-1', kind: 'flash-gas-valve', name: 'Flash-gas valve', address: 'AO-8', place: 'Rack, receiver', means: 'none: own controller', rack: 'Rack A', hand: 'as-found', onLoss: 'holds' },
      {
        tag: 'DH-3', kind: 'defrost-heater', name: 'Defrost heater, freezers', address: 'DO-9', place: 'Rack panel, contactor 9', means: 'contactor selector', guards: ['termination thermostat', 'klixon'],
        rack: 'Rack A', suctionGroup: 'Low stage', circuit: '3 freezers', cases: ['Freezer doors'], ratedA: 17, hand: 'off', onLoss: 'off',
      },
      { tag: 'LEAK-1', kind: 'leak-alarm', name: 'Carbon dioxide alarm, plant room', address: 'DO-10', place: 'Plant room door', means: 'none: stays in service', hand: 'as-found', onLoss: 'on' },
    ],
  }],
  instruments: [
    { name: 'Probe 1', kind: 'product', serial: 'QF-1133', accuracyC: 0.5, checkedDaysAgo: 12 },
    { name: 'Probe 2', kind: 'product', serial: 'QF-1134', accuracyC: 0.5, checkedDaysAgo: 12 },
  ],
}
