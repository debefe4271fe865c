// What verifying, judging, storing and receipting a signed entry costs beside a bare insert of the same row, on a
// PostgreSQL of its own that writes to the disk at each commit; and what folding and verifying a long record take.
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import { makeDatabase, startPostgres } from '../scripts/lib/postgres.mjs'
import { closeAll, closeOnSignals } from '../scripts/lib/processes.mjs'
import { entries, outages } from '~~/server/database/schema'
import type { Database } from '~~/server/utils/database'
import { connect } from '~~/server/utils/database'
import { appendEntries } from '~~/server/utils/record/append'
import { readEntries, readState } from '~~/server/utils/record/log'
import { canonicalText } from '~~/shared/record/canonical'
import { foldLog } from '~~/shared/record/fold'
import { verifyRecord, webSignatures } from '~~/shared/record/verify'
import { documentOf, longRecord } from './long-record'
import { microseconds } from './measure'
import type { Device } from '../tests/support/push-world'
import { pushWorld } from '../tests/support/push-world'

const CONNECTIONS = [1, 8, 32]
const OUTAGES = [1, 8, 100]
const MEASURED = 640
const BATCH = 50
const ROUNDS = 3

/** Runs one worker a connection; each does its share. @returns entries per second */
async function perSecond(workers: (() => Promise<number>)[]): Promise<number> {
  const began = performance.now()
  const done = await Promise.all(workers.map(worker => worker()))
  return done.reduce((sum, count) => sum + count, 0) / ((performance.now() - began) / 1_000)
}

const median = (values: number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]!

/** The outages that one of several workers writes in: its own where there are enough, else shared. */
const shareOf = (outages: string[], index: number, workers: number) => outages.filter((_, place) => outages.length >= workers ? place % workers === index : place === index % outages.length)

closeOnSignals(130)
const room = await mkdtemp(join(tmpdir(), 'holdover-bench-'))
try {
  process.env.HOLDOVER_SERVER_KEY = Buffer.alloc(32, 7).toString('base64url')
  const postgres = await startPostgres(room)
  await makeDatabase(postgres.urlOf('postgres'), 'bench')
  const { client, db } = connect(postgres.urlOf('bench'), 4)
  await migrate(db, { migrationsFolder: 'server/database/migrations' })
  const world = await pushWorld(db, Math.max(...CONNECTIONS), Math.max(...OUTAGES))
  const cells: Record<string, { pushed: number, bare: number, ratio: number }> = {}
  for (const connections of CONNECTIONS) {
    const pool = connect(postgres.urlOf('bench'), connections)
    for (const count of OUTAGES) {
      const each = Math.ceil(MEASURED / connections)
      const workers = world.devices.slice(0, connections).map((device, index) => ({ device, outages: shareOf(world.outages.slice(0, count), index, connections) }))
      // A device's first entry in an outage brings its name with it: that is not what is measured.
      for (const { device, outages } of workers) for (const outage of outages) await push(pool.db, device, outage, device.sign(outage, 1))
      const speeds: { pushed: number, bare: number }[] = []
      for (let round = 0; round < ROUNDS; round++) {
        const signed = workers.map(({ device, outages }) => Array.from({ length: each }, (_, index) => ({ outage: outages[index % outages.length]!, items: device.sign(outages[index % outages.length]!, 1) })))
        const rows = workers.map(({ device, outages }) => Array.from({ length: each }, (_, index) => device.row(world.beside.get(outages[index % outages.length]!)!)))
        const pushed = await perSecond(workers.map(({ device }, index) => async () => {
          for (const { outage, items } of signed[index]!) await push(pool.db, device, outage, items)
          return each
        }))
        const bare = await perSecond(rows.map(own => async () => {
          for (const row of own) await pool.db.insert(entries).values(row)
          return own.length
        }))
        speeds.push({ pushed, bare })
      }
      const [pushed, bare] = [median(speeds.map(speed => speed.pushed)), median(speeds.map(speed => speed.bare))]
      cells[`${connections} connections, ${count} outages`] = { pushed: Math.round(pushed), bare: Math.round(bare), ratio: Number((pushed / bare).toFixed(3)) }
    }
    if (connections === Math.max(...CONNECTIONS)) cells[`${connections} connections, 100 outages, ${BATCH} at once`] = await batches(pool.db)
    await pool.client.end()
  }

  /** What is read of an outage must be what its whole log folds to. */
  async function compare(of: Database, id: string): Promise<void> {
    const [row] = await of.select().from(outages).where(eq(outages.id, id))
    const log = await readEntries(of, id)
    if (log.length !== row!.size || canonicalText(foldLog(id, log)) !== canonicalText(await readState(of, row!))) throw new Error(`The cached fold of ${id} is not that of its log`)
  }

  async function batches(of: Database): Promise<{ pushed: number, bare: number, ratio: number }> {
    const workers = world.devices.map((device, index) => ({ device, outage: world.outages[index]! }))
    const signed = workers.map(({ device, outage }) => [0, 1].map(() => device.sign(outage, BATCH)))
    const rows = workers.map(({ device, outage }) => Array.from({ length: 15 }, () => device.row(world.beside.get(outage)!)))
    const pushed = await perSecond(workers.map(({ device, outage }, index) => async () => {
      for (const items of signed[index]!) await push(of, device, outage, items)
      return 2 * BATCH
    }))
    const bare = await perSecond(rows.map(own => async () => {
      for (const row of own) await of.insert(entries).values(row)
      return own.length
    }))
    return { pushed: Math.round(pushed), bare: Math.round(bare), ratio: Number((pushed / bare).toFixed(3)) }
  }

  async function push(of: Database, device: Device, outage: string, items: unknown[]): Promise<void> {
    const { results } = await appendEntries(of, device.person, outage, items, world.now)
    const bad = results.find(result => result.status !== 'accepted')
    if (bad) throw new Error(JSON.stringify(bad))
  }

  for (const id of world.outages.slice(0, 8)) await compare(db, id)
  await client.end()
  const record = longRecord(2000)
  const fold = microseconds(() => foldLog(record.id, record.entries), 1, 5) / 1_000
  const document = documentOf(record)
  const check = await webSignatures()
  const began = performance.now()
  const { faults } = await verifyRecord(document, { check })
  const verified = performance.now() - began
  if (faults.length > 0) throw new Error(JSON.stringify(faults[0]))
  process.stdout.write(`${JSON.stringify({
    name: 'signed entries verified, stored and receipted, one at a time at 32 connections and 100 outages',
    ratio: cells['32 connections, 100 outages']!.ratio,
    baseline: 'a bare drizzle insert of the same row, by the same connections into the same database, which writes to the disk at each commit',
    goal: 'at least 0.5',
    perSecond: cells,
    foldOf2000EntriesMs: Number(fold.toFixed(1)),
    verifyPer1000EntriesMs: Number((verified * 1_000 / record.entries.length).toFixed(1)),
  })}\n`)
} finally {
  await closeAll()
  await rm(room, { recursive: true, force: true })
}
