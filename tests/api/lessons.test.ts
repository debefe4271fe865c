// What a sealed outage of the demo teaches, on the built server; promises of this project's own, no published source.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Snapshot } from '../../shared/record/snapshot'
import type { OutagePage } from '../../shared/schemas/outage-list'
import type { Lessons } from '../../shared/schemas/lessons'
import type { WorkKindItem } from '../../shared/schemas/site-view'
import type { Client } from '../support/client'
import { signIn } from '../support/client'
import { startTestServer } from '../support/server'
import type { TestServer } from '../support/server'

describe('lessons of an outage', () => {
  let server: TestServer
  let supervisor: Client
  let sealed: string
  let open: string
  let controller: string
  let found: Lessons

  beforeAll(async () => {
    server = await startTestServer({ demo: true })
    supervisor = await signIn(server.url, 'supervisor@quillfeather.example')
    const { items } = (await supervisor.send<OutagePage>('GET', '/api/outages')).body
    const record = items.find(item => item.phase === 'sealed')!
    sealed = record.id
    controller = record.controller.id
    open = items.find(item => item.phase !== 'sealed')!.id
    found = (await supervisor.send<Lessons>('GET', `/api/outages/${sealed}/lessons`)).body
  }, 120_000)
  afterAll(() => server?.stop())

  it('are durations of its steps, and what every watched case shows or why it shows nothing', () => {
    expect(found.steps.length).toBeGreaterThan(2)
    for (const step of found.steps) expect(step.proposed.longest).toBeGreaterThanOrEqual(step.minutes)
    expect(found.cases.length).toBeGreaterThan(3)
    for (const item of found.cases) expect(item.not === null).toBe(item.tauHours !== null)
  })

  it('are none before the seal, and accepting them then is refused', async () => {
    expect((await supervisor.send<Lessons>('GET', `/api/outages/${open}/lessons`)).body).toMatchObject({ cases: [], steps: [] })
    expect((await supervisor.send('POST', `/api/outages/${open}/lessons`, { cases: [], steps: ['x'] })).status).toBe(409)
  })

  it('are not a technician\'s to accept', async () => {
    const technician = await signIn(server.url, 'technician@quillfeather.example')
    expect((await technician.send('POST', `/api/outages/${sealed}/lessons`, { cases: [], steps: [found.steps[0]!.step] })).status).toBe(403)
  })

  it('refuses what is not offered, naming it', async () => {
    const held = found.cases.find(item => item.not !== null)!
    const answer = await supervisor.send<{ data: { field: string, reason: string } }>('POST', `/api/outages/${sealed}/lessons`, { cases: [held.caseId], steps: [] })
    expect(answer.status).toBe(422)
    expect(answer.body.data).toMatchObject({ field: 'cases[0]', reason: expect.stringContaining(held.name) as string })
  })

  it('become the times of the kind of work and the cases\' own, once, with who accepted them', async () => {
    const [step] = found.steps
    const cases = found.cases.filter(item => item.tauHours !== null)
    const body = { cases: cases.map(item => item.caseId), steps: [step!.step] }
    for (const round of [1, 2]) {
      const answer = await supervisor.send<Lessons>('POST', `/api/outages/${sealed}/lessons`, body)
      expect(answer.status, `time ${round}`).toBe(200)
      expect(answer.body.steps.find(item => item.step === step!.step)).toMatchObject({ proposed: step!.proposed, accepted: { by: expect.any(String) as string } })
    }
    const kinds = (await supervisor.send<WorkKindItem[]>('GET', '/api/work-kinds')).body
    const kind = kinds.find(item => item.id === found.workKind.id)!
    expect(kind.steps.find(item => item.id === step!.step)).toMatchObject(step!.proposed)
    const snapshot = (await supervisor.send<Snapshot>('GET', `/api/controllers/${controller}/snapshot`)).body
    for (const lesson of cases) {
      const known = snapshot.cases.find(item => item.id === lesson.caseId)!
      expect(known).toMatchObject({ tauIsOwn: true, tauFrom: 1 })
      expect(known.tauHours).toBeCloseTo(lesson.tauHours!, 9)
    }
    expect(cases.length).toBeGreaterThan(0)
  })
})
