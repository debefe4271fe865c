/** A site's stricter settings against its rulebook. The promises are this project's own; no published source, but where one is named. */
import { describe, expect, it } from 'vitest'
import { assess, caseLimit, classById, rulebookById, rulebooks, settingFaults, siteFault, siteFor } from '../../../server/utils/holding'
import type { SiteHolding } from '../../../shared/schemas/equipment'
import { PLAIN_HOLDING } from '../../../shared/schemas/equipment'

const us = rulebookById('us-food-code-2022')!
const eu = rulebookById('eu-853-2004')!
const held = (classes: SiteHolding['classes'], more: Partial<SiteHolding> = {}): SiteHolding => ({ ...PLAIN_HOLDING, classes, ...more })
const tcs = (limit: number | null, minutes: number | null) => held([{ foodClass: 'tcs', limit, minutes }])

describe('settings under a rulebook', () => {
  it('are taken where they are stricter', () => {
    expect(settingFaults(us, PLAIN_HOLDING)).toEqual([])
    expect(settingFaults(us, tcs(40.9, 239))).toEqual([])
    expect(settingFaults(us, tcs(38, null))).toEqual([])
    expect(settingFaults(us, tcs(null, 1))).toEqual([])
  })

  it.each<[string, SiteHolding, string, string]>([
    ['the rulebook\'s own limit', tcs(41, null), 'classes[0].limit', 'Below 41 °F, the rulebook\'s own limit: a site may only be stricter'],
    ['a laxer limit', tcs(45, null), 'classes[0].limit', 'Below 41 °F'],
    ['the rulebook\'s own time', tcs(null, 240), 'classes[0].minutes', 'Shorter than 4 hours, the rulebook\'s own time: a site may only be stricter'],
    ['a longer time', tcs(null, 300), 'classes[0].minutes', 'Shorter than 4 hours'],
    ['a setting of nothing', tcs(null, null), 'classes[0].limit', 'Enter a limit or minutes'],
    ['a class that is not there', held([{ foodClass: 'meat', limit: 30, minutes: null }]), 'classes[0].foodClass', 'has no class meat'],
    ['a class that stands twice', held([{ foodClass: 'tcs', limit: 39, minutes: null }, { foodClass: 'tcs', limit: 38, minutes: null }]), 'classes[1].foodClass', 'stands twice'],
    ['a choice that the rulebook does not leave', held([], { allowsMinus12: true }), 'allowsMinus12', 'leaves no such choice'],
  ])('are refused: %s', (_name, holding, field, words) => {
    const [fault] = settingFaults(us, holding)
    expect(fault).toMatchObject({ field })
    expect(fault!.reason).toContain(words)
  })

  it('have no minutes where the class has no number (852/2004 Annex II ch. IX pt 5 gives none)', () => {
    expect(settingFaults(eu, held([{ foodClass: 'meat', limit: null, minutes: 30 }]))).toEqual([{ field: 'classes[0].minutes', reason: 'The rulebook gives this class no time that could be shorter' }])
  })

  it('are measured against the choice that the law leaves (89/108/EEC)', () => {
    const frozen = held([{ foodClass: 'quick-frozen', limit: -13, minutes: null }])
    expect(settingFaults(eu, frozen)).toMatchObject([{ field: 'classes[0].limit' }])
    expect(settingFaults(eu, { ...frozen, allowsMinus12: true })).toEqual([])
  })

  it('that are taken are never laxer for the engine, in any class', () => {
    for (const rulebook of rulebooks) {
      for (const { id, limit } of rulebook.classes) {
        const holding = held([{ foodClass: id, limit: limit - 0.5, minutes: null }])
        expect(settingFaults(rulebook, holding), `${rulebook.id} ${id}`).toEqual([])
        expect(siteFault(classById(rulebook, id)!, siteFor(holding, id)), `${rulebook.id} ${id}`).toBeNull()
      }
    }
  })
})

describe('the limit of a case', () => {
  const foodClass = classById(us, 'tcs')!
  it.each<[string, SiteHolding, number | null, number, boolean]>([
    ['the rulebook\'s', PLAIN_HOLDING, null, 41, false],
    ['the site\'s for its class', tcs(39, null), null, 39, true],
    ['its own', PLAIN_HOLDING, 38, 38, true],
    ['the stricter of both: its own', tcs(39, null), 38, 38, true],
    ['the stricter of both: the site\'s', tcs(37, null), 38, 37, true],
    ['the rulebook\'s where only the minutes are shorter', tcs(null, 60), null, 41, false],
  ])('is %s', (_name, holding, own, value, stricter) => {
    expect(caseLimit(foodClass, holding, own)).toEqual({ value, stricter })
  })

  it('follows the law\'s own choice, which is not stricter', () => {
    const frozen = classById(eu, 'quick-frozen')!
    expect(caseLimit(frozen, PLAIN_HOLDING, null)).toEqual({ value: -18, stricter: false })
    expect(caseLimit(frozen, { ...PLAIN_HOLDING, allowsMinus12: true }, null)).toEqual({ value: -12, stricter: false })
  })
})

it('a setting of one class leaves the others alone', () => {
  const holding = held([{ foodClass: 'tcs', limit: 39, minutes: 60 }], { addAccuracy: true })
  expect(siteFor(holding, 'tcs')).toEqual({ limit: 39, minutes: 60, addAccuracy: true, allowsMinus12: false })
  expect(siteFor(holding, 'frozen')).toEqual({ addAccuracy: true, allowsMinus12: false })
  const at = (minute: number) => new Date(Date.UTC(2026, 2, 1) + minute * 60_000).toISOString()
  const log = { rulebook: 'us-food-code-2022', foodClass: 'tcs', unit: 'F' as const, darkAt: at(0), intervalMinutes: 10, readings: [{ at: at(0), value: 37.4, accuracy: 0.9 }, { at: at(10), value: 38.2, accuracy: 0.9 }], now: at(10) }
  expect(assess(log).verdict).toBe('within')
  expect(assess({ ...log, site: siteFor(holding, 'tcs') })).toMatchObject({ verdict: 'above', deadline: at(60), minutesAbove: { careful: 10 } })
})
