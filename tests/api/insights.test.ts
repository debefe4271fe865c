// What the demo's finished outages say together, on the built server; promises of this project's own, no published source.
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { outageFacts, outages, outageSearch } from '../../server/database/schema'
import { connect } from '../../server/utils/database'
import { countedQuery } from '../../server/utils/insights/counted'
import { keepFacts, makeMissingFacts } from '../../server/utils/insights/keep'
import { readState } from '../../server/utils/record/log'
import { fits } from '../../server/utils/records/filter'
import type { ChangePage } from '../../shared/schemas/changes'
import type { InsightAnswer } from '../../shared/schemas/insights'
import { recordFilterSchema } from '../../shared/schemas/record-filter'
import type { WorkKindItem } from '../../shared/schemas/site-view'
import type { Client } from '../support/client'
import { signIn } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

let server: TestServer
let database: ReturnType<typeof connect>
let supervisor: Client
let administrator: Client
let all: InsightAnswer

const read = async (query = '', client = supervisor) => (await client.send<InsightAnswer>('GET', `/api/insights${query}`)).body
/** How many records a search finds. */
const found = async (filter: Record<string, string>) => (await database.db.select({ id: outageSearch.outageId }).from(outageSearch).where(fits(recordFilterSchema.parse({ phase: 'submitted,sealed', ...filter })))).length

beforeAll(async () => {
  server = await startTestServer({ demo: true })
  database = connect(server.databaseUrl, 2)
  supervisor = await signIn(server.url, 'supervisor@quillfeather.example')
  administrator = await signIn(server.url, 'admin@quillfeather.example')
  all = await read()
}, 120_000)
afterAll(async () => {
  await database?.client.end()
  await server?.stop()
})

describe('the insights', () => {
  it('count the outages that were submitted or sealed, and no others', async () => {
    expect(all.outages).toBe(await found({}))
    expect(all.outages).toBeGreaterThan(1)
    expect(all).toMatchObject({ more: false, uncounted: 0 })
    expect(all.work.reduce((sum, kind) => sum + kind.outages, 0)).toBe(all.outages)
    expect(all.late.reduce((sum, site) => sum + site.outages, 0)).toBe(all.outages)
    expect(all.late.reduce((sum, site) => sum + site.rounds, 0)).toBeGreaterThan(3)
  })

  it('lead from each number to as many records', async () => {
    for (const kind of all.work) expect(await found({ work: kind.name }), kind.name).toBe(kind.outages)
    for (const { site, outages, late } of all.late) {
      expect(await found({ outcome: 'late-rounds' }) > 0 || late === 0).toBe(true)
      expect((await read(`?site=${site.id}`)).outages).toBe(outages)
    }
    for (const point of all.points) expect(await found({ controller: point.controller.id, tag: point.tag })).toBe(point.outages)
    expect(new Set(all.discards.map(({ outage }) => outage.id)).size).toBe(await found({ outcome: 'discard' }))
  })

  it('keep to the days and the site that are asked for, and refuse what is no day', async () => {
    expect((await read('?from=2001-01-01&to=2001-12-31')).outages).toBe(0)
    expect((await supervisor.send('GET', '/api/insights?from=2026-02-30')).status).toBe(422)
    expect((await supervisor.send('GET', '/api/insights?from=2026-03-02&to=2026-03-01')).status).toBe(422)
  })

  it('are taken away as CSV, a table each, with the same rows', async () => {
    const rows = { work: all.work.length, steps: all.work.flatMap(kind => kind.steps.flatMap(step => step.took)).length, holds: all.holds.length, points: all.points.length, rounds: all.late.length, discards: all.discards.length }
    for (const [table, count] of Object.entries(rows)) {
      const response = await supervisor.fetch(`/api/insights/${table}.csv`)
      expect([table, response.status, response.headers.get('content-type')]).toEqual([table, 200, 'text/csv; charset=utf-8'])
      expect([table, (await response.text()).split('\r\n').length - 2]).toEqual([table, count])
    }
  })

  it('read no log: one query over rows that are kept beside it', async () => {
    const { sql: text } = countedQuery(database.db, fits(recordFilterSchema.parse({ phase: 'sealed' }))!).toSQL()
    expect(text).toContain('outage_facts')
    expect(text).not.toContain('"entries"')
  })
})

