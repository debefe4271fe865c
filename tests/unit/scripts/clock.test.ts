// The clock is this project's own means of testing; no published source.
import { execFileSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

const clock = fileURLToPath(new URL('../../support/clock.cjs', import.meta.url))
let room: string

beforeAll(() => {
  room = mkdtempSync(join(tmpdir(), 'holdover-clock-'))
})
afterAll(() => rmSync(room, { recursive: true, force: true }))

/** Evaluates an expression in a Node whose clock is preloaded. */
function evaluate(expression: string, offset?: string): unknown {
  const path = join(room, `offset-${offset}`)
  if (offset !== undefined) writeFileSync(path, offset)
  const program = `process.stdout.write(JSON.stringify(${expression}))`
  return JSON.parse(execFileSync(process.execPath, ['-r', clock, '-e', program], { encoding: 'utf8', env: { HOLDOVER_TEST_CLOCK: path } }))
}

describe('the clock of a server under test', () => {
  const hour = 3_600_000

  it.each(['Date.now()', 'new Date().getTime()', 'Date.parse(Date())'])('moves %s by what the file says', (expression) => {
    expect(Math.abs(Number(evaluate(expression, String(5 * hour))) - Date.now() - 5 * hour)).toBeLessThan(30_000)
  })

  it('follows the file while the process runs', () => {
    const expression = '(() => { const before = Date.now(); require(\'node:fs\').writeFileSync(process.env.HOLDOVER_TEST_CLOCK, \'7200000\'); return Date.now() - before })()'
    expect(Math.round(Number(evaluate(expression, '0')) / hour)).toBe(2)
  })

  it('keeps the true time without a file', () => {
    expect(Math.abs(Number(evaluate('Date.now()')) - Date.now())).toBeLessThan(30_000)
  })

  it('leaves dates that are given as they are, and dates that are dates', () => {
    expect(evaluate('new Date(0).toISOString()', '1000')).toBe('1970-01-01T00:00:00.000Z')
    expect(evaluate('new Date(2026, 0, 2).getDate()', '1000')).toBe(2)
    expect(evaluate('[new Date() instanceof Date, new Date().constructor === Date, Date.UTC(1970, 0, 1), typeof Date()]', '1000')).toEqual([true, true, 0, 'string'])
  })
})
