// Rules of this project, no published source.
import { PgDialect } from 'drizzle-orm/pg-core'
import type { SQL } from 'drizzle-orm'
import { expect, it } from 'vitest'
import type { Database } from '../../../server/utils/database'
import { wakeWatch } from '../../../server/utils/watch/wake'

const pause = (ms: number) => new Promise(resolve => setTimeout(resolve, ms))

it('tells each outage once, however often it changed while the last notification was under way', async () => {
  const told: unknown[][] = []
  const dialect = new PgDialect()
  const db = { execute: async (query: SQL) => {
    told.push(dialect.sqlToQuery(query).params)
    await pause(5)
    if (told.length === 1) throw new Error('away')
  } } as unknown as Database
  wakeWatch(db, 'a')
  for (const id of ['b', 'a', 'b', 'c']) wakeWatch(db, id)
  await pause(80)
  expect(told).toEqual([['holdover_watch', 'a'], ['holdover_watch', 'b', 'a', 'c']])
  wakeWatch(db, 'd')
  await pause(20)
  expect(told[2]).toEqual(['holdover_watch', 'd'])
})