describe('the rows that are kept for them', () => {
  const rows = () => database.db.select().from(outageFacts).orderBy(outageFacts.outageId)

  it('are made anew alike from the logs where they are missing or of an older program', async () => {
    const before = await rows()
    await database.db.delete(outageFacts).where(eq(outageFacts.outageId, before[0]!.outageId))
    await database.db.update(outageFacts).set({ version: 0 }).where(eq(outageFacts.outageId, before[1]!.outageId))
    expect(await read()).toMatchObject({ outages: all.outages - 2, uncounted: 2 })
    expect(await makeMissingFacts(database.db, Date.now, Date.now() + 60_000)).toBe(2)
    expect(await rows()).toEqual(before)
    expect(await makeMissingFacts(database.db, Date.now, Date.now() + 60_000)).toBe(0)
  })

  it('go when an outage is returned for answers, in the transaction of that entry', async () => {
    const [submitted] = await database.db.select().from(outages).where(eq(outages.phase, 'submitted'))
    const state = await readState(database.db, submitted!)
    const before = await rows()
    await keepFacts(database.db, { ...state, phase: 'settle' }, 'submitted', Date.now())
    expect((await rows()).map(row => row.outageId)).toEqual(before.map(row => row.outageId).filter(id => id !== submitted!.id))
    await keepFacts(database.db, state, 'settle', Date.now())
    expect(await rows()).toEqual(before)
  })
})

describe('the offer to correct the times of a kind of work', () => {
  const kindOf = async (id: string) => (await supervisor.send<WorkKindItem[]>('GET', '/api/work-kinds')).body.find(kind => kind.id === id)!

  it('is accepted as it was shown, once, and stands in the history with who and from where', async () => {
    const [workKindId, offers] = Object.entries(all.offers)[0]!
    const [offer] = offers
    expect(offer!.outages.length).toBeGreaterThan(0)
    const body = { workKindId, steps: [{ step: offer!.step, proposed: offer!.proposed, outages: offer!.outages.map(outage => outage.id) }] }
    const auditor = await signIn(server.url, 'auditor@quillfeather.example')
    expect((await auditor.send('POST', '/api/insights/times', body)).status).toBe(403)
    expect((await supervisor.send('POST', '/api/insights/times', { ...body, steps: [{ ...body.steps[0], proposed: { ...offer!.proposed, longest: 999 } }] })).status).toBe(409)
    expect((await kindOf(workKindId)).steps.find(step => step.id === offer!.step)).toMatchObject(offer!.was)

    expect((await supervisor.send('POST', '/api/insights/times', body)).status).toBe(200)
    expect((await kindOf(workKindId)).steps.find(step => step.id === offer!.step)).toMatchObject(offer!.proposed)
    expect((await read()).offers[workKindId]?.map(left => left.step) ?? []).toEqual(offers.map(left => left.step).filter(step => step !== offer!.step))
    expect((await supervisor.send('POST', '/api/insights/times', body)).status).toBe(409)
    const { items } = (await administrator.send<ChangePage>('GET', `/api/changes?subject=work-kind&subjectId=${workKindId}`)).body
    expect(items[0]).toMatchObject({ by: 'Sabine Ockham', deed: 'changed', fields: [{ field: `step:${offer!.step}`, before: offer!.was, after: offer!.proposed }, { field: 'learnedFrom', after: offer!.outages.at(-1)!.code }] })
  })

  it('rests on sealed outages that the person may see', async () => {
    const [submitted] = await database.db.select({ id: outages.id }).from(outages).where(eq(outages.phase, 'submitted'))
    const steps = [{ step: 'load', proposed: { shortest: 1, likely: 2, longest: 3 }, outages: [submitted!.id] }]
    expect((await supervisor.send('POST', '/api/insights/times', { workKindId: (await supervisor.send<WorkKindItem[]>('GET', '/api/work-kinds')).body[0]!.id, steps })).status).toBe(404)
  })
})
