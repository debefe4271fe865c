// The version's spelling is this project's own; no published source.
import { readFileSync } from 'node:fs'
import { expect, it } from 'vitest'
import { PROGRAM_VERSION } from '../../../shared/program-version'

it('is that of package.json', () => {
  expect(PROGRAM_VERSION).toBe(JSON.parse(readFileSync(new URL('../../../package.json', import.meta.url), 'utf8')).version)
})
