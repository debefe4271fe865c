import { existsSync, readdirSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { findProgram, installSystemPackages } from './system.mjs'
import { Refusal } from './say.mjs'

/** Where Debian keeps the server programs of each major version; they are not in PATH there. */
const DEBIAN = '/usr/lib/postgresql'

/**
 * Finds PostgreSQL's server programs.
 * @param {{ major?: string, debian?: string, path?: string }} [where]
 *   major: the version that made the data, as only it can open them; the others are given by tests
 * @returns {string | null} the directory that holds `postgres` and `initdb`
 */
export function findServerPrograms({ major, debian = DEBIAN, path = process.env.PATH ?? '' } = {}) {
  const versions = existsSync(debian) ? readdirSync(debian).sort((a, b) => Number(b) - Number(a)) : []
  const packaged = versions.filter(version => !major || version === major).map(version => join(debian, version, 'bin'))
  const inPath = findProgram('postgres', path)
  return [...packaged, ...(inPath ? [dirname(inPath)] : [])]
    .find(directory => existsSync(join(directory, 'postgres')) && existsSync(join(directory, 'initdb'))) ?? null
}

/**
 * Finds the server programs, installing them first where they are missing and that is possible.
 * @param {string} [major] the version that made the data
 * @returns {Promise<string>} their directory
 */
export async function needServerPrograms(major) {
  const found = findServerPrograms({ major })
  if (found) return found
  if (major && findServerPrograms()) {
    throw new Refusal(`The database was made by PostgreSQL ${major}, which is not installed any more. Install postgresql-${major}, or move the data to the newer version with pg_upgrade.`)
  }
  await installSystemPackages(['postgresql'], 'PostgreSQL 15 or later is needed and its server programs were not found; DATABASE_URL may name a server elsewhere instead')
  const installed = findServerPrograms({ major })
  if (!installed) throw new Refusal('PostgreSQL was installed, yet its server programs were not found.')
  return installed
}
