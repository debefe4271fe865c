import { describe, expect, it } from 'vitest'
import { holdTime, parseFitInput, parseHoldInput } from '~~/server/utils/hold'

const chilled = { kind: 'chilled', startC: 2, ambientC: 22, tauHours: 3, limitC: 5 }
const frozen = { kind: 'frozen', food: 'peas', massKg: 10, uaWPerK: 2, startC: -20, ambientC: 22, limitC: -12 }
const food = { water: 70, protein: 15, fat: 10, carbohydrate: 4, ash: 1, freezingC: -1.5 }
const fit = {
  ambientC: 22, priorTauHours: 3, limitC: 5, now: '2026-03-01T02:20:00Z',
  readings: [{ at: '2026-03-01T02:00:00Z', c: 2 }, { at: '2026-03-01T02:10:00Z', c: 2.4 }],
}

describe('bodies of the hold question', () => {
  it.each([chilled, { ...chilled, heatW: 50, uaWPerK: 20 }, { ...chilled, uaWPerK: 20 }, frozen, { ...frozen, food }])(
    'lets a right one through as it is: %j', (body) => {
      expect(parseHoldInput(body)).toEqual({ ok: true, input: body })
    })

  it('takes what the thermocouple of Incropera example 5.1 needs: 200 °C and a time constant of a second', () => {
    const parsed = parseHoldInput({ kind: 'chilled', startC: 25, ambientC: 200, limitC: 199, tauHours: 1 / 3600 })
    expect(parsed.ok && holdTime(parsed.input).minutes).toBeCloseTo(Math.log(175) / 60, 9)
  })

  it.each([
    ['no object', 'chilled', 'body', 'body must be an object'],
    ['nothing', undefined, 'body', 'body is needed'],
    ['no kind', { ...chilled, kind: undefined }, 'kind', 'kind must be one of chilled, frozen'],
    ['an unknown kind', { ...chilled, kind: 'dry' }, 'kind', 'kind must be one of chilled, frozen'],
    ['no start', { ...chilled, startC: undefined }, 'startC', 'startC is needed'],
    ['text for a number', { ...chilled, ambientC: '22' }, 'ambientC', 'ambientC must be a number'],
    ['null for a number', { ...chilled, limitC: null }, 'limitC', 'limitC must be a number'],
    ['a time constant of 0', { ...chilled, tauHours: 0 }, 'tauHours', 'tauHours must be above 0'],
    ['an endless time constant', { ...chilled, tauHours: Infinity }, 'tauHours', 'tauHours must be finite'],
    ['colder than cold', { ...chilled, startC: -274 }, 'startC', 'startC must be at least -273.15 °C'],
    ['heat without conductance', { ...chilled, heatW: 50 }, 'uaWPerK', 'uaWPerK is needed with heatW'],
    ['negative heat', { ...chilled, heatW: -1, uaWPerK: 2 }, 'heatW', 'heatW must be at least 0'],
    ['a frozen start under -40 °C', { ...frozen, startC: -40.1 }, 'startC', 'startC must be at least -40 °C for frozen food'],
    ['a frozen limit under -40 °C', { ...frozen, limitC: -41 }, 'limitC', 'limitC must be at least -40 °C for frozen food'],
    ['no mass', { ...frozen, massKg: 0 }, 'massKg', 'massKg must be above 0'],
    ['an unknown food', { ...frozen, food: 'gravel' }, 'food', 'food must be one of peas, beef, chicken, cod, ice-cream'],
    ['no food', { ...frozen, food: undefined }, 'food', 'food is needed'],
    ['a food without ash', { ...frozen, food: { ...food, ash: undefined } }, 'food.ash', 'food.ash is needed'],
    ['a food of more than all', { ...frozen, food: { ...food, water: 80 } }, 'food.water', 'food.water and the other parts come to more than 100 %'],
    ['a food whose water is all bound', { ...frozen, food: { ...food, water: 5 } }, 'food.water', 'food.water must be more than 0.4 times the protein'],
    ['a food that freezes above 0 °C', { ...frozen, food: { ...food, freezingC: 0 } }, 'food.freezingC', 'food.freezingC must be below 0 °C'],
  ])('refuses %s', (_, body, field, reason) => {
    expect(parseHoldInput(body)).toEqual({ ok: false, field, reason })
  })
})

describe('bodies of the fit question', () => {
  it('lets a right one through, two readings of one moment as well', () => {
    expect(parseFitInput(fit)).toEqual({ ok: true, input: fit })
    const twice = { ...fit, readings: [fit.readings[0], fit.readings[0]] }
    expect(parseFitInput(twice)).toEqual({ ok: true, input: twice })
  })

  it.each([
    ['no readings', { ...fit, readings: [] }, 'readings', 'readings must hold at least one reading'],
    ['readings that are no list', { ...fit, readings: {} }, 'readings', 'readings must be a list'],
    ['too many readings', { ...fit, readings: Array.from({ length: 2001 }, () => fit.readings[0]) }, 'readings', 'readings must hold at most 2000 readings'],
    ['unordered readings', { ...fit, readings: [...fit.readings].reverse() }, 'readings[1].at', 'readings[1].at is before the reading that it follows'],
    ['now before the last', { ...fit, now: '2026-03-01T02:09:59Z' }, 'now', 'now is before the last reading'],
    ['a time in words', { ...fit, now: 'tonight' }, 'now', 'now must be a time such as 2026-03-01T02:10:00Z'],
    ['a day that is none', { ...fit, now: '2026-02-30T02:10:00Z' }, 'now', 'now must be a time such as 2026-03-01T02:10:00Z'],
    ['a reading without temperature', { ...fit, readings: [{ at: fit.now }] }, 'readings[0].c', 'readings[0].c is needed'],
    ['a prior of 0', { ...fit, priorTauHours: 0 }, 'priorTauHours', 'priorTauHours must be above 0'],
    ['no ambient', { ...fit, ambientC: undefined }, 'ambientC', 'ambientC is needed'],
  ])('refuses %s', (_, body, field, reason) => {
    expect(parseFitInput(body)).toEqual({ ok: false, field, reason })
  })
})
