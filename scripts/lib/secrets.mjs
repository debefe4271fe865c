import { randomBytes } from 'node:crypto'
import { join } from 'node:path'
import { readJson, writeWhole } from './files.mjs'
import { say } from './say.mjs'

/** The name of each secret: what signs the sessions, and the seed of the server's Ed25519 key. Both 32 random bytes. */
const NAMES = ['NUXT_AUTH_SECRET', 'HOLDOVER_SERVER_KEY']

/**
 * The secrets from the environment, else from the data directory, made there once.
 * @param {string} dataDirectory absolute
 * @param {NodeJS.ProcessEnv} [env]
 * @returns {Promise<Record<string, string>>}
 */
export async function loadSecrets(dataDirectory, env = process.env) {
  const path = join(dataDirectory, 'secrets.json')
  const kept = await readJson(path) ?? {}
  const missing = NAMES.filter(name => !env[name] && !kept[name])
  for (const name of missing) kept[name] = randomBytes(32).toString('base64url')
  if (missing.length > 0) {
    await writeWhole(path, `${JSON.stringify(kept, null, 2)}\n`)
    say(`Secrets made in ${path}: keep a copy, for they seal the records`)
  }
  return Object.fromEntries(NAMES.map(name => [name, env[name] || kept[name]]))
}
