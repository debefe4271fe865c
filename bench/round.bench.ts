// What a round of 60 cases costs, judged, stored and answered by one request of the built server, beside a bare insert of the same rows.
import { chmod, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { and, eq, gt, sql } from 'drizzle-orm'
import { integer, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core'
import { buildServer } from '../scripts/lib/build.mjs'
import { startPostgres } from '../scripts/lib/postgres.mjs'
import { closeAll, onClose } from '../scripts/lib/processes.mjs'
import { entries } from '../server/database/schema'
import { connect } from '../server/utils/database'
import { signIn } from '../tests/support/client'
import { ADMINISTRATOR } from '../tests/support/people'
import { startWorld } from '../tests/support/world'

const CASES = 60
const ROUNDS = 12

/** As the log's table, without its keys, checks and trigger. */
const bareRows = pgTable('bare_rows', {
  outageId: uuid(), seq: integer(), id: uuid(), kind: text(), personId: uuid(), deviceId: uuid(), n: integer(), hash: text(),
  signed: text(), signature: text(), receivedAt: timestamp({ withTimezone: true, precision: 3 }), standing: text(), why: jsonb(),
})

const median = (values: number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]!
async function timed<T>(work: () => Promise<T>): Promise<{ ms: number, value: T }> {
  const began = performance.now()
  const value = await work()
  return { ms: performance.now() - began, value }
}

/** A PostgreSQL that keeps its promises to the disk, as a shop's does; one that is named by the environment is used instead. */
async function findPostgres(): Promise<void> {
  if (process.env.TEST_DATABASE_ADMIN_URL) return
  const room = await mkdtemp(join(tmpdir(), 'holdover-bench-'))
  onClose(() => rm(room, { recursive: true, force: true }))
  await chmod(room, 0o711)
  const { urlOf } = await startPostgres(room)
  process.env.TEST_DATABASE_ADMIN_URL = urlOf('postgres')
}

async function measure() {
  const world = await startWorld()
  const { client, db } = connect(world.server.databaseUrl, 1)
  try {
    const administrator = await signIn(world.server.url, ADMINISTRATOR.email, ADMINISTRATOR.password)
    const { circuitId } = world.snapshot.cases[0]!
    for (let place = world.snapshot.cases.length; place < CASES; place += 1) {
      const { status } = await administrator.send('POST', `/api/sites/${world.site}/cases`, { controllerId: world.controller, circuitId, name: `Case ${place}`, kind: 'open-multideck', foodClass: 'tcs', usualC: 2 })
      if (status !== 201) throw new Error(`A case was not made: ${status}`)
    }
    const technician = world.people.technician.client
    const { body: snapshot } = await technician.send<typeof world.snapshot>('GET', `/api/controllers/${world.controller}/snapshot`)
    const phone = await world.phoneOf('technician')
    const lostAt = world.server.now() - 30 * 60_000
    Object.assign(world.snapshot, snapshot)
    const outage = await world.open(phone, lostAt)

    /** The round's entries, signed beforehand: the phone's work is not the server's. */
    const round = (number: number) => snapshot.cases.map((item, place) => phone.write(outage, 'reading-taken', {
      round: number, caseId: item.id, value: 38 + (number * 7 + place) % 40 / 10, unit: 'F', method: 'product', instrumentId: null, words: '', photos: [],
    }))
    const rounds: number[] = []
    for (let number = 0; number < ROUNDS; number += 1) {
      await world.server.advance(10)
      const signed = round(number)
      const { ms, value } = await timed(() => phone.push(outage, signed))
      const taken = value.body.results.filter(result => result.status === 'accepted').length
      if (value.status !== 200 || taken !== CASES) throw new Error(`Round ${number}: ${value.status}, ${taken} of ${CASES} accepted: ${JSON.stringify(value.body).slice(0, 500)}`)
      rounds.push(ms)
    }

    const empty: number[] = []
    for (let call = 0; call < 30; call += 1) empty.push((await timed(() => technician.fetch('/api/rulebooks/ca-4c').then(response => response.text()))).ms)

    // The same rows and nothing else: no signature looked at, no verdict, no lock, one statement.
    await db.execute(sql`create table bare_rows as select * from entries limit 0`)
    const bare: number[] = []
    const kept = await db.select().from(entries).where(and(eq(entries.outageId, outage), eq(entries.kind, 'reading-taken'), gt(entries.seq, 0)))
    for (let number = 0; number < ROUNDS; number += 1) {
      const rows = kept.slice(number * CASES, (number + 1) * CASES)
      bare.push((await timed(() => db.insert(bareRows).values(rows))).ms)
    }
    const verdicts = await db.select({ seq: entries.seq }).from(entries).where(and(eq(entries.outageId, outage), eq(entries.kind, 'verdict-changed')))
    return { rounds, bare, empty, verdicts: verdicts.length }
  } finally {
    await client.end({ timeout: 2 })
    await world.server.stop()
  }
}

await buildServer(fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, ''))
await findPostgres()
try {
  const { rounds, bare, empty, verdicts } = await measure()
  // The first request meets a server that has just started.
  const [ms, bareMs, emptyMs] = [rounds.slice(1), bare.slice(1), empty.slice(1)].map(median)
  process.stdout.write(`\n${JSON.stringify({
    name: 'a round of 60 cases judged, stored and answered in one request',
    ratio: Number((ms! / bareMs!).toFixed(1)),
    baseline: 'one insert of the same 60 rows by Drizzle, nothing checked',
    milliseconds: Number(ms!.toFixed(1)),
    slowestMilliseconds: Number(Math.max(...rounds).toFixed(1)),
    lastRoundMilliseconds: Number(rounds.at(-1)!.toFixed(1)),
    baselineMilliseconds: Number(bareMs!.toFixed(1)),
    requestThatAsksNothingMilliseconds: Number(emptyMs!.toFixed(1)),
    rounds: ROUNDS,
    verdictsThatChanged: verdicts,
  })}\n`)
} finally {
  await closeAll()
}
