// The file format and the demo are this project's own; no published source.
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { readPointList } from '~~/shared/import/points'
import { landPoints, previewOf } from '~~/server/utils/equipment/land-points'
import { quarryStreetView } from './site'

const example = readFileSync(new URL('../../../docs/example-points.csv', import.meta.url), 'utf8')

function land(text: string, withPoints = true) {
  const site = quarryStreetView({ withPoints })
  const controllerId = site.controllers[0]!.id
  const { landings, faults } = landPoints(readPointList(text), site, controllerId)
  return { landings, faults, preview: previewOf(landings, faults, site, controllerId) }
}

describe('the example of the documentation', () => {
  it('lands 26 new points in a controller without any', () => {
    const { faults, preview } = land(example, false)
    expect(faults).toEqual([])
    expect(preview).toMatchObject({ counts: { new: 26, changed: 0, unchanged: 0 }, untouched: 0 })
  })

  it('changes nothing in the demo, which holds the same points', () => {
    const { faults, preview } = land(example)
    expect(faults).toEqual([])
    expect(preview.rows.flatMap(row => row.changes)).toEqual([])
    expect(preview).toMatchObject({ counts: { new: 0, changed: 0, unchanged: 26 }, untouched: 4 })
  })
})

describe('landing', () => {
  it('updates by tag in whatever letters, says what changed, and leaves alone what the file has no column for', () => {
    const { landings, preview } = land('tag,kind,name,hand,guards\nc-3,compressor,Compressor 3,on,"overload; oil failure"')
    expect(preview.rows).toMatchObject([{ row: 2, tag: 'C-3', outcome: 'changed', changes: [
      { column: 'guards', from: 'low pressure cut-out 12 psig; high pressure cut-out 395 psig; oil failure; overload', to: 'overload; oil failure' },
      { column: 'hand', from: 'off', to: 'on' },
    ] }])
    expect(landings[0]!.point).toMatchObject({ tag: 'C-3', capacityKw: 30, minOffMin: 5, throughOff: true, place: 'Panel A, selector 5, middle row' })
  })

  it('keeps what a drive drives, for which the file has no column', () => {
    expect(land('tag,kind,name,hand\nDR-1,drive,Drive,50 Hz').landings[0]!.point).toMatchObject({ drives: 'C-1', hand: { hz: 50 } })
    expect(land('tag,kind,name\nDR-1,other,Spare').landings[0]!.point.drives).toBeNull()
  })

  it('empties what an empty cell stands for', () => {
    const { preview } = land('tag,kind,name,rated_a,cases\nLLS-A3,liquid-line-valve,"Liquid line valve, dairy",,')
    expect(preview.rows[0]!.changes).toEqual([{ column: 'cases', from: 'Dairy wall 1–3; Dairy wall 4–7', to: '' }, { column: 'rated_a', from: '0.3', to: '' }])
  })

  it('finds equipment by name in whatever letters, and the rack and group by the circuit', () => {
    const { landings, preview } = land('tag,kind,name,circuit,cases\nEF-A3,evaporator-fan,Fans,a3 DAIRY,dairy wall 1–3')
    expect(preview.rows[0]!.cells).toMatchObject({ rack: 'Rack A', suction_group: 'A medium', circuit: 'A3 dairy', cases: 'Dairy wall 1–3' })
    expect(landings[0]!.id).toBeNull()
  })

  it('moves a point to a circuit of the other rack with its rack and group', () => {
    expect(land('tag,kind,name,circuit\nEF-A4,evaporator-fan,Fans,B1 freezer doors').preview.rows[0]!.changes).toEqual(expect.arrayContaining([
      { column: 'rack', from: 'Rack A', to: 'Rack B' }, { column: 'suction_group', from: 'A medium', to: 'B low' }, { column: 'circuit', from: 'A4 meat', to: 'B1 freezer doors' },
    ]))
  })

  it.each([
    ['rack', 'X-1,other,X,Rack Z,,,,,', 'The controller has no rack Rack Z'],
    ['suction_group', 'X-1,other,X,Rack A,B low,,,,', 'The controller has no suction group B low'],
    ['circuit', 'X-1,other,X,,,C9,,,', 'The controller has no circuit C9'],
    ['cases', 'X-1,other,X,,,,Meat 1–3; Cheese,,', 'The controller has no case Cheese'],
    ['cases', 'X-1,other,X,,,,Meat 1–3; Meat 1–3,,', 'A case stands twice'],
    ['hand', 'X-1,defrost-heater,X,,,,,on,', 'A defrost heater or hot-gas valve is never held on'],
    ['hand', 'X-1,leak-alarm,X,,,,,off,', 'It keeps people safe and is never off'],
    ['hand', 'X-1,liquid-line-valve,X,,,,,on,', 'A valve is held open or closed'],
    ['hand', 'X-1,condenser-fan,X,,,,,open,', 'Only a valve is open or closed; write on or off'],
    ['hand', 'X-1,drive,X,,,,,on,', 'A drive is held at a speed; write it as 45 Hz or 60 %'],
    ['hand', 'X-1,egress-light,X,,,,,50 %,', 'A point of this kind has no speed; write on or off'],
    ['hand', 'X-1,expansion-valve,X,,,,,45 Hz,', 'A valve has an opening in %, not a speed'],
    ['rated_a', 'X-1,other,X,,,,,,-1', 'At least 0'],
    ['tag', '#1,other,X,,,,,,', 'Letters, digits, spaces and . _ / - only'],
  ])('refuses in column %s: %s', (column, row, reason) => {
    const { faults, landings } = land(`tag,kind,name,rack,suction_group,circuit,cases,hand,rated_a\n${row}`)
    expect(faults).toEqual([{ row: 2, column, reason }])
    expect(landings).toEqual([])
  })

  it('asks for the rack where two have a circuit of the same name', () => {
    const site = quarryStreetView({ withPoints: false })
    const [first, , , , , last] = site.circuits
    site.circuits = site.circuits.map(circuit => circuit === last ? { ...circuit, name: first!.name } : circuit)
    const faults = (text: string) => landPoints(readPointList(text), site, site.controllers[0]!.id).faults
    expect(faults('tag,kind,name,circuit\nX-1,other,X,A1 produce')).toEqual([{ row: 2, column: 'circuit', reason: 'Two racks have a circuit A1 produce; name the rack too' }])
    expect(faults('tag,kind,name,rack,circuit\nX-1,other,X,Rack B,A1 produce')).toEqual([])
  })

  it('gives the faults of the file and of its landing in the order of the rows', () => {
    const { faults, preview } = land('tag,kind,name,rack\nX-1,other,X,Nowhere\nX-2,toaster,X,\nX-3,other,X,\n')
    expect(faults.map(fault => fault.row)).toEqual([2, 3])
    expect(preview.rows.map(row => row.tag)).toEqual(['X-3'])
  })

  it('refuses more points than a controller can hold', () => {
    const rows = Array.from({ length: 1971 }, (_, index) => `X-${index},other,X`).join('\n')
    expect(land(`tag,kind,name\n${rows}`).faults).toEqual([{ row: null, column: null, reason: 'The controller would have more than 2,000 points' }])
  })
})
