/** Judging a log over HTTP: the contract of the route, whatever the rulebook. Cases with published sources stand in tests/unit/holding. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { rulebooks } from '../../server/utils/holding'
import type { Assessment, Rulebook } from '../../server/utils/holding'
import type { Client } from '../support/client'
import { setUp } from '../support/people'
import type { TestServer } from '../support/server'
import { startTestServer } from '../support/server'

interface Fault { statusCode: number, data: { field: string, reason: string } }

let server: TestServer
let client: Client
beforeAll(async () => {
  server = await startTestServer()
  client = await setUp(server.url)
}, 120_000)
afterAll(() => server?.stop())

const DARK_AT = '2026-03-29T00:30:00Z'
const at = (minutes: number) => new Date(Date.parse(DARK_AT) + minutes * 60_000).toISOString()
const body = (change: Record<string, unknown> = {}) => ({
  rulebook: 'au-3-2-2', foodClass: 'tcs', unit: 'C', darkAt: DARK_AT, intervalMinutes: 10,
  readings: [{ at: at(0), value: 4.1 }, { at: at(10), value: 6, method: 'product', accuracy: 1 }, { at: at(20), value: 7 }],
  now: at(130), ...change,
})
const ask = <T = Assessment>(sent: unknown) => client.send<T>('POST', '/api/holding/assess', sent)
const celsius = (fahrenheit: number) => (fahrenheit - 32) / 1.8

describe('POST /api/holding/assess', () => {
  it('answers with every field of the contract and no other', async () => {
    const { status, body: answer } = await ask(body())
    expect(status).toBe(200)
    expect(answer).toEqual({
      verdict: 'act',
      deadline: at(240),
      limit: { value: 5, unit: 'C' },
      minutesAbove: { careful: 130, linear: expect.closeTo(120 + 10 * 1 / 1.9, 6) },
      startedWarm: false, tooCold: false, suspect: false,
      clause: expect.any(String), source: expect.any(String), act: expect.any(String), why: expect.arrayContaining([expect.any(String)]),
    })
  })

  it('has a deadline that is null where there is none', async () => {
    const { body: answer } = await ask(body({ now: at(10), readings: [{ at: at(0), value: 4 }] }))
    expect(answer).toMatchObject({ verdict: 'within', deadline: null, act: null })
  })

  it('judges every class of every rulebook alike in °C and °F', async () => {
    for (const { id, unit, classes } of rulebooks) {
      for (const { id: foodClass, limit, judgedBy } of classes) {
        const values = [limit - 1, limit + 0.5, limit + 2, limit - 0.2, limit + 3]
        const own = body({ rulebook: id, foodClass, unit, now: at(70), readings: values.map((value, index) => ({ at: at(index * 15), value, method: judgedBy })) })
        const other = {
          ...own,
          unit: unit === 'F' ? 'C' : 'F',
          readings: values.map((value, index) => ({ at: at(index * 15), value: unit === 'F' ? celsius(value) : value * 1.8 + 32, method: judgedBy })),
        }
        const [first, second] = await Promise.all([ask(own), ask(other)])
        expect([first.status, second.status]).toEqual([200, 200])
        expect(first.body.limit).toEqual({ value: limit, unit })
        expect(second.body).toEqual({ ...first.body, minutesAbove: { careful: first.body.minutesAbove.careful, linear: expect.closeTo(first.body.minutesAbove.linear, 6) } })
      }
    }
  })

  it('counts by UTC while the clocks of Europe and North America change', async () => {
    // 29 March 2026, 01:00 UTC: British Summer Time begins. 1 November 2026, 06:00 UTC: daylight saving time ends in New York.
    for (const start of ['2026-03-29T00:30:00Z', '2026-03-29T00:30:00+00:00', '2026-11-01T01:30:00-04:00']) {
      const moment = (minutes: number, offset = 0) => new Date(Date.parse(start) + minutes * 60_000 + offset * 3_600_000).toISOString().replace('Z', offset === 0 ? 'Z' : `+0${offset}:00`)
      const sent = body({ rulebook: 'us-food-code-2022', unit: 'F', darkAt: start, now: moment(120), readings: [{ at: moment(0), value: 44 }, { at: moment(60, 1), value: 44 }, { at: moment(90, 0), value: 44 }] })
      const { body: answer } = await ask(sent)
      expect(answer).toMatchObject({ verdict: 'above', minutesAbove: { careful: 120, linear: 120 }, deadline: moment(240) })
    }
  })

  it('takes 5,000 readings, values at both ends, and a site’s own figures', async () => {
    const readings = Array.from({ length: 5_000 }, (_, index) => ({ at: at(index / 100), value: index % 2 === 0 ? -60 : 80, method: 'infrared', accuracy: 1 }))
    const { status, body: answer } = await ask(body({ readings, site: { limit: 3, minutes: 90, addAccuracy: true, allowsMinus12: false } }))
    expect([status, answer.verdict, answer.suspect, answer.limit]).toEqual([200, 'unknown', true, { value: 3, unit: 'C' }])
    const fahrenheit = await ask(body({ unit: 'F', readings: [{ at: at(0), value: -76 }, { at: at(1), value: 176 }] }))
    expect(fahrenheit.status).toBe(200)
  })

  const second = (change: Record<string, unknown>) => ({ readings: body().readings.map((reading, index) => index === 1 ? { ...reading, ...change } : reading) })
  it.each<[string, unknown, string]>([
    ['an unknown rulebook', body({ rulebook: 'nowhere' }), 'rulebook'],
    ['an unknown version', body({ version: '1999-01' }), 'version'],
    ['an unknown class', body({ foodClass: 'meat' }), 'foodClass'],
    ['an unknown unit', body({ unit: 'K' }), 'unit'],
    ['no reading', body({ readings: [] }), 'readings'],
    ['more than 5,000 readings', body({ readings: Array.from({ length: 5_001 }, () => 0) }), 'readings'],
    ['times that go back', body(second({ at: at(-1) })), 'readings[1].at'],
    ['the same time twice', body(second({ at: at(0) })), 'readings[1].at'],
    ['a time later than now', body({ now: at(15) }), 'readings[2].at'],
    ['a time that is none', body(second({ at: '10:00' })), 'readings[1].at'],
    ['no loss of control', body({ darkAt: undefined }), 'darkAt'],
    ['a loss of control after now', body({ darkAt: at(131) }), 'darkAt'],
    ['an interval of 0', body({ intervalMinutes: 0 }), 'intervalMinutes'],
    ['an interval below 0', body({ intervalMinutes: -1 }), 'intervalMinutes'],
    ['a value in a text', body(second({ value: '6' })), 'readings[1].value'],
    ['no value', body(second({ value: null })), 'readings[1].value'],
    ['a value below −60 °C', body(second({ value: -60.01 })), 'readings[1].value'],
    ['a value above 80 °C', body(second({ value: 80.01 })), 'readings[1].value'],
    ['a value above 80 °C in °F', body({ unit: 'F', ...second({ value: 176.1 }) }), 'readings[1].value'],
    ['an unknown method', body(second({ method: 'guess' })), 'readings[1].method'],
    ['a laxer limit', body({ site: { limit: 6 } }), 'site.limit'],
    ['a longer time', body({ site: { minutes: 241 } }), 'site.minutes'],
    ['a list', [], 'body'],
  ])('%s is 422 with its field and the reason', async (_, sent, field) => {
    const { status, body: fault } = await ask<Fault>(sent)
    expect([status, fault.statusCode, fault.data.field]).toEqual([422, 422, field])
    expect(fault.data.reason).toMatch(/^[a-z].{5,}/)
  })

  it('reads a value without end as no number, and what is no JSON not at all', async () => {
    const post = (text: string) => client.fetch('/api/holding/assess', { method: 'POST', body: text, headers: { 'content-type': 'application/json' } })
    const endless = await post(JSON.stringify(body()).replace('"value":6', '"value":1e999'))
    expect([endless.status, (await endless.json() as Fault).data.field]).toEqual([422, 'readings[1].value'])
    expect((await post('{')).status).toBe(400)
  })
})

describe('GET /api/rulebooks', () => {
  it('gives the data of all eight, in both units as they are written', async () => {
    const { status, body: all } = await client.send<Rulebook[]>('GET', '/api/rulebooks')
    expect([status, all.map(({ id }) => id)]).toEqual([200, ['us-food-code-2022', 'us-wa-doh', 'us-sf-dph', 'us-mi-county', 'uk-england-2013', 'au-3-2-2', 'eu-853-2004', 'ca-4c']])
    expect(new Set(all.map(({ unit }) => unit))).toEqual(new Set(['C', 'F']))
    for (const { version, classes } of all) {
      expect(version).not.toBe('')
      for (const { within } of classes) expect(Object.keys(within).sort()).toEqual(['clause', 'mark', 'source'])
    }
  })

  it('gives each by its id, and 404 for one that is not there', async () => {
    for (const { id } of rulebooks) {
      const { status, body: one } = await client.send<Rulebook>('GET', `/api/rulebooks/${id}`)
      expect([status, one.id]).toEqual([200, id])
    }
    const { status, body: fault } = await client.send<Fault>('GET', '/api/rulebooks/nowhere')
    expect([status, fault.data.reason]).toEqual([404, 'There is no such rulebook'])
  })
})
