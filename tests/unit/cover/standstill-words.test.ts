import { describe, expect, it } from 'vitest'
import { standstillWords } from '~~/server/utils/cover'
import { snapshot } from '../record/store'

const racks = (change: Partial<(typeof snapshot)['racks'][number]>) => ({ site: snapshot.site, racks: [{ ...snapshot.racks[0]!, refrigerant: 'R-744', ...change }] })

/** Pressures: saturation by the equation of state (CoolProp 8.0.0): 57.3 bar at 20 °C, 64.3 at 25 °C, 72.1 at 30 °C. */
describe('standstill of carbon dioxide in words', () => {
  it('says where pressure goes and which valve lifts first', () => {
    const [words] = standstillWords(racks({ warmestC: 25, reliefValves: [{ tag: 'RV-1', barGauge: 120 }, { tag: 'RV-2', barGauge: 60 }] }))
    expect(words).toContain('goes to 64.3 bar')
    expect(words).toMatch(/RV-2, 60 bar gauge, lifts first \(at 22\.\d °C\): it will lift/)
  })

  it('says where a valve does not get there, and where the charge decides', () => {
    expect(standstillWords(racks({ warmestC: 20, reliefValves: [{ tag: 'RV-2', barGauge: 60 }] }))[0]).toContain('does not get there')
    expect(standstillWords(racks({ warmestC: 35 }))[0]).toContain('76.6 to 84.2 bar at 35 °C')
  })

  it('says what is not entered, and nothing of other refrigerants', () => {
    expect(standstillWords(racks({ warmestC: null, reliefValves: [] }))[0]).toMatch(/57\.3 bar at 20 °C and 72\.1 bar at 30 °C.*not entered; no relief valve is entered/)
    expect(standstillWords(snapshot)).toEqual([])
  })
})
