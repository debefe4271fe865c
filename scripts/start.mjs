// `npm start`: from a clone to a running Holdover, and back to nothing at Ctrl-C. `--dev` runs the development server.
import { join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { buildServer } from './lib/build.mjs'
import { makeDataDirectory } from './lib/files.mjs'
import { checkNode, installPackages } from './lib/install.mjs'
import { claimPort } from './lib/ports.mjs'
import { makeDatabase, startPostgres } from './lib/postgres.mjs'
import { closeAll, closeOnSignals, isClosing } from './lib/processes.mjs'
import { Refusal, say } from './lib/say.mjs'
import { loadSecrets } from './lib/secrets.mjs'
import { startServer, waitForHealth } from './lib/server.mjs'
import { claimDataDirectory } from './lib/single.mjs'

const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
const development = process.argv.includes('--dev')
const demo = process.env.HOLDOVER_DEMO !== '0'
const DEMO_PEOPLE = ['technician', 'technician2', 'supervisor', 'auditor', 'admin']

async function main() {
  checkNode()
  const host = process.env.HOST || '127.0.0.1'
  const port = await claimPort(host, process.env.PORT || '3000')
  const dataDirectory = resolve(root, process.env.HOLDOVER_DATA || '.data')
  await makeDataDirectory(dataDirectory)
  await claimDataDirectory(dataDirectory)
  await installPackages(root)
  const secrets = await loadSecrets(dataDirectory)
  if (!development) await buildServer(root)
  const databaseUrl = await findDatabase(dataDirectory)

  // An address for this machine's own browser, also where the server listens on every one of its addresses.
  const near = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host
  const address = `http://${near.includes(':') ? `[${near}]` : near}:${port}`
  say(development ? 'Starting the development server' : 'Starting the server')
  const server = startServer(development
    ? [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'dev', '--host', host, '--port', String(port), '--no-fork']
    : [join(root, '.output/server/index.mjs')], {
    cwd: root,
    leash: !development,
    env: {
      ...process.env,
      ...secrets,
      NODE_ENV: development ? 'development' : 'production',
      HOST: host, PORT: String(port), NITRO_HOST: host, NITRO_PORT: String(port),
      AUTH_ORIGIN: process.env.AUTH_ORIGIN || `${address}/api/auth`,
      NUXT_DATABASE_URL: databaseUrl,
      NUXT_DATA_DIR: dataDirectory,
      HOLDOVER_DEMO: demo ? '1' : '0',
      NITRO_SHUTDOWN_TIMEOUT: '1000',
      NUXT_TELEMETRY_DISABLED: '1',
    },
  })
  const health = await waitForHealth(`${address}/api/health`, server)
  if (isClosing()) return
  if (!health.ready) throw new Refusal(`The server did not come up:\n${health.words}`)
  say(`Ready at ${address}`)
  if (demo) say(`Sign in as ${DEMO_PEOPLE.map(name => `${name}@quillfeather.example`).join(', ')} with the password holdover-demo`)
  say('Ctrl-C stops it')
  const words = await server.ended
  if (!isClosing()) throw new Refusal(`The server ended by itself. Its last words:\n${words}`)
}

/** The database that is given, else one of our own. */
async function findDatabase(dataDirectory) {
  if (process.env.DATABASE_URL) {
    say('Using the database of DATABASE_URL')
    return process.env.DATABASE_URL
  }
  const { urlOf } = await startPostgres(dataDirectory, {
    onLost: words => fail(new Refusal(`PostgreSQL ended by itself. Its last words:\n${words}`)),
  })
  await makeDatabase(urlOf('postgres'), 'holdover')
  return urlOf('holdover')
}

async function fail(error) {
  if (isClosing()) return
  process.stderr.write(`${error instanceof Refusal ? `holdover  ${error.message}` : error.stack}\n`)
  await closeAll()
  process.exit(1)
}

closeOnSignals(0, () => say('Stopping'))
main().catch(fail)
