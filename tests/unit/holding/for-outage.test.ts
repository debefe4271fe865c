/** Verdicts on the cases of a real outage: its site's settings, and the rulebook that it was planned with. No published source. */
import { afterEach, describe, expect, it } from 'vitest'
import { limitSources } from '../../../server/utils/hold/record-facts'
import { forecastCase } from '../../../server/utils/hold/for-outage'
import { rulebookById, rulebooks } from '../../../server/utils/holding'
import { assessCase } from '../../../server/utils/holding/for-outage'
import { foldLog } from '../../../shared/record/fold'
import { asNewest } from '../../../shared/record/newest'
import type { Snapshot } from '../../../shared/record/snapshot'
import type { OutageState } from '../../../shared/record/state'
import { technician, uuidFor } from '../../support/record'
import { DAIRY, reading, storyTo } from '../record/store'

const MINUTE = 60_000

/** An outage that is dark, its dairy read at a temperature some minutes ago, at a site with settings of its own. */
function dark(value: number, site: Partial<Snapshot['site']> = {}, minutes = 1): { state: OutageState, now: number } {
  const writer = storyTo('dark')
  writer.pass(1).sign(technician, 'reading-taken', reading(DAIRY, value, { instrumentId: uuidFor('small thermometer') }))
  const state = structuredClone(writer.state)
  Object.assign(state.snapshot.site, site)
  return { state, now: writer.now + minutes * MINUTE }
}

describe('settings of the site', () => {
  it('are what its readings are judged by', () => {
    const holding = { addAccuracy: false, allowsMinus12: false, classes: [{ foodClass: 'tcs', limit: 39, minutes: 60 }] }
    const plain = dark(40)
    expect(assessCase(plain.state, DAIRY, plain.now)).toMatchObject({ verdict: 'within', limit: { value: 41, unit: 'F' } })
    const strict = dark(40, { holding })
    const judged = assessCase(strict.state, DAIRY, strict.now)!
    expect(judged).toMatchObject({ verdict: 'above', limit: { value: 39, unit: 'F' } })
    expect(Date.parse(judged.deadline!)).toBeLessThanOrEqual(strict.now + 60 * MINUTE)
    const hour = dark(40, { holding }, 61)
    expect(assessCase(hour.state, DAIRY, hour.now)!.verdict).toBe('discard')
  })

  it('yield to a case whose own limit is stricter', () => {
    const { state, now } = dark(38.5, { holding: { addAccuracy: false, allowsMinus12: false, classes: [{ foodClass: 'tcs', limit: 39, minutes: null }] } })
    Object.assign(state.snapshot.cases.find(item => item.id === DAIRY)!, { limit: { value: 38, unit: 'F' }, stricter: true })
    expect(assessCase(state, DAIRY, now)).toMatchObject({ verdict: 'above', limit: { value: 38, unit: 'F' } })
  })

  it('add the accuracy of the instrument that the reading names, in kelvin', () => {
    // ±0.5 K is ±0.9 °F: 40.05 °F still counts as within 41 °F, 40.15 °F does not.
    const holding = { addAccuracy: true, allowsMinus12: false, classes: [] }
    const below = dark(40.05, { holding })
    expect(assessCase(below.state, DAIRY, below.now)!.verdict).toBe('within')
    const over = dark(40.15, { holding })
    expect(assessCase(over.state, DAIRY, over.now)!.verdict).toBe('above')
  })

  it('stand among the sources of the record\'s limits', () => {
    const { state } = dark(40, { holding: { addAccuracy: true, allowsMinus12: false, classes: [{ foodClass: 'tcs', limit: null, minutes: 120 }] } })
    expect(limitSources(state).join('\n')).toContain('the site\'s own 120 minutes')
    expect(limitSources(state).join('\n')).toContain('accuracy added')
  })
})

describe('an outage keeps the rulebook that it was planned with', () => {
  afterEach(() => { if (rulebooks.at(-1)!.version === 'to come') rulebooks.pop() })

  it('whatever version comes later', () => {
    const { state, now } = dark(40.5)
    const before = assessCase(state, DAIRY, now)
    const forecast = forecastCase(state, state.snapshot.cases.find(item => item.id === DAIRY)!, now)
    const old = rulebookById('us-food-code-2022')!
    rulebooks.push({ ...old, version: 'to come', unit: 'C', classes: old.classes.map(item => ({ ...item, limit: 2 })) })
    expect(rulebookById('us-food-code-2022')!.version).toBe('to come')
    expect(state.snapshot.rulebook.version).toBe(old.version)
    expect(assessCase(state, DAIRY, now)).toEqual(before)
    expect(before).toMatchObject({ verdict: 'within', limit: { value: 41, unit: 'F' } })
    expect(forecastCase(state, state.snapshot.cases.find(item => item.id === DAIRY)!, now)).toEqual(forecast)
    // Under the later version the same reading is over its limit.
    state.snapshot.rulebook.version = 'to come'
    expect(assessCase(state, DAIRY, now)!.verdict).not.toBe('within')
  })
})

describe('an opening of version 1', () => {
  it('reads as a site without settings of its own, whose checks last 90 days', () => {
    const { id, entries } = storyTo('dark')
    const old = structuredClone(entries)
    const opened = old.find(({ entry }) => entry.kind === 'outage-opened')!.entry
    const { holding, instrumentCheckDays, ...site } = (opened.body as { snapshot: Snapshot }).snapshot.site
    expect({ holding, instrumentCheckDays }).toEqual({ holding: { addAccuracy: false, allowsMinus12: false, classes: [] }, instrumentCheckDays: 90 })
    Object.assign(opened, { v: 1, body: { ...opened.body, snapshot: { ...(opened.body as { snapshot: Snapshot }).snapshot, site } } })
    expect((asNewest(opened).body as { snapshot: Snapshot }).snapshot.site).toEqual({ ...site, holding, instrumentCheckDays })
    expect(foldLog(id, old).snapshot).toEqual(foldLog(id, entries).snapshot)
  })
})
