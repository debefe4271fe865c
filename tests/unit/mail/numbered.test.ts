// SQL text of the queue as drizzle runs it; promises of this project's own, no published source.
import { PgDialect } from 'drizzle-orm/pg-core'
import { describe, expect, it } from 'vitest'
import { numbered } from '../../../server/jobs/numbered'

const written = (text: string, values: unknown[]) => {
  const { sql, params } = new PgDialect().sqlToQuery(numbered(text, values))
  return { sql, params }
}

describe('numbered parameters', () => {
  it('keep their places, also where one stands twice and where there are more than nine', () => {
    const values = Array.from({ length: 11 }, (_, index) => `v${index + 1}`)
    expect(written('select $2, $1, $2, $11', values)).toEqual({ sql: 'select $1, $2, $3, $4', params: ['v2', 'v1', 'v2', 'v11'] })
  })

  it('carry objects as JSON and what is missing as null', () => {
    expect(written('insert values ($1::jsonb, $2, $3, $4)', [{ id: 1 }, undefined, null, 0]).params).toEqual(['{"id":1}', null, null, 0])
  })

  it('leave a text without any as it is', () => {
    expect(written('select 1', [])).toEqual({ sql: 'select 1', params: [] })
  })
})
